// SPDX-License-Identifier: Apache-2.0
// Measurement files in TOML.
#include "specimen/measurement_toml.h"

#include "specimen/identity_reader.h"
#include "specimen/measurement_rows.h"
#include "specimen/outline_points.h"
#include "specimen/preserved.h"
#include "specimen/table_reader.h"
#include "specimen/toml_text.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::specimen {
namespace {

constexpr diagnostics::Position kTop{1, 1};
constexpr std::size_t kMostRows = 400;

class Reader {
 public:
  Reader(const toml::table& root, std::string source, ProblemList& problems)
      : root_(root), source_(std::move(source)), problems_(problems) {}

  MeasuredSpecimen read() {
    const TableReader top = reader(&root_, "", kTop);
    top.whole("format");
    const KeyRow& units = *find_key("", "unit", measurement_key_table());
    defaults_.unit = std::string(words_of(units).at(static_cast<std::size_t>(top.word<Unit>("unit").value)));
    if (const auto step = optional(top, "step")) defaults_.step = step->value;
    specimen_.tolerance = 0.01 * top.number("tolerance").value;
    read_specimen();
    read_held();
    read_wall();
    for (const TableReader& t : list("preserved")) specimen_.preserved.push_back(preserved_of(t));
    check_preserved(specimen_.preserved, specimen_.held.whorls, problems_);
    read_measurements();
    read_series();
    read_outlines();
    if (specimen_.readings.empty() && specimen_.outlines.empty() && problems_.empty())
      problems_.add(kTop, "no measurement: state each in a table [[measurement]], or successive whorls in a [[series]]");
    finish_specimen(specimen_, bracketed_mm_, problems_);
    return std::move(specimen_);
  }

 private:
  enum class Unit { kMm, kCm, kUm, kIn };

  TableReader reader(const toml::table* found, std::string_view name, diagnostics::Position where, bool broken = false) {
    TableReader table(found, name, where, problems_, broken, measurement_key_table());
    table.refuse_unknown_keys();
    return table;
  }

  TableReader table(std::string_view name) {
    const toml::node* node = root_.get(name);
    const toml::table* found = node != nullptr ? node->as_table() : nullptr;
    if (node != nullptr && found == nullptr)
      problems_.add(position_of(*node), fmt::format("\"{}\" is {}, wanted is a table: write {} in single brackets, its keys below",
                                                    name, kind_of(*node), written_table(name)));
    return reader(found, name, found != nullptr ? position_of(*found) : kTop, node != nullptr && found == nullptr);
  }

  std::vector<TableReader> list(std::string_view name) {
    std::vector<TableReader> tables;
    const toml::node* node = root_.get(name);
    if (node == nullptr) return tables;
    const toml::array* array = node->as_array();
    if (array == nullptr || array->size() > kMostRows) {
      problems_.add(position_of(*node),
                    array == nullptr ? fmt::format("\"{}\" is {}, wanted is a list of tables: write {} in double brackets, once for each",
                                                   name, kind_of(*node), written_table(name))
                                     : fmt::format("{} times {}; at most {} are allowed", array->size(), written_table(name), kMostRows));
      return tables;
    }
    for (const toml::node& element : *array) {
      if (const toml::table* found = element.as_table()) {
        tables.push_back(reader(found, name, position_of(*found)));
      } else {
        problems_.add(position_of(element), fmt::format("\"{}\" holds {}, wanted is a list of tables", name, kind_of(element)));
      }
    }
    return tables;
  }

  static std::optional<Stated<double>> optional(const TableReader& t, std::string_view key) {
    if (!t.states(key)) return std::nullopt;
    const Stated<double> value = t.number(key, 0.0);
    return std::isnan(value.value) ? std::nullopt : std::optional(value);
  }
  static std::optional<double> optional_value(const TableReader& t, std::string_view key) {
    const auto value = optional(t, key);
    return value ? std::optional(value->value) : std::nullopt;
  }

  void read_specimen() {
    const TableReader t = table("specimen");
    specimen_.where = t.where();
    specimen_.identity = read_identity(t);
    specimen_.mould = t.word<int>("measured").value == 1;
  }

