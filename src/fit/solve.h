// SPDX-License-Identifier: Apache-2.0
// Least squares within bounds, from several starts.
#pragma once

#include "fit/task.h"

#include <optional>
#include <vector>

namespace whorl::fit {

struct Solution {
  Trial trial;
  double chi_square = 0.0;  // sum of squared residuals, each in its standard errors
  bool converged = false;
};

/// From one start. Empty where the start makes no shell or lacks a measure.
std::optional<Solution> solve_from(const Task& task, const Trial& start);

/// From the best of many shapes over the morphospace, by a low-discrepancy sequence; `known` is where held and counted
/// parameters stand. Distinct minima, the best first; empty where no shape has all the measures.
std::vector<Solution> solve(const Task& task, const Trial& known);

}  // namespace whorl::fit
