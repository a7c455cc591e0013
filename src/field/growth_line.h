// SPDX-License-Identifier: Apache-2.0
// Growth counted along growth lines: when the lip stood at a place.
#pragma once

#include "field/field.h"

#include <cmath>

namespace whorl::field {

/// Whorls from the pole at a place of the passage `theta`.
inline double whorl_at(const Field& field, const Vec3& p, double theta) {
  constexpr int kRounds = 14;  // the front's lead depends on where it stood; steps swing from side to side, so each goes half its way
  double growth, around;
  field.coordinates(p, theta, growth, around);
  const scene::Scene& scene = field.scene();
  double stood = growth;
  for (int round = 0; round < kRounds && scene.front.tan_inclination != 0.0; ++round)
    stood = 0.5 * (stood + growth - growth::front_lead(scene.front.tan_inclination, scene.law.at(stood).depth, {std::hypot(p.x, p.y), p.z}));
  return stood / kTwoPi;
}

/// Whorls from the pole of the section whose centre lies at depth `z`, the embryonic shell's end and the lip at the outermost.
inline double whorl_at_depth(const scene::Scene& scene, double z) {
  double lo = scene.law.theta_start, hi = scene.law.theta_lip;
  for (int i = 0; i < 50; ++i) {
    const double mid = 0.5 * (lo + hi);
    (scene.law.at(mid).depth < z ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi) / kTwoPi;
}

}  // namespace whorl::field
