// SPDX-License-Identifier: Apache-2.0
// A smooth closed curve r(angle): a uniform cubic B-spline of period 2 pi that passes through given samples.
#pragma once

#include "math/interval.h"

#include <cstddef>
#include <vector>

namespace whorl {

/// Twice continuously differentiable. A constant curve is stored as one number and reproduced exactly.
class PeriodicSpline {
 public:
  PeriodicSpline() = default;
  explicit PeriodicSpline(double constant) : coefficients_{constant} {}
  /// Through `samples[i]` at angle 2 pi i / n, n >= 4 (or n = 1, a constant). Samples that differ by less than
  /// a part in 1e13 are a constant.
  explicit PeriodicSpline(const std::vector<double>& samples);

  bool is_constant() const { return coefficients_.size() == 1; }
  std::size_t sample_count() const { return coefficients_.size(); }
  /// Any angle in radians, of any turn.
  double value(double angle) const;
  /// Value and derivative by the angle.
  void value_and_slope(double angle, double& value, double& slope) const;
  /// Bounds of the value over the angles [from, from + span], span >= 0. By the convex hull of the coefficients:
  /// never too narrow.
  Interval bounds(double from, double span) const;
  Interval bounds() const;
  /// An upper bound of the derivative's absolute value, over all angles or over [from, from + span].
  double slope_bound() const;
  double slope_bound(double from, double span) const;

  /// Whether no coefficient differs by more than `tolerance`, times its size.
  bool close_to(const PeriodicSpline& other, double tolerance) const;
  bool operator==(const PeriodicSpline&) const = default;

 private:
  std::vector<double> coefficients_{1.0};
};

}  // namespace whorl
