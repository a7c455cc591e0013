// SPDX-License-Identifier: Apache-2.0
// Finds keys in the table and puts rows into words.
#include "specimen/key_table.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>

namespace whorl::specimen {
namespace {

std::string unit_after(std::string_view unit) { return unit.empty() ? "" : fmt::format(" {}", unit); }

std::string quoted_words(const KeyRow& row) {
  std::vector<std::string> quoted;
  for (const std::string_view word : words_of(row)) quoted.push_back(fmt::format("\"{}\"", word));
  return fmt::format("{}", fmt::join(quoted, ", "));
}

}  // namespace

const KeyRow* find_key(std::string_view table, std::string_view key, std::span<const KeyRow> rows) {
  const auto row =
      std::find_if(rows.begin(), rows.end(), [&](const KeyRow& r) { return r.table == table && r.key == key; });
  return row == rows.end() ? nullptr : &*row;
}

std::vector<std::string_view> keys_of(std::string_view table, std::span<const KeyRow> rows) {
  std::vector<std::string_view> keys;
  const auto add = [&](std::string_view key) {
    if (std::find(keys.begin(), keys.end(), key) == keys.end()) keys.push_back(key);
  };
  for (const KeyRow& row : rows) {
    if (row.table == table) {
      add(row.key);
    } else if (table.empty()) {
      add(row.table.substr(0, row.table.find('.')));
    } else if (row.table.starts_with(table) && row.table[table.size()] == '.') {
      add(row.table.substr(table.size() + 1));
    }
  }
  return keys;
}

std::vector<std::string> tables_with(std::string_view key, std::span<const KeyRow> rows) {
  std::vector<std::string> tables;
  for (const KeyRow& row : rows) {
    if (row.key == key) tables.push_back(written_table(row.table));
  }
  return tables;
}

bool is_list(std::string_view table) {
  constexpr std::string_view kLists[] = {"section.lobe", "band",  "flame",       "spot",  "pattern",
                                         "cord",         "rib",   "nodule",      "stripe", "lamella", "spine", "attached", "encruster",
                                         "lamp",         "panel", "measurement", "series", "outline", "preserved"};
  return std::find(std::begin(kLists), std::end(kLists), table) != std::end(kLists);
}

std::string written_table(std::string_view table) {
  if (table.empty()) return "the top of the file";
  if (table == "panel.view") return "[[panel]] view";
  return is_list(table) ? fmt::format("[[{}]]", table) : fmt::format("[{}]", table);
}

std::string written_key(std::string_view table, std::string_view key) {
  return table.empty() ? std::string(key) : fmt::format("{} {}", written_table(table), key);
}

std::vector<std::string_view> words_of(const KeyRow& row) {
  std::vector<std::string_view> words;
  for (std::string_view rest = row.words; !rest.empty();) {
    const std::size_t end = std::min(rest.find('|'), rest.size());
    words.push_back(rest.substr(0, end));
    rest.remove_prefix(std::min(end + 1, rest.size()));
  }
  return words;
}

std::string written_range(const KeyRow& row) {
  const Range& range = row.range;
  const std::string unit = unit_after(row.unit);
  if (range.low == range.high) return fmt::format("{}{}", range.low, unit);
  if (range.low_open) return fmt::format("more than {}, up to {}{}", range.low, range.high, unit);
  if (range.high_open) return fmt::format("from {} to less than {}{}", range.low, range.high, unit);
  return fmt::format("from {} to {}{}", range.low, range.high, unit);
}

std::string written_wish(const KeyRow& row) {
  switch (row.type) {
    case KeyType::kNumber: return fmt::format("a number {}", written_range(row));
    case KeyType::kWhole:
      return fmt::format("{} {}", row.range.low == row.range.high ? "the number" : "a whole number",
                         written_range(row));
    case KeyType::kText: return fmt::format("a text of {} to {} characters, in quotes", row.range.low, row.range.high);
    case KeyType::kWord: return fmt::format("one of the words {}", quoted_words(row));
    case KeyType::kColour: return "a colour \"#rrggbb\"";
    case KeyType::kStages: return fmt::format("a number {}, or stages [[whorl, number], ...]", written_range(row));
    case KeyType::kView:
      return fmt::format("one of the views {}, or {{ azimuth = .., elevation = .. }}", quoted_words(row));
    case KeyType::kBar: return fmt::format("\"auto\" or a length {}", written_range(row));
    case KeyType::kNumbers: return fmt::format("a list of numbers {}", written_range(row));
    case KeyType::kReading: return fmt::format("a number {}, or a diameter as \"85 (63)\"", written_range(row));
  }
  return {};
}

}  // namespace whorl::specimen
