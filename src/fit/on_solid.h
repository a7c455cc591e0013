// SPDX-License-Identifier: Apache-2.0
// The final answer of a fit, measured back on the solid.
#pragma once

#include "fit/report.h"
#include "trace/embree_solid.h"

namespace whorl::fit {

/// For each reading what the solid measures under its definition; empty for definitions that have no method on the solid.
/// The surface cells, which lengths over the whole shell need, are built if such a length was read.
OnSolid measured_on_solid(const Fit& fit, const field::Field& field, const trace::SolidOptions& cells);

/// Adds a remark for every reading whose prediction differs from the solid's by more than 0.1 % of the shell's height or width.
void compare_with_solid(Fit& fit, const OnSolid& on_solid);

}  // namespace whorl::fit
