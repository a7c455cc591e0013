// SPDX-License-Identifier: Apache-2.0
// Roots between two places of opposite sign, and extremes of functions with one hump, to near machine precision.
#pragma once

#include <cmath>

namespace whorl {

/// The place in [a, b] where f changes sign; fa = f(a), fb = f(b) differ in sign. Regula falsi with the Illinois step
/// (Dowell & Jarratt 1971, BIT 11: 168-174), which keeps the bracket and converges faster than bisection.
template <class F>
double bracketed_root(const F& f, double a, double b, double fa, double fb) {
  constexpr int kRounds = 100;
  constexpr double kFinest = 1e-15;
  int side = 0;
  for (int i = 0; i < kRounds && std::abs(b - a) > kFinest * (std::abs(a) + std::abs(b) + 1e-300); ++i) {
    if (fa == 0.0) return a;
    if (fb == 0.0) return b;
    double m = (fa * b - fb * a) / (fa - fb);
    if (!(m > std::fmin(a, b) && m < std::fmax(a, b))) m = 0.5 * (a + b);
    const double fm = f(m);
    if ((fm > 0.0) == (fb > 0.0)) {
      b = m;
      fb = fm;
      if (side == -1) fa *= 0.5;
      side = -1;
    } else {
      a = m;
      fa = fm;
      if (side == 1) fb *= 0.5;
      side = 1;
    }
  }
  return std::abs(fa) < std::abs(fb) ? a : b;
}

/// The greatest value of f on [a, b], where it has one hump. Golden section down to the square root of machine precision:
/// the value is then exact to rounding.
template <class F>
double greatest_value(const F& f, double a, double b) {
  constexpr double kGolden = 0.6180339887498949;
  constexpr double kFinest = 1e-8;
  double x = b - kGolden * (b - a), y = a + kGolden * (b - a), fx = f(x), fy = f(y);
  while (b - a > kFinest) {
    if (fx < fy) {
      a = x;
      x = y;
      fx = fy;
      y = a + kGolden * (b - a);
      fy = f(y);
    } else {
      b = y;
      y = x;
      fy = fx;
      x = b - kGolden * (b - a);
      fx = f(x);
    }
  }
  return std::fmax(fx, fy);
}

}  // namespace whorl
