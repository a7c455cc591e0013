// SPDX-License-Identifier: Apache-2.0
// Where sculpture counts in full: round the surface, not at the centre line and not at the support's end.
#pragma once

#include "math/interval.h"

#include <algorithm>

namespace whorl::field {

/// Squared distances from the centre line, in outlines: none below kInnerNone, in full from kInnerFull to kOuterFull, none from
/// kOuterNone on, which is within the support of the stations (1.44^2).
inline constexpr double kInnerNone = 0.1, kInnerFull = 0.4, kOuterFull = 1.6, kOuterNone = 2.05;
/// A length of t^2 = kOuterFull is that much of its unit below zero: sculpture may rise so high.
inline constexpr double kHighestRelief = 0.24;
inline constexpr double kSteepestFade = 1.875 / (kInnerFull - kInnerNone);

inline double relief_fade(double t2) {
  const auto step = [](double x) {
    const double t = std::clamp(x, 0.0, 1.0);
    return t * t * t * (t * (6.0 * t - 15.0) + 10.0);
  };
  return step((t2 - kInnerNone) / (kInnerFull - kInnerNone)) * step((kOuterNone - t2) / (kOuterNone - kOuterFull));
}

/// It rises once and falls once.
inline Interval relief_fade(Interval t2) {
  const double a = relief_fade(t2.lo), b = relief_fade(t2.hi), top = relief_fade(std::clamp(1.0, t2.lo, t2.hi));
  return {std::min(a, b), std::max({a, b, top})};
}

}  // namespace whorl::field
