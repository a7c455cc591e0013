// SPDX-License-Identifier: Apache-2.0
// Readers of the two forms of a measurement file.
#pragma once

#include "specimen/measurement_file.h"
#include "specimen/problem_list.h"

namespace whorl::specimen {

/// One specimen, in TOML. Throws InvalidInput where the text is not TOML; other faults go to the list.
MeasuredSpecimen read_measurement_toml(const std::string& text, const std::string& source, ProblemList& problems);

/// Many specimens, a row a reading, the columns named in the header.
std::vector<MeasuredSpecimen> read_measurement_csv(const std::string& text, ProblemList& problems);

}  // namespace whorl::specimen
