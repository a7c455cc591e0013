// SPDX-License-Identifier: Apache-2.0
// Volumes and areas of the solid by random lines.
#pragma once

#include "measure/measurements.h"

namespace whorl::measure {

struct Integrals {
  Measured outer_volume, lumen_volume, wall_volume, outer_area, inner_area;
};

/// Integral geometry (Cauchy, Crofton; Santalo 1976, Integral Geometry and Geometric Probability): for isotropic uniform
/// lines through a sphere of radius R, a body's volume is pi R^2 times the mean length inside it and a surface's area is
/// 2 pi R^2 times the mean number of crossings. Directions and places are Owen-scrambled Sobol points; the errors are
/// standard errors from independent scramblings.
Integrals integrate(const trace::EmbreeSolid& solid, const MeasureOptions& options);

}  // namespace whorl::measure
