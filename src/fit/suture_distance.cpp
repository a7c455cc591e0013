// SPDX-License-Identifier: Apache-2.0
// Sutures followed over the front half of each whorl.
#include "fit/suture_distance.h"

#include "fit/whorl_ellipse.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace whorl::fit {

SutureLines::SutureLines(const Form& form, double right) {
  constexpr int kChords = 36;  // over half a turn
  const growth::CoilingLaw& law = form.law;
  const double first = law.theta_start + kTwoPi;  // the whorl before is tube, too
  // Growth at the lip runs towards the reader of the apertural view: azimuths of the half turn after `right` face him.
  for (double turn = std::floor((law.theta_lip - right) / kTwoPi);; turn -= 1.0) {
    const double from = std::max(right + kTwoPi * turn, first), to = std::min(right + kTwoPi * turn + kPi, law.theta_lip);
    if (right + kTwoPi * turn + kPi < first) break;
    if (!(to > from)) continue;
    const int count = std::max(1, static_cast<int>(std::ceil((to - from) / kPi * kChords)));
    std::optional<growth::HalfPlanePoint> before;
    for (int i = 0; i <= count; ++i) {
      const double theta = from + (to - from) * i / count;
      auto here = suture_point(WhorlEllipse(law, theta), WhorlEllipse(law, theta - kTwoPi));
      if (here) here->rho *= std::cos(theta - right);
      // From right to left in the picture, so that the apical side lies to one hand.
      if (before && here) chords_.push_back({before->rho, before->z, here->rho, here->z});
      before = here;
    }
  }
}

double SutureLines::distance(double x, double z) const {
  double least = std::numeric_limits<double>::infinity(), signed_least = least;
  for (const Chord& c : chords_) {
    const double dx = c.x1 - c.x0, dz = c.z1 - c.z0, length2 = dx * dx + dz * dz;
    const double along = length2 > 0.0 ? std::clamp(((x - c.x0) * dx + (z - c.z0) * dz) / length2, 0.0, 1.0) : 0.0;
    const double away = std::hypot(x - c.x0 - along * dx, z - c.z0 - along * dz);
    if (away >= least) continue;
    least = away;
    signed_least = std::copysign(away, (z - c.z0) * dx - (x - c.x0) * dz);
  }
  return signed_least;
}

}  // namespace whorl::fit
