// SPDX-License-Identifier: Apache-2.0
// How well the readings fix the free numbers at a solution, and which further measure would fix what they leave open.
#pragma once

#include "fit/task.h"

#include <string>
#include <vector>

namespace whorl::fit {

struct Knowledge {
  std::vector<std::size_t> indices;   // parameter of each free number; kParameterCount for a series' scale
  Eigen::MatrixXd covariance;         // of the free numbers, from the readings' standard errors
  Eigen::VectorXd leverage;           // of each reading: how many free numbers it takes up
  double weakest = 0.0;               // uncertainty of the least known direction, in plausible widths
  Eigen::VectorXd weakest_direction;  // unit vector, free numbers in plausible widths
};

/// Singular values of the scaled Jacobian tell what is fixed. False where the derivatives can't be taken.
bool knowledge_at(const Task& task, const Trial& trial, Knowledge& result);

/// The measures, at most three, that would fix a parameter best if it were free beside those that are; best first.
std::vector<std::string> would_fix(const Task& task, const Trial& trial, Parameter parameter);

}  // namespace whorl::fit
