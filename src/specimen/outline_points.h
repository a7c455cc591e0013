// SPDX-License-Identifier: Apache-2.0
// Traced points, from a small table of their own.
#pragma once

#include "specimen/measurement_file.h"
#include "specimen/problem_list.h"

namespace whorl::specimen {

/// The points that are not marked as missing, as they stand in the file, which lies beside the measurement file `source`.
/// Complains at the place where the file is named. Throws FileTrouble where it cannot be read.
std::vector<TracedOutline::Point> read_outline_points(const std::string& source, const Stated<std::string>& file, ProblemList& problems);

}  // namespace whorl::specimen
