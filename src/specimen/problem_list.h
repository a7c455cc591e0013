// SPDX-License-Identifier: Apache-2.0
// Gathers the faults of one file while it is read.
#pragma once

#include "diagnostics/error.h"

#include <algorithm>
#include <string>
#include <tuple>
#include <utility>
#include <vector>

namespace whorl::specimen {

class ProblemList {
 public:
  void add(diagnostics::Position where, std::string message) { problems_.push_back({where, std::move(message)}); }
  bool empty() const { return problems_.empty(); }

  /// Throws InvalidInput with all faults in the order of their places, if there are any.
  void throw_if_any(const std::string& source) {
    if (problems_.empty()) return;
    std::stable_sort(problems_.begin(), problems_.end(), [](const auto& a, const auto& b) {
      return std::tie(a.where.line, a.where.column) < std::tie(b.where.line, b.where.column);
    });
    throw diagnostics::InvalidInput(source, std::move(problems_));
  }

 private:
  std::vector<diagnostics::Problem> problems_;
};

}  // namespace whorl::specimen
