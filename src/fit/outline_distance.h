// SPDX-License-Identifier: Apache-2.0
// How far traced points lie from a form's outlines.
#pragma once

#include "fit/form.h"
#include "specimen/measurement_file.h"

#include <vector>

namespace whorl::fit {

/// Where a picture lies: the axis' foot at the pole's depth in the picture's coordinates, mm, and how far the axis leans, radians.
struct Placement {
  double x = 0.0, y = 0.0, tilt = 0.0;
};

/// Signed distances of the outline's points, mm: positive outside, or on the apical side of a suture; infinite where no suture shows. Right to second order near the outline.
/// The tube is the union of its sections, so its silhouette is the edge of the union of their projections: a point's
/// distance is the least over all sections. Front and lip stand upright.
void outline_distances(const Form& form, const specimen::TracedOutline& outline, const Placement& placement, bool sinistral,
                       std::vector<double>& distances);

/// A placement that puts the form's box on that of the points; and by which factor the points are larger.
Placement boxed_placement(const Form& form, const specimen::TracedOutline& outline, bool sinistral);
double boxed_scale(const Form& form, const specimen::TracedOutline& outline);

}  // namespace whorl::fit
