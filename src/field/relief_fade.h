// SPDX-License-Identifier: Apache-2.0
// Where sculpture counts in full: round the surface, not at the centre line and not at the support's end.
#pragma once

#include "growth/sculpture.h"
#include "math/falloff.h"
#include "math/interval.h"

#include <algorithm>

namespace whorl::field {

/// Squared distances from the centre line, in outlines: none below kInnerNone, in full from kInnerFull to kOuterFull, none from
/// kOuterNone on, which is within the support of the stations (1.44^2).
inline constexpr double kInnerNone = 0.1, kInnerFull = 0.4, kOuterFull = 1.6, kOuterNone = 2.05;
static_assert((1.0 + growth::kHighestRelief) * (1.0 + growth::kHighestRelief) < kOuterFull);
inline constexpr double kSteepestFade = kSteepestSmoothStep / (kInnerFull - kInnerNone);

inline double relief_fade(double t2) {
  return smooth_step((t2 - kInnerNone) / (kInnerFull - kInnerNone)) * smooth_step((kOuterNone - t2) / (kOuterNone - kOuterFull));
}

/// It rises once and falls once.
inline Interval relief_fade(Interval t2) {
  const double a = relief_fade(t2.lo), b = relief_fade(t2.hi), top = relief_fade(std::clamp(1.0, t2.lo, t2.hi));
  return {std::min(a, b), std::max({a, b, top})};
}

}  // namespace whorl::field
