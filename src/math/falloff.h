// SPDX-License-Identifier: Apache-2.0
// Smooth kernels and steps between 0 and 1.
#pragma once

#include <algorithm>

namespace whorl {

/// Wyvill's kernel (1 - u^2)^3 of the squared distance, 0 from u^2 = 1 on: 1 in the middle, no edge, no kink.
/// G. Wyvill, C. McPheeters, B. Wyvill, Data structure for soft objects, The Visual Computer 2 (1986).
inline double wyvill(double u2) {
  const double v = std::max(0.0, 1.0 - u2);
  return v * v * v;
}
/// Greatest absolute slope by u: 6 u (1 - u^2)^2 at u^2 = 1/5.
inline constexpr double kSteepestWyvill = 1.71731;

/// From 0 at x <= 0 to 1 at x >= 1 with first and second derivatives 0 at both ends: x^3 (x (6 x - 15) + 10).
inline double smooth_step(double x) {
  const double t = std::clamp(x, 0.0, 1.0);
  return t * t * t * (t * (6.0 * t - 15.0) + 10.0);
}
/// Greatest slope, at x = 1/2.
inline constexpr double kSteepestSmoothStep = 1.875;

}  // namespace whorl
