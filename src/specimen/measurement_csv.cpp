// SPDX-License-Identifier: Apache-2.0
// Measurement files as tables: a header, then a row a reading; rows of one specimen share its name.
#include "diagnostics/nearest_word.h"
#include "specimen/measurement_rows.h"
#include "specimen/measurement_toml.h"
#include "specimen/text_check.h"
#include "specimen/toml_door.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <array>
#include <charconv>
#include <cmath>
#include <map>

namespace whorl::specimen {
namespace {

struct Cell {
  std::string text;
  diagnostics::Position where;
};
using CellRow = std::vector<Cell>;

constexpr std::array<std::string_view, 16> kColumns{"specimen", "coiling", "catalogue", "mineral",    "quantity",
                                                    "definition", "value", "unit",      "step",       "error",
                                                    "behind_lip", "at_whorl", "at_diameter", "tolerance", "measured", "wall"};
constexpr std::array<std::string_view, 5> kNeeded{"specimen", "coiling", "quantity", "definition", "value"};

std::string trimmed(std::string text) {
  text.erase(0, std::min(text.find_first_not_of(" \t"), text.size()));
  text.erase(text.find_last_not_of(" \t") + 1);
  return text;
}

// Cells by RFC 4180: quotes round a cell, doubled inside; lines that begin with # and blank lines are passed over.
std::vector<CellRow> split(std::string_view text, ProblemList& problems) {
  std::vector<CellRow> rows;
  if (text.starts_with("\xEF\xBB\xBF")) text.remove_prefix(3);
  std::uint32_t line_number = 0;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find('\n'), text.size());
    std::string_view line = text.substr(0, end);
    text.remove_prefix(std::min(end + 1, text.size()));
    ++line_number;
    if (line.ends_with('\r')) line.remove_suffix(1);
    if (line.find_first_not_of(" \t,") == std::string_view::npos || line.starts_with('#')) continue;
    CellRow row;
    for (std::size_t at = 0; at <= line.size();) {
      Cell cell{{}, {line_number, static_cast<std::uint32_t>(1 + count_characters(line.substr(0, at)))}};
      if (at < line.size() && line[at] == '"') {
        for (++at; at < line.size(); ++at) {
          if (line[at] != '"') {
            cell.text += line[at];
          } else if (at + 1 < line.size() && line[at + 1] == '"') {
            cell.text += line[at++];
          } else {
            break;
          }
        }
        if (at >= line.size()) problems.add(cell.where, "the quote of this cell is not closed on its line");
        at = std::min(line.find(',', std::min(at + 1, line.size())), line.size()) + 1;
      } else {
        const std::size_t comma = std::min(line.find(',', at), line.size());
        cell.text = std::string(line.substr(at, comma - at));
        at = comma + 1;
      }
      cell.text = trimmed(cell.text);
      row.push_back(std::move(cell));
    }
    rows.push_back(std::move(row));
  }
  return rows;
}

class Reader {
 public:
  explicit Reader(ProblemList& problems) : problems_(problems) {}

  std::vector<MeasuredSpecimen> read(const std::string& text) {
    const std::vector<CellRow> rows = split(text, problems_);
    if (rows.empty() || !read_header(rows.front())) return {};
    for (std::size_t i = 1; i < rows.size(); ++i) read_row(rows[i]);
    if (specimens_.empty() && problems_.empty())
      problems_.add(rows.front().front().where, "the table has a header but no rows");
    for (std::size_t i = 0; i < specimens_.size(); ++i)
      if (specimens_[i].mould_wall) specimens_[i].mould_wall->value *= millimetres_in(unit_[i].value_or("mm")).value();
    for (std::size_t i = 0; i < specimens_.size(); ++i) finish_specimen(specimens_[i], bracketed_[i], problems_);
    return std::move(specimens_);
  }

 private:
  bool read_header(const CellRow& header) {
    header_ = header;
    for (std::size_t i = 0; i < header.size(); ++i) {
      const std::string& name = header[i].text;
      if (std::find(kColumns.begin(), kColumns.end(), name) == kColumns.end()) {
        const diagnostics::NearestWord nearest = diagnostics::nearest_word(name, kColumns);
        problems_.add(header[i].where, fmt::format("unknown column \"{}\"{}; there are {}", shown(name),
                                                   nearest.close ? fmt::format("; did you mean \"{}\"?", nearest.word) : "",
                                                   fmt::join(kColumns, ", ")));
      } else if (!columns_.emplace(name, i).second) {
        problems_.add(header[i].where, fmt::format("the column \"{}\" stands twice", name));
      }
    }
    for (const std::string_view needed : kNeeded)
      if (!columns_.contains(std::string(needed)))
        problems_.add(header.front().where, fmt::format("the column \"{}\" is missing in the header", needed));
    return problems_.empty();
  }

  const Cell* cell(const CellRow& row, const char* column) const {
    const auto found = columns_.find(column);
    if (found == columns_.end() || found->second >= row.size() || row[found->second].text.empty()) return nullptr;
    return &row[found->second];
  }
  Stated<std::string> text(const CellRow& row, const char* column) const {
    const Cell* found = cell(row, column);
    return found == nullptr ? Stated<std::string>{"", row.front().where, false} : Stated<std::string>{found->text, found->where, true};
  }
  std::optional<Stated<double>> number(const CellRow& row, const char* column, bool positive) {
    const Cell* found = cell(row, column);
    if (found == nullptr) return std::nullopt;
    double value = 0.0;
    const std::string& digits = found->text;
    const auto read = std::from_chars(digits.data(), digits.data() + digits.size(), value);
    const bool whole = read.ec == std::errc() && read.ptr == digits.data() + digits.size() && std::isfinite(value);
    if (!whole || (positive && !(value > 0.0)) || std::abs(value) > 200000.0) {
      problems_.add(found->where, fmt::format("{} = \"{}\": wanted is a {}number, with a point for the decimals", column,
                                              shown(digits), positive ? "positive " : ""));
      return std::nullopt;
    }
    return Stated<double>{value, found->where, true};
  }

