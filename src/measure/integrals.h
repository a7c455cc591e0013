// SPDX-License-Identifier: Apache-2.0
// Volumes and areas of the solid by random lines.
#pragma once

#include "math/sobol.h"
#include "measure/measurements.h"

#include <array>

namespace whorl::measure {

/// An isotropic uniform line through a sphere, for numbers u in [0, 1); it starts outside.
trace::Ray isotropic_line(const Vec3& centre, double radius, const std::array<float, kSobolDimensions>& u);

struct Integrals {
  Measured outer_volume, lumen_volume, wall_volume, outer_area, inner_area;
};

/// Integral geometry (Cauchy, Crofton; Santalo 1976, Integral Geometry and Geometric Probability): for isotropic uniform
/// lines through a sphere of radius R, a body's volume is pi R^2 times the mean length inside it and a surface's area is
/// 2 pi R^2 times the mean number of crossings. Directions and places are Owen-scrambled Sobol points; the errors are
/// standard errors from independent scramblings.
Integrals integrate(const trace::EmbreeSolid& solid, const MeasureOptions& options);

}  // namespace whorl::measure
