// SPDX-License-Identifier: Apache-2.0
// How large a shell of a given law is, taken on the outlines: for solving the stated size and for framing views.
#pragma once

#include "growth/outline.h"
#include "growth/sculpture.h"

#include <vector>

namespace whorl::growth {

/// The outside of a shell: everything that decides its overall dimensions.
struct Exterior {
  CoilingLaw law;
  PeriodicSpline reach;
  double tan_inclination = 0.0;
  Sculpture sculpture{};  // raises the surface points, not the mouth: apertures are measured on the plain outline
};

/// The embryonic shell closes the apex: an ellipsoid of revolution on the axis that reaches past the centre of the first section.
struct ChamberShape {
  double centre_z, radius, half_height;
};
ChamberShape embryonic_chamber(const CoilingLaw& law);

/// Growth angle at which the growth front that stands at `theta_lip` crosses the line of section angle `psi`.
double front_theta(const Exterior& shell, double psi);

/// The mouth at the growth front, lip included: what of the last whorl is not covered by earlier shell.
struct Mouth {
  double height = 0.0;  // extent along the axis
  double width = 0.0;   // extent away from the axis, in the half-planes through it
};
Mouth mouth(const Exterior& shell);

/// Points on the outer surface of tube and embryonic shell, `turn_steps` a whorl by `around` a section, the rim included.
std::vector<Vec3> surface_points(const Exterior& shell, int turn_steps, int around);

/// Extent along the axis, and greatest extent across it in any direction.
double height_of(const std::vector<Vec3>& points);
double width_of(const std::vector<Vec3>& points);

}  // namespace whorl::growth
