// SPDX-License-Identifier: Apache-2.0
// What is said of a key that no table, or another table, knows.
#include "diagnostics/nearest_word.h"
#include "specimen/table_reader.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>

namespace whorl::specimen {

void TableReader::refuse_unknown_keys() const {
  if (table_ == nullptr) return;
  const std::vector<std::string_view> known = keys_of(name_, rows_);
  for (const auto& [key, node] : *table_) {
    if (std::find(known.begin(), known.end(), key.str()) != known.end()) continue;
    const diagnostics::NearestWord nearest = diagnostics::nearest_word(key.str(), known);
    std::string message = fmt::format("unknown key \"{}\" in {}", shown(key.str()), written_table(name_));
    if (name_.empty()) message = fmt::format("unknown {} \"{}\"", node.is_table() ? "table" : "key", shown(key.str()));
    const std::vector<std::string> others = tables_with(key.str(), rows_);
    if (!others.empty()) message += fmt::format("; it belongs to {}", fmt::join(others, " or "));
    message += nearest.close ? fmt::format("; did you mean \"{}\"?", nearest.word)
                             : fmt::format("; the nearest known one here is \"{}\"", nearest.word);
    if (!nearest.close && others.empty()) message += fmt::format(" (known: {})", fmt::join(known, ", "));
    problems_.add(position_of(key), message);
  }
}

}  // namespace whorl::specimen
