// SPDX-License-Identifier: Apache-2.0
// The outside of one whorl section, an ellipse in the half-plane through the axis, in closed forms.
#pragma once

#include "growth/coiling_law.h"

#include <optional>

namespace whorl::fit {

/// Coordinates as in growth: rho away from the axis, z from the pole towards growth. Lengths in the law's unit.
class WhorlEllipse {
 public:
  WhorlEllipse(const growth::CoilingLaw& law, double theta);

  /// Greatest n . p over the outline, n = (n_rho, n_z) a unit vector, and where it is reached.
  double support(double n_rho, double n_z) const;
  growth::HalfPlanePoint support_point(double n_rho, double n_z) const;
  double outer() const { return support(1.0, 0.0); }
  double inner() const { return -support(-1.0, 0.0); }
  double top() const { return -support(0.0, -1.0); }    // towards the apex
  double bottom() const { return support(0.0, 1.0); }   // towards the base

  growth::HalfPlanePoint point(double psi) const;
  /// Section angle of a point, from its direction in section coordinates.
  double angle_of(growth::HalfPlanePoint p) const;
  /// Below 1 inside, 1 on the outline, in units of the distance to the centre.
  double level(growth::HalfPlanePoint p) const;
  /// Distance of the outer flank from the axis at a depth; empty above the top and below the bottom.
  std::optional<double> flank_at(double z) const;
  growth::HalfPlanePoint centre() const { return {station_.distance, station_.depth}; }

 private:
  growth::Station station_;
  double a_, b_, c_, s_;  // semi-axes; cosine and sine of the roll
};

/// The suture between two whorls on their outer flank, seen from the side: where the later whorl's flank comes out from
/// behind the earlier one's. Where they do not meet, it is the later whorl's upper edge. Empty where the later whorl hides
/// the earlier one.
std::optional<growth::HalfPlanePoint> suture_point(const WhorlEllipse& later, const WhorlEllipse& earlier);

/// The umbilical seam, seen from the base: where the later whorl's outline, followed from its most basal point towards the
/// axis, meets the earlier whorl; its inner margin where it does not.
growth::HalfPlanePoint umbilical_seam(const WhorlEllipse& later, const WhorlEllipse& earlier);

}  // namespace whorl::fit
