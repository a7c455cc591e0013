// SPDX-License-Identifier: Apache-2.0
// How far the solid reaches in a direction.
#pragma once

#include "trace/embree_solid.h"

namespace whorl::measure {

/// Greatest p . n over the solid, n a unit vector. Rays against n on a grid of `grid` by `grid`, the highest of them then
/// climbed to a millionth of the shell's height.
double support(const trace::EmbreeSolid& solid, const Vec3& n, int grid);

/// Greatest extent across the axis of coiling, in any direction (two parallel jaws).
double width_across_axis(const trace::EmbreeSolid& solid);

}  // namespace whorl::measure
