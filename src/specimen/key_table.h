// SPDX-License-Identifier: Apache-2.0
// The one table of all keys of a scene file: it drives the reading, the messages and the checks of the documentation.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace whorl::specimen {

enum class KeyType { kNumber, kWhole, kText, kWord, kColour, kStages, kView, kBar, kNumbers, kReading };

/// A closed or half-open range of numbers; for texts, of the number of characters.
struct Range {
  double low = 0.0, high = 0.0;
  bool low_open = false, high_open = false;

  bool holds(double value) const {
    return (low_open ? value > low : value >= low) && (high_open ? value < high : value <= high);
  }
};

/// One key. `fallback` is what holds where the file is silent, as TOML text; kRequired and kNoDefault are not TOML, nor
/// is anything in round brackets, which describes a default that follows from other keys.
struct KeyRow {
  std::string_view table;  // "" for the top of the file; "section.lobe" for tables in tables
  std::string_view key;
  KeyType type;
  Range range;
  std::string_view unit;
  std::string_view words;  // of a kWord or kView, parted by '|', in the order of the enumeration
  std::string_view fallback;
  std::string_view meaning;
};

inline constexpr std::string_view kRequired = "required";
inline constexpr std::string_view kNoDefault = "none";

/// All rows, tables together, in the order of the documentation.
std::span<const KeyRow> key_table();
/// The rows of a measurement file.
std::span<const KeyRow> measurement_key_table();
/// Null where there is no such key.
const KeyRow* find_key(std::string_view table, std::string_view key, std::span<const KeyRow> rows = key_table());
/// The keys of one table; of the top of the file also the names of the tables.
std::vector<std::string_view> keys_of(std::string_view table, std::span<const KeyRow> rows = key_table());
/// The tables that know a key of that name, as they are written: "[wall]", "[[lamp]]".
std::vector<std::string> tables_with(std::string_view key, std::span<const KeyRow> rows = key_table());

/// "[wall]", "[[lamp]]", "the top of the file".
std::string written_table(std::string_view table);
/// "[wall] thickness", or just "format" for the top of the file.
std::string written_key(std::string_view table, std::string_view key);
/// Whether a table may stand several times, in double brackets.
bool is_list(std::string_view table);

std::vector<std::string_view> words_of(const KeyRow& row);
/// "from 0.001 to 100 mm", "more than 1, up to 1000000".
std::string written_range(const KeyRow& row);
/// What the file may say here: "a number from 0 to 50", "one of the words \"a\", \"b\"".
std::string written_wish(const KeyRow& row);

}  // namespace whorl::specimen
