// SPDX-License-Identifier: Apache-2.0
// Overall dimensions and mouth of a form, on its outlines, fast and smooth enough to be differentiated by differences.
#pragma once

#include "fit/form.h"

#include <optional>

namespace whorl::fit {

/// The shell as it was when the growth front stood at `theta_front`. Lengths in mm.
double shell_height(const Form& form, double theta_front);
double shell_width(const Form& form, double theta_front);
/// Depth of the apex and of the most basal point.
double apex_depth(const Form& form, double theta_front);
double base_depth(const Form& form, double theta_front);

struct MouthExtents {
  double height = 0.0, width = 0.0;           // along the axis, and across it in the half-planes through it
  double longest = 0.0, across_longest = 0.0;  // the greatest length in any direction, and square to it
};
/// The opening at the growth front: what lies inside the last whorl and outside the earlier ones, lip included. Empty
/// where earlier whorls cover all of it. `longest` is left out unless asked for.
std::optional<MouthExtents> mouth_extents(const Form& form, double theta_front, bool with_longest);

/// Growth angle and place where the growth front crosses section angle `psi`.
struct FrontPoint {
  double theta;
  growth::HalfPlanePoint at;
};
FrontPoint front_point(const Form& form, double theta_front, double psi);

}  // namespace whorl::fit