  void read_wall() {
    const TableReader t = table("wall");
    specimen_.mould_wall = optional(t, "thickness");
    if (specimen_.mould_wall) specimen_.mould_wall->value *= millimetres_in(defaults_.unit).value();
  }

  void read_held() {
    const TableReader t = table("held");
    specimen_.held = {optional_value(t, "whorls"), optional_value(t, "W"),    optional_value(t, "D"),
                      optional_value(t, "T"),      optional_value(t, "S"),    optional_value(t, "start"),
                      optional_value(t, "roll"),   optional_value(t, "columella")};
  }

  RawRow raw_row(const TableReader& t, const char* label) {
    RawRow row;
    row.label = label;
    row.where = t.where();
    row.quantity = t.text("quantity");
    if (t.states("definition")) row.definition = t.text("definition");
    row.unit = t.text("unit");
    row.step = optional(t, "step");
    row.error = optional(t, "error");
    row.behind_lip = optional(t, "behind_lip");
    return row;
  }

  void read_measurements() {
    for (const TableReader& t : list("measurement")) {
      RawRow row = raw_row(t, "[[measurement]]");
      const TableReader::ReadingValue value = t.reading("value");
      row.value = value.value;
      row.in_brackets = value.in_brackets;
      row.at_whorl = optional(t, "at_whorl");
      row.at_diameter = optional(t, "at_diameter");
      if (row.in_brackets) bracketed_mm_ = *row.in_brackets * millimetres_in(defaults_.unit).value();
      add_reading(row, defaults_, specimen_, problems_);
    }
  }

  void read_series() {
    for (const TableReader& t : list("series")) {
      RawSeries series;
      series.row = raw_row(t, "[[series]]");
      series.values = t.numbers("values");
      enum class Interval { kFull, kHalf };
      enum class Order { kFromApex, kFromLip };
      series.half_turns = t.word<Interval>("interval").value == Interval::kHalf;
      series.from_lip = t.word<Order>("order").value == Order::kFromLip;
      if (const auto scatter = optional_value(t, "scatter")) series.scatter = 0.01 * *scatter;
      add_series(series, defaults_, specimen_, problems_);
    }
  }

  void read_outlines() {
    for (const TableReader& t : list("outline")) {
      enum class Axis { kUp, kDown };
      TracedOutline outline;
      outline.where = t.where();
      outline.kind = t.word<TracedOutline::Kind>("kind").value;
      constexpr double kAzimuths[] = {0.0, 180.0, 90.0, 270.0};  // in the order of the words
      enum class SideView { kApertural, kAbapertural, kRightLateral, kLeftLateral };
      outline.azimuth_deg = kAzimuths[static_cast<std::size_t>(t.word<SideView>("view").value)];
      const double unit = millimetres_in(defaults_.unit).value();
      const double scale = unit * t.number("scale").value;
      outline.standard_error = unit * t.number("error").value;
      const bool down = t.word<Axis>("y_axis").value == Axis::kDown;
      const Stated<double> behind = t.number("behind_lip");
      if (outline.kind == TracedOutline::Kind::kSection) outline.stage = {GrowthStage::Kind::kBehindLip, behind.value};
      const Stated<std::string> file = t.text("file");
      if (file.value.empty()) continue;
      for (TracedOutline::Point point : read_outline_points(source_, file, problems_))
        outline.points.push_back({scale * point.x, (down ? -scale : scale) * point.y});
      specimen_.outlines.push_back(std::move(outline));
    }
  }

  const toml::table& root_;
  std::string source_;
  ProblemList& problems_;
  RowDefaults defaults_;
  MeasuredSpecimen specimen_;
  std::optional<double> bracketed_mm_;
};

}  // namespace

MeasuredSpecimen read_measurement_toml(const std::string& text, const std::string& source, ProblemList& problems) {
  const toml::table root = parse_toml(text, source);
  return Reader(root, source, problems).read();
}

}  // namespace whorl::specimen