  template <class Word>
  std::optional<Word> word(const CellRow& row, const char* column, std::string_view first, std::string_view second) {
    const Cell* found = cell(row, column);
    if (found == nullptr) return std::nullopt;
    if (found->text == first) return static_cast<Word>(0);
    if (found->text == second) return static_cast<Word>(1);
    problems_.add(found->where, fmt::format("{} = \"{}\": wanted is {} or {}", column, shown(found->text), first, second));
    return std::nullopt;
  }

  // The specimen of a row, made where it is new.
  std::size_t specimen_of(const CellRow& row, const Cell& name) {
    const auto [place, is_new] = by_name_.emplace(name.text, specimens_.size());
    if (is_new) {
      MeasuredSpecimen specimen;
      specimen.where = name.where;
      specimen.identity.name = {name.text, name.where, true};
      if (const std::string fault = fault_of_text(name.text, 200.0); !fault.empty()) problems_.add(name.where, fault);
      specimens_.push_back(std::move(specimen));
      bracketed_.emplace_back();
      unit_.emplace_back();
      if (cell(row, "coiling") == nullptr)
        problems_.add(name.where, fmt::format("specimen \"{}\": its first row must state coiling, dextral or sinistral", shown(name.text)));
    }
    MeasuredSpecimen& specimen = specimens_[place->second];
    Identity& identity = specimen.identity;
    if (const auto coiling = word<Coiling>(row, "coiling", "dextral", "sinistral")) {
      if (identity.coiling.given && identity.coiling.value != *coiling)
        problems_.add(cell(row, "coiling")->where, fmt::format("specimen \"{}\" is both dextral and sinistral", shown(name.text)));
      identity.coiling = {*coiling, name.where, true};
    }
    if (const auto mineral = word<Mineral>(row, "mineral", "aragonite", "calcite")) identity.mineral = {*mineral, name.where, true};
    if (const auto mould = word<int>(row, "measured", "shell", "internal mould")) specimen.mould = *mould == 1;
    if (const auto wall = number(row, "wall", true)) specimen.mould_wall = *wall;
    if (const Stated<std::string> catalogue = text(row, "catalogue"); catalogue.given) identity.catalogue = catalogue;
    if (const auto tolerance = number(row, "tolerance", true)) specimen.tolerance = 0.01 * tolerance->value;
    return place->second;
  }

  void read_row(const CellRow& cells) {
    if (cells.size() > header_.size()) {
      problems_.add(cells[header_.size()].where, fmt::format("this row has {} cells, the header {}", cells.size(), header_.size()));
      return;
    }
    const Cell* name = cell(cells, "specimen");
    if (name == nullptr) {
      problems_.add(cells.front().where, "this row has no specimen");
      return;
    }
    const std::size_t index = specimen_of(cells, *name);
    RawRow row;
    row.label = "row:";
    row.where = cells.front().where;
    row.quantity = text(cells, "quantity");
    row.definition = text(cells, "definition");
    if (!row.quantity.given) problems_.add(row.where, "row: quantity is missing");
    row.unit = text(cells, "unit");
    row.step = number(cells, "step", true);
    row.error = number(cells, "error", true);
    row.behind_lip = number(cells, "behind_lip", false);
    row.at_whorl = number(cells, "at_whorl", false);
    row.at_diameter = number(cells, "at_diameter", true);
    if (const Cell* value = cell(cells, "value")) {
      if (const auto pair = diameter_with_brackets(value->text)) {
        row.value = {pair->first, value->where, true};
        row.in_brackets = pair->second;
      } else if (const auto plain = number(cells, "value", false)) {
        row.value = *plain;
      } else {
        return;
      }
    } else {
      problems_.add(row.where, "row: value is missing");
      return;
    }
    RowDefaults defaults;
    const bool length = row.unit.given && row.unit.value != "degrees" && row.unit.value != "whorls";
    if (length && !millimetres_in(row.unit.value)) {
      problems_.add(row.unit.where, fmt::format("unit = \"{}\": wanted is mm, cm, um or in, degrees or whorls", shown(row.unit.value)));
      return;
    }
    // The first length of a specimen states its unit; another one later is refused as mixed units.
    if (length && !unit_[index]) unit_[index] = row.unit.value;
    if (unit_[index]) defaults.unit = *unit_[index];
    if (row.in_brackets) bracketed_[index] = *row.in_brackets * millimetres_in(defaults.unit).value();
    add_reading(row, defaults, specimens_[index], problems_);
  }

  ProblemList& problems_;
  CellRow header_;
  std::map<std::string, std::size_t> columns_, by_name_;
  std::vector<MeasuredSpecimen> specimens_;
  std::vector<std::optional<double>> bracketed_;
  std::vector<std::optional<std::string>> unit_;
};

}  // namespace

std::vector<MeasuredSpecimen> read_measurement_csv(const std::string& text, ProblemList& problems) {
  return Reader(problems).read(text);
}

}  // namespace whorl::specimen
