// SPDX-License-Identifier: Apache-2.0
// Collects the faults that geometry finds, so that all are reported in one run.
#pragma once

#include "diagnostics/error.h"

#include <algorithm>

namespace whorl::compile {

class Faults {
 public:
  void add(diagnostics::Position where, std::string message) { problems_.push_back({where, std::move(message)}); }
  bool any() const { return !problems_.empty(); }
  /// Throws what was found, by line; returns where nothing was.
  void raise(const std::string& source) {
    if (problems_.empty()) return;
    std::stable_sort(problems_.begin(), problems_.end(), [](const auto& a, const auto& b) {
      return a.where.line != b.where.line ? a.where.line < b.where.line : a.where.column < b.where.column;
    });
    throw diagnostics::InvalidInput(source, problems_);
  }

 private:
  std::vector<diagnostics::Problem> problems_;
};

}  // namespace whorl::compile
