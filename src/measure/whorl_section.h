// SPDX-License-Identifier: Apache-2.0
// Outlines of whorls in a half-plane through the axis, found on the field.
#pragma once

#include "field/field.h"

#include <vector>

namespace whorl::measure {

/// A closed outline in a half-plane through the axis (rho, z), by even steps of direction from a point inside.
struct WhorlSection {
  std::vector<growth::HalfPlanePoint> points;
  growth::HalfPlanePoint inside{};
  double rho_min = 0.0, rho_max = 0.0, z_min = 0.0, z_max = 0.0;

  bool empty() const { return points.empty(); }
  /// Greatest n . p over the outline, n = (n_rho, n_z).
  double support(double n_rho, double n_z) const;
};

/// The outside of the tube at growth angle `theta`, also where it is overlapped or fused with the columella.
WhorlSection whorl_section(const field::Field& field, double theta);
/// The lumen of the tube there: the internal mould's outline.
WhorlSection lumen_section(const field::Field& field, double theta);

/// Semi-angle, in radians from the axis towards growth, of the straight line that touches both outlines on the apical
/// side of the shell's outside: of the enveloping cone's generator.
double touching_angle(const WhorlSection& last, const WhorlSection& before);

}  // namespace whorl::measure
