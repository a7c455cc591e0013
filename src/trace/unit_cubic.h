// SPDX-License-Identifier: Apache-2.0
// Roots of a cubic on [0, 1], from its values at 0, 1/3, 2/3 and 1.
#pragma once

#include "trace/cubic.h"

#include <algorithm>

namespace whorl::trace {

/// A cubic on [0, 1] in Bernstein form: its graph lies in the convex hull of the coefficients, so equal signs mean no root.
struct UnitCubic {
  float b0, b1, b2, b3;

  /// Through values at 0, 1/3, 2/3, 1.
  static UnitCubic through(Float4 v) {
    return {v[0], (-5.0f * v[0] + 18.0f * v[1] - 9.0f * v[2] + 2.0f * v[3]) * (1.0f / 6.0f),
            (2.0f * v[0] - 9.0f * v[1] + 18.0f * v[2] - 5.0f * v[3]) * (1.0f / 6.0f), v[3]};
  }
  bool one_sign() const {
    return (b0 > 0.0f && b1 > 0.0f && b2 > 0.0f && b3 > 0.0f) || (b0 <= 0.0f && b1 <= 0.0f && b2 <= 0.0f && b3 <= 0.0f);
  }
  float value(float s) const {
    const float r = 1.0f - s;
    return r * r * (r * b0 + 3.0f * s * b1) + s * s * (3.0f * r * b2 + s * b3);
  }
  float slope(float s) const {
    const float r = 1.0f - s;
    return 3.0f * (r * r * (b1 - b0) + 2.0f * r * s * (b2 - b1) + s * s * (b3 - b2));
  }
};

/// The root in a bracket where the cubic changes sign: Newton, safeguarded by bisection, to the float limit.
inline float bracketed_root(const UnitCubic& c, float lo, float hi, float f_lo, float f_hi) {
  float s = std::min(std::max(lo - f_lo * (hi - lo) / (f_hi - f_lo), lo), hi);
  for (int i = 0; i < 24; ++i) {
    const float f = c.value(s);
    if (f == 0.0f) return s;
    ((f > 0.0f) == (f_lo > 0.0f) ? lo : hi) = s;
    const float d = c.slope(s);
    float next = s - f / d;
    if (!(next > lo && next < hi)) next = 0.5f * (lo + hi);
    if (std::abs(next - s) < 1.2e-7f || next == lo || next == hi) return next;
    s = next;
  }
  return s;
}

/// The root of a cubic whose coefficients rise, or fall, all the way, and whose ends differ in sign: Newton until its next step
/// is lost in rounding by its own bound, e' <= e^2 max|f''| / (2 min|f'|), both from the coefficients.
inline float monotone_root(const UnitCubic& c) {
  const float d0 = c.b1 - c.b0, d1 = c.b2 - c.b1, d2 = c.b3 - c.b2;
  const float least_slope = 3.0f * std::min(std::min(std::abs(d0), std::abs(d1)), std::abs(d2));
  const float bend = 6.0f * std::max(std::abs(d1 - d0), std::abs(d2 - d1));
  constexpr float kRounding = 3e-8f;  // half a unit in the last place at 1/2
  float s = c.b0 / (c.b0 - c.b3);
  for (int i = 0; i < 5; ++i) {
    const float step = c.value(s) / c.slope(s);
    s = std::min(std::max(s - step, 0.0f), 1.0f);
    if (bend * step * step <= 2.0f * kRounding * least_slope) return s;
  }
  return bracketed_root(c, 0.0f, 1.0f, c.b0, c.b3);
}

/// All places in [0, 1] where the cubic changes sign, in order; at most three. Ends are not places.
inline int sign_changes(const UnitCubic& c, float out[3]) {
  if (c.one_sign()) return 0;
  if ((c.b0 < c.b1 && c.b1 < c.b2 && c.b2 < c.b3) || (c.b0 > c.b1 && c.b1 > c.b2 && c.b2 > c.b3)) {  // monotone
    if ((c.b0 > 0.0f) == (c.b3 > 0.0f)) return 0;
    out[0] = monotone_root(c);
    return 1;
  }
  // Stationary points part the interval into monotone pieces.
  const float a = c.b3 - 3.0f * (c.b2 - c.b1) - c.b0, b = 2.0f * (c.b2 - 2.0f * c.b1 + c.b0), e = c.b1 - c.b0;
  float at[4] = {0.0f, 1.0f, 1.0f, 1.0f};
  int pieces = 1;
  const float disc = b * b - 4.0f * a * e;  // slope / 3 = a s^2 + b s + e
  if (disc > 0.0f) {
    const float q = -0.5f * (b + std::copysign(std::sqrt(disc), b));
    float r1 = a != 0.0f ? q / a : 2.0f, r2 = q != 0.0f ? e / q : 2.0f;
    if (r1 > r2) {
      const float swap = r1;
      r1 = r2;
      r2 = swap;
    }
    if (r1 > 0.0f && r1 < 1.0f) at[pieces++] = r1;
    if (r2 > 0.0f && r2 < 1.0f && r2 != r1) at[pieces++] = r2;
    at[pieces] = 1.0f;
  }
  int count = 0;
  float f_lo = c.b0;
  for (int i = 0; i < pieces; ++i) {
    const float f_hi = i + 1 == pieces ? c.b3 : c.value(at[i + 1]);
    if ((f_lo > 0.0f) != (f_hi > 0.0f)) out[count++] = bracketed_root(c, at[i], at[i + 1], f_lo, f_hi);
    f_lo = f_hi;
  }
  return count;
}

}  // namespace whorl::trace
