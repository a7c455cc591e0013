// SPDX-License-Identifier: Apache-2.0
// Closed intervals: ranges of a quantity over a box. Empty intervals do not occur.
#pragma once

#include <algorithm>
#include <cmath>

namespace whorl {

struct Interval {
  double lo = 0.0, hi = 0.0;

  Interval() = default;
  explicit Interval(double v) : lo(v), hi(v) {}
  Interval(double l, double h) : lo(l), hi(h) {}

  bool contains(double v) const { return lo <= v && v <= hi; }
  double width() const { return hi - lo; }
  /// Largest absolute value.
  double magnitude() const { return std::max(std::abs(lo), std::abs(hi)); }
};

inline Interval operator+(Interval a, Interval b) { return {a.lo + b.lo, a.hi + b.hi}; }
inline Interval operator-(Interval a, Interval b) { return {a.lo - b.hi, a.hi - b.lo}; }
inline Interval operator-(Interval a) { return {-a.hi, -a.lo}; }
inline Interval operator*(Interval a, Interval b) {
  const double p = a.lo * b.lo, q = a.lo * b.hi, r = a.hi * b.lo, s = a.hi * b.hi;
  return {std::min({p, q, r, s}), std::max({p, q, r, s})};
}
inline Interval operator*(double k, Interval a) { return k >= 0.0 ? Interval(k * a.lo, k * a.hi) : Interval(k * a.hi, k * a.lo); }
inline Interval square(Interval a) {
  const double p = a.lo * a.lo, q = a.hi * a.hi;
  return {a.contains(0.0) ? 0.0 : std::min(p, q), std::max(p, q)};
}
/// a / b for b strictly positive.
inline Interval over_positive(Interval a, Interval b) {
  return {a.lo >= 0.0 ? a.lo / b.hi : a.lo / b.lo, a.hi >= 0.0 ? a.hi / b.lo : a.hi / b.hi};
}
inline Interval hull(Interval a, Interval b) { return {std::min(a.lo, b.lo), std::max(a.hi, b.hi)}; }

}  // namespace whorl
