// SPDX-License-Identifier: Apache-2.0
// Expansions that are one number, or change by stages along the shell; lists of numbers.
#include "specimen/table_reader.h"

#include <fmt/format.h>

namespace whorl::specimen {
namespace {

constexpr std::size_t kMostStages = 100;
constexpr double kLastWhorl = 40.0;  // as far as any shell of this format goes

std::optional<double> number_at(const toml::array& pair, std::size_t index) {
  const toml::node* node = pair.get(index);
  return node != nullptr ? number_of(*node) : std::nullopt;
}

}  // namespace

Stages TableReader::checked_stages(const KeyRow& row, const toml::array& list) const {
  const std::string key = written_key(row.table, row.key);
  const auto complain_at = [&](const toml::node& node, const std::string& what) {
    problems_.add(position_of(node), fmt::format("{}: {}", key, what));
  };
  if (list.empty())
    complain_at(list, "the list of stages is empty; state one number, or stages [[whorl, number], ...]");
  if (list.size() > kMostStages) {
    complain_at(list, fmt::format("{} stages; at most {} are allowed", list.size(), kMostStages));
    return {};
  }
  Stages stages;
  for (std::size_t i = 0; i < list.size(); ++i) {
    const toml::node& node = *list.get(i);
    const toml::array* pair = node.as_array();
    const std::optional<double> whorl = pair != nullptr ? number_at(*pair, 0) : std::nullopt;
    const std::optional<double> value = pair != nullptr ? number_at(*pair, 1) : std::nullopt;
    if (!whorl || !value || pair->size() != 2) {
      complain_at(node, fmt::format("stage {} is {}; wanted is [whorl, number], as in [2.5, 1.42]", i + 1,
                                    pair != nullptr ? "a list that is not two numbers" : std::string(kind_of(node))));
      continue;
    }
    if (!(*whorl >= 0.0 && *whorl <= kLastWhorl)) {
      complain_at(node,
                  fmt::format("stage {} lies at whorl {}; must be from 0 to {} whorls", i + 1, *whorl, kLastWhorl));
    }
    if (!row.range.holds(*value)) {
      complain_at(node, fmt::format("stage {} has the expansion {}; must be {}", i + 1, *value, written_range(row)));
    }
    if (!stages.empty() && !(*whorl > stages.back().whorl)) {
      complain_at(node, fmt::format("stage {} at whorl {} does not lie after the stage before it, at whorl {}; "
                                    "stages must rise from the pole to the lip",
                                    i + 1, *whorl, stages.back().whorl));
    }
    stages.push_back({*whorl, *value});
  }
  return stages;
}

Stated<std::vector<double>> TableReader::rising_numbers(std::string_view key) const {
  constexpr std::size_t kMostRising = 12;
  const KeyRow& row = row_of(key);
  Stated<std::vector<double>> found;
  const toml::node* node = node_of(key);
  if (node == nullptr) return found;
  found.where = position_of(*node);
  found.given = true;
  for (const Stated<double>& one : numbers(key)) {
    if (!found.value.empty() && one.value <= found.value.back())
      problems_.add(one.where, fmt::format("{}: {} does not lie above the number before it, {}; they must rise",
                                           written_key(row.table, row.key), one.value, found.value.back()));
    found.value.push_back(one.value);
  }
  if (const toml::array* list = node->as_array(); list != nullptr && list->empty())
    problems_.add(found.where, fmt::format("{}: the list is empty; leave it out, or state numbers", written_key(row.table, row.key)));
  if (found.value.size() > kMostRising)
    problems_.add(found.where, fmt::format("{}: {} numbers; at most {} are allowed", written_key(row.table, row.key),
                                           found.value.size(), kMostRising));
  return found;
}

Stated<Stages> TableReader::stages(std::string_view key) const {
  const KeyRow& row = row_of(key);
  const toml::node* node = expect(row);
  if (node == nullptr) return {{}, {}, false};
  if (const toml::array* list = node->as_array()) return {checked_stages(row, *list), position_of(*node), true};
  return {{{0.0, checked_number(row, *node)}}, position_of(*node), true};
}

std::optional<Stated<Stages>> TableReader::optional_stages(std::string_view key) const {
  if (!states(key)) return std::nullopt;
  return stages(key);
}

}  // namespace whorl::specimen
