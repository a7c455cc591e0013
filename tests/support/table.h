// SPDX-License-Identifier: Apache-2.0
// Reads the small comma-separated tables of tests/data and tests/reference.
#pragma once

#include <fstream>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace whorl::test {

/// The rows below the heading, split at commas; the tables read with this have no quoted cells.
inline std::vector<std::vector<std::string>> read_table(const std::string& name, const std::string& folder = "data") {
  std::ifstream file(std::string(WHORL_TEST_DIR) + "/" + folder + "/" + name);
  if (!file) throw std::runtime_error("tests/" + folder + "/" + name + " is missing");
  std::vector<std::vector<std::string>> rows;
  std::string line, cell;
  std::getline(file, line);
  while (std::getline(file, line)) {
    std::istringstream cells(line);
    rows.emplace_back();
    while (std::getline(cells, cell, ',')) rows.back().push_back(cell);
  }
  return rows;
}

}  // namespace whorl::test
