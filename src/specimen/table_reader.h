// SPDX-License-Identifier: Apache-2.0
// Reads one table of a scene file, key by key, as the table of keys says.
#pragma once

#include "specimen/key_table.h"
#include "specimen/problem_list.h"
#include "specimen/specimen.h"
#include "specimen/toml_door.h"

#include <optional>

namespace whorl::specimen {

/// Every value that is asked for is checked; what is wrong goes to the list of problems, and a placeholder comes back
/// (for numbers NaN, so that no later comparison finds fault with it again). A key that the table of keys does not
/// hold may not be asked for.
class TableReader {
 public:
  /// `table` may be null: the file does not have it. `where` is then the place for what is missing. `broken` says that
  /// something else stands there, which has been complained of: what is missing is then no further fault.
  TableReader(const toml::table* table, std::string_view name, diagnostics::Position where, ProblemList& problems,
              bool broken = false, std::span<const KeyRow> rows = key_table())
      : table_(table), name_(name), where_(where), problems_(problems), broken_(broken), rows_(rows) {}

  bool states(std::string_view key) const { return node_of(key) != nullptr; }
  /// Null where the file does not have this table.
  const toml::table* content() const { return table_; }
  /// Null where the key is missing or not a table.
  const toml::table* inner_table(std::string_view key) const {
    const toml::node* node = node_of(key);
    return node == nullptr ? nullptr : node->as_table();
  }
  diagnostics::Position where() const { return where_; }
  bool broken() const { return broken_; }

  Stated<double> number(std::string_view key) const;
  Stated<double> number(std::string_view key, double fallback) const;
  Stated<int> whole(std::string_view key) const;
  /// NaN for those that are no number in range.
  std::vector<Stated<double>> numbers(std::string_view key) const;
  /// A number, or "85 (63)": the whole diameter and, in brackets, the one at which the rest was measured.
  struct ReadingValue {
    Stated<double> value;
    std::optional<double> in_brackets;
  };
  ReadingValue reading(std::string_view key) const;
  /// Without control characters, not blank, of the stated length.
  Stated<std::string> text(std::string_view key) const;
  Stated<Colour> colour(std::string_view key) const;
  std::optional<Stated<Colour>> optional_colour(std::string_view key) const;
  Stated<Stages> stages(std::string_view key) const;
  std::optional<Stated<Stages>> optional_stages(std::string_view key) const;
  /// Numbers of at most kMostRising that rise strictly; none where the key is missing.
  Stated<std::vector<double>> rising_numbers(std::string_view key) const;
  /// "auto" is 0.
  Stated<double> bar(std::string_view key) const;
  /// The words stand in the order of the enumeration.
  template <class Enumeration>
  Stated<Enumeration> word(std::string_view key) const {
    const Stated<int> index = word_index(key);
    return {static_cast<Enumeration>(index.value), index.where, index.given};
  }

  /// Complains of keys that the table of keys does not hold.
  void refuse_unknown_keys() const;

 private:
  const toml::node* node_of(std::string_view key) const { return table_ == nullptr ? nullptr : table_->get(key); }
  const KeyRow& row_of(std::string_view key) const;
  /// Null where the key is missing; complains if it is required.
  const toml::node* expect(const KeyRow& row) const;
  Stated<int> word_index(std::string_view key) const;
  double checked_number(const KeyRow& row, const toml::node& node) const;
  Stages checked_stages(const KeyRow& row, const toml::array& list) const;
  void wrong_type(const KeyRow& row, const toml::node& node) const;
  void complain(const KeyRow& row, const toml::node& node, std::string_view what) const;

  const toml::table* table_;
  std::string_view name_;
  diagnostics::Position where_;
  ProblemList& problems_;
  bool broken_;
  std::span<const KeyRow> rows_;
};

}  // namespace whorl::specimen
