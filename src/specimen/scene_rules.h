// SPDX-License-Identifier: Apache-2.0
// Rules between keys that need no geometry.
#pragma once

#include "specimen/problem_list.h"
#include "specimen/specimen.h"

namespace whorl::specimen {

/// Numbers that could not be read are NaN and break no rule.
void check_rules(const Specimen& specimen, ProblemList& problems);

}  // namespace whorl::specimen
