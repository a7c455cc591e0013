// SPDX-License-Identifier: Apache-2.0
// Numbers, words and colours of one table.
#include "specimen/table_reader.h"

#include "diagnostics/nearest_word.h"
#include "specimen/text_check.h"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <limits>
#include <stdexcept>

namespace whorl::specimen {
namespace {

constexpr double kNoNumber = std::numeric_limits<double>::quiet_NaN();

double number_in(std::string_view text) {
  double value = 0.0;
  std::from_chars(text.data(), text.data() + text.size(), value);
  return value;
}

std::string_view inside_quotes(std::string_view toml_text) { return toml_text.substr(1, toml_text.size() - 2); }

/// "#rrggbb"; empty where it is anything else.
std::optional<Colour> colour_in(std::string_view text) {
  if (text.size() != 7 || text[0] != '#') return std::nullopt;
  Colour colour;
  unsigned char* channel[] = {&colour.red, &colour.green, &colour.blue};
  for (std::size_t i = 0; i < 3; ++i) {
    const char* first = text.data() + 1 + 2 * i;
    if (std::from_chars(first, first + 2, *channel[i], 16).ptr != first + 2) return std::nullopt;
  }
  return colour;
}

}  // namespace

const KeyRow& TableReader::row_of(std::string_view key) const {
  const KeyRow* row = find_key(name_, key, rows_);
  if (row == nullptr) throw std::logic_error(fmt::format("no row for the key {}", written_key(name_, key)));
  return *row;
}

void TableReader::complain(const KeyRow& row, const toml::node& node, std::string_view what) const {
  problems_.add(position_of(node),
                fmt::format("{} = {}: {}", written_key(row.table, row.key), shown_value(node), what));
}

void TableReader::wrong_type(const KeyRow& row, const toml::node& node) const {
  std::string_view hint;
  const bool wants_number = row.type == KeyType::kNumber || row.type == KeyType::kWhole || row.type == KeyType::kStages;
  if (wants_number && node.is_string()) hint = "; numbers stand without quotes";
  if (row.type == KeyType::kText && node.is_number()) hint = "; put it in quotes";
  complain(row, node, fmt::format("found {}, wanted is {}{}", kind_of(node), written_wish(row), hint));
}

const toml::node* TableReader::expect(const KeyRow& row) const {
  const toml::node* node = node_of(row.key);
  if (node == nullptr && row.fallback == kRequired && !broken_) {
    problems_.add(where_, fmt::format("{} is missing: state {}", written_key(row.table, row.key), written_wish(row)));
  }
  return node;
}

double TableReader::checked_number(const KeyRow& row, const toml::node& node) const {
  const std::optional<double> value = number_of(node);
  if (!value) {
    wrong_type(row, node);
  } else if (!std::isfinite(*value)) {
    complain(row, node, fmt::format("is no finite number; must be {}", written_range(row)));
  } else if (!row.range.holds(*value)) {
    complain(row, node, fmt::format("must be {}", written_range(row)));
  } else {
    return *value;
  }
  return kNoNumber;
}

Stated<double> TableReader::number(std::string_view key) const { return number(key, number_in(row_of(key).fallback)); }

Stated<double> TableReader::number(std::string_view key, double fallback) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr) return {row.fallback == kRequired ? kNoNumber : fallback, {}, false};
  return {checked_number(row, *node), position_of(*node), true};
}

Stated<int> TableReader::whole(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr) return {static_cast<int>(number_in(row.fallback)), {}, false};
  if (!node->is_integer()) {
    wrong_type(row, *node);
    return {0, position_of(*node), true};
  }
  const double value = checked_number(row, *node);
  return {std::isnan(value) ? 0 : static_cast<int>(value), position_of(*node), true};
}

Stated<std::string> TableReader::text(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr) return {"", {}, false};
  const auto* value = node->as_string();
  if (value == nullptr) {
    wrong_type(row, *node);
    return {"", position_of(*node), true};
  }
  if (const std::string fault = fault_of_text(value->get(), row.range.high); !fault.empty())
    complain(row, *node, fault);
  return {value->get(), position_of(*node), true};
}

Stated<int> TableReader::word_index(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const std::vector<std::string_view> words = words_of(row);
  const auto index_of = [&](std::string_view word) {
    return static_cast<int>(std::find(words.begin(), words.end(), word) - words.begin());
  };
  const toml::node* node = expect(row);
  if (node == nullptr) return {row.fallback == kRequired ? 0 : index_of(inside_quotes(row.fallback)), {}, false};
  const auto* value = node->as_string();
  if (value == nullptr) {
    wrong_type(row, *node);
    return {0, position_of(*node), true};
  }
  const int index = index_of(value->get());
  if (index < static_cast<int>(words.size())) return {index, position_of(*node), true};
  const diagnostics::NearestWord nearest = diagnostics::nearest_word(value->get(), words);
  complain(row, *node,
           nearest.close
               ? fmt::format("unknown word; did you mean \"{}\"? Wanted is {}", nearest.word, written_wish(row))
               : fmt::format("unknown word; wanted is {}", written_wish(row)));
  return {0, position_of(*node), true};
}

Stated<Colour> TableReader::colour(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr)
    return {row.fallback == kRequired ? Colour{} : colour_in(inside_quotes(row.fallback)).value(), {}, false};
  const auto* value = node->as_string();
  if (value == nullptr) {
    wrong_type(row, *node);
    return {{}, position_of(*node), true};
  }
  const std::optional<Colour> colour = colour_in(value->get());
  if (!colour)
    complain(row, *node, "is no colour; wanted is \"#rrggbb\", two hexadecimal digits each for red, green and blue");
  return {colour.value_or(Colour{}), position_of(*node), true};
}

std::optional<Stated<Colour>> TableReader::optional_colour(std::string_view key) const {
  if (!states(key)) return std::nullopt;
  return colour(key);
}

Stated<double> TableReader::bar(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr) return {0.0, {}, false};
  if (node->is_number()) return {checked_number(row, *node), position_of(*node), true};
  const auto* value = node->as_string();
  if (value == nullptr || value->get() != "auto") wrong_type(row, *node);
  return {0.0, position_of(*node), true};
}

}  // namespace whorl::specimen
