// SPDX-License-Identifier: Apache-2.0
// Lists of numbers, and diameters with a second one in brackets.
#include "specimen/table_reader.h"

#include <fmt/format.h>

#include <charconv>
#include <limits>

namespace whorl::specimen {

std::vector<Stated<double>> TableReader::numbers(std::string_view key) const {
  constexpr std::size_t kMost = 400;
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  std::vector<Stated<double>> values;
  if (node == nullptr) return values;
  const toml::array* list = node->as_array();
  if (list == nullptr) {
    wrong_type(row, *node);
  } else if (list->size() > kMost) {
    complain(row, *node, fmt::format("holds {} numbers; at most {} are allowed", list->size(), kMost));
  } else {
    for (const toml::node& element : *list) values.push_back({checked_number(row, element), position_of(element), true});
  }
  return values;
}

std::optional<std::pair<double, double>> diameter_with_brackets(std::string_view text) {
  const auto number = [](std::string_view part) -> std::optional<double> {
    while (!part.empty() && part.front() == ' ') part.remove_prefix(1);
    while (!part.empty() && part.back() == ' ') part.remove_suffix(1);
    double value = 0.0;
    const auto read = std::from_chars(part.data(), part.data() + part.size(), value);
    if (read.ec != std::errc() || read.ptr != part.data() + part.size()) return std::nullopt;
    return value;
  };
  const std::size_t open = text.find('('), close = text.find(')');
  if (open == std::string_view::npos || close == std::string_view::npos || close < open) return std::nullopt;
  if (text.find_first_not_of(' ', close + 1) != std::string_view::npos) return std::nullopt;
  const auto whole = number(text.substr(0, open)), inner = number(text.substr(open + 1, close - open - 1));
  if (!whole || !inner) return std::nullopt;
  return std::pair{*whole, *inner};
}

TableReader::ReadingValue TableReader::reading(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  constexpr double kNone = std::numeric_limits<double>::quiet_NaN();
  if (node == nullptr) return {{kNone, {}, false}, {}};
  if (const auto* text = node->as_string()) {
    const auto pair = diameter_with_brackets(text->get());
    if (!pair) complain(row, *node, fmt::format("wanted is {}", written_wish(row)));
    if (pair) return {{pair->first, position_of(*node), true}, pair->second};
    return {{kNone, position_of(*node), true}, {}};
  }
  return {{checked_number(row, *node), position_of(*node), true}, {}};
}

}  // namespace whorl::specimen
