// SPDX-License-Identifier: Apache-2.0
// Rows of tests/data/check_values_coiling.csv: closed forms and published values of coiled shells.
#pragma once

#include "support/table.h"

#include <map>

namespace whorl::test {

struct CheckValue {
  std::string id;
  std::map<std::string, double> inputs;  // by name, for example W or alpha
  double value = 0.0, tolerance = 0.0;

  double input(const std::string& name, double otherwise = 0.0) const {
    const auto found = inputs.find(name);
    return found == inputs.end() ? otherwise : found->second;
  }
};

/// All rows whose id starts with `id`.
inline std::vector<CheckValue> check_values(const std::string& id) {
  std::vector<CheckValue> found;
  for (const auto& row : read_table("check_values_coiling.csv")) {
    if (row[0].rfind(id, 0) != 0) continue;
    CheckValue value{row[0], {}, std::stod(row[3]), std::stod(row[5])};
    std::istringstream inputs(row[2]);
    for (std::string input; std::getline(inputs, input, ';');) {
      const std::size_t equals = input.find('='), from = input.find_first_not_of(' ');
      if (equals != std::string::npos) value.inputs[input.substr(from, equals - from)] = std::stod(input.substr(equals + 1));
    }
    found.push_back(value);
  }
  if (found.empty()) throw std::runtime_error("no check value " + id);
  return found;
}

}  // namespace whorl::test
