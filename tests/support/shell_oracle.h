// SPDX-License-Identifier: Apache-2.0
// What a shell of a law must look like, found by plain search on the law itself, apart from the program's own ways.
#pragma once

#include "growth/extents.h"

namespace whorl::test {

/// Overall dimensions of the outside, to about 1e-6 of them.
double searched_height(const growth::Exterior& shell);
double searched_width(const growth::Exterior& shell);
/// Extents of the mouth along and across the axis: what lies inside the last whorl's outline where the growth front passes,
/// and outside the outlines of all earlier whorls.
struct MouthExtents {
  double height, width;
};
MouthExtents searched_mouth(const growth::Exterior& shell);

/// The place of the tube's outer surface that is nearest to a point, looked for around a growth angle.
struct Foot {
  double theta, psi, distance;
};
Foot nearest_on_tube(const growth::CoilingLaw& law, const PeriodicSpline& reach, const Vec3& p, double theta);

}  // namespace whorl::test
