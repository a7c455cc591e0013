// SPDX-License-Identifier: Apache-2.0
// The coiling law: growth angle -> place, size and frame of the whorl section in the half-plane through the axis.
#pragma once

#include "growth/expansion.h"
#include "math/vec.h"

namespace whorl::growth {

/// Where the whorl section is at one growth angle. Millimetres, or units of the half-breadth at the lip.
struct Station {
  double distance;      // of the section's centre from the axis
  double depth;         // of the section's centre below the pole, towards +z
  double half_breadth;  // of the section across the axis
};

/// A point of the half-plane through the axis: distance from the axis and depth towards +z.
struct HalfPlanePoint {
  double rho, z;
};

/// Section coordinates: the section's ellipse is the unit circle; x away from the axis, y towards the apex (unrolled).
/// The section angle is atan2(y, x).
struct SectionPoint {
  double x, y;
};

/// Raup's parameters with expansion by stages (Raup 1966, J. Paleontology 40(5): 1178-1190; centre-line form with the
/// pole at the origin). Dextral; growth towards +z. Angles in radians, lengths in one unit chosen by `half_breadth`.
struct CoilingLaw {
  double theta_lip = 0.0;    // growth angle of the lip, from the pole
  double theta_start = 0.0;  // where the embryonic cap ends and the tube begins
  double distance = 0.0, depth = 0.0, half_breadth = 1.0;  // at the lip
  double S = 1.0;            // section height / breadth
  double roll_cos = 1.0, roll_sin = 0.0;
  Expansion by_distance, by_depth, by_section;

  Station at(double theta) const {
    if (one_expansion) {
      const double g = by_section.factor(theta);
      return {distance * g, depth * g, half_breadth * g};
    }
    return {distance * by_distance.factor(theta), depth * by_depth.factor(theta),
            half_breadth * by_section.factor(theta)};
  }
  SectionPoint to_section(const Station& s, HalfPlanePoint p) const {
    const double u = p.rho - s.distance, v = s.depth - p.z;
    return {(u * roll_cos - v * roll_sin) / s.half_breadth, (u * roll_sin + v * roll_cos) / (S * s.half_breadth)};
  }
  HalfPlanePoint to_half_plane(const Station& s, SectionPoint q) const {
    const double x = q.x * s.half_breadth, y = q.y * S * s.half_breadth;
    return {s.distance + x * roll_cos + y * roll_sin, s.depth + x * roll_sin - y * roll_cos};
  }
  /// Rate of change of section coordinates with the growth angle, for a point at rest in the half-plane.
  SectionPoint drift(double theta, const Station& s, SectionPoint q) const;

  bool one_expansion = true;  // distance, depth and section share one expansion
};

/// From the scene file's growth and section tables, in units of the half-breadth at the lip.
CoilingLaw coiling_law(const specimen::Growth& growth, const specimen::Section& section);

/// The same law with every length times `factor`.
CoilingLaw scaled(CoilingLaw law, double factor);

}  // namespace whorl::growth
