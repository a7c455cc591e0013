// SPDX-License-Identifier: Apache-2.0
// Periodic cubic B-splines: interpolation by the recursive prefilter, evaluation, hull bounds.
#include "math/periodic_spline.h"

#include "math/vec.h"

#include <cstddef>

namespace whorl {
namespace {

// Interpolation with cubic B-splines: c = inverse filter of (1/6, 4/6, 1/6), as a causal and an anticausal pass.
// Method: Unser, Aldroubi, Eden 1993, B-spline signal processing, IEEE Trans. Signal Process. 41(2).
std::vector<double> prefilter(std::vector<double> s) {
  const double pole = std::sqrt(3.0) - 2.0;
  const std::size_t n = s.size();
  double start = 0.0, power = 1.0;
  for (std::size_t i = 0; i < n; ++i) {
    start += power * s[(n - i) % n];
    power *= pole;
  }
  s[0] = start / (1.0 - power);
  for (std::size_t i = 1; i < n; ++i) s[i] += pole * s[i - 1];
  double end = 0.0;
  power = 1.0;
  for (std::size_t i = 0; i < n; ++i) {
    end += power * s[(n - 1 + i) % n];
    power *= pole;
  }
  s[n - 1] = -pole * end / (1.0 - power);
  for (std::size_t i = n - 1; i-- > 0;) s[i] = pole * (s[i + 1] - s[i]);
  for (double& c : s) c *= 6.0;
  return s;
}

}  // namespace

PeriodicSpline::PeriodicSpline(const std::vector<double>& samples) {
  const auto [lo, hi] = std::minmax_element(samples.begin(), samples.end());
  constexpr double kSameWithin = 1e-13;  // a few roundings of the samples' own arithmetic
  if (samples.size() < 4 || *hi - *lo <= kSameWithin * std::abs(*hi))
    coefficients_ = {samples.front()};
  else
    coefficients_ = prefilter(samples);
}

double PeriodicSpline::value(double angle) const {
  double v, slope;
  value_and_slope(angle, v, slope);
  return v;
}

void PeriodicSpline::value_and_slope(double angle, double& value, double& slope) const {
  if (is_constant()) {
    value = coefficients_[0];
    slope = 0.0;
    return;
  }
  const auto n = static_cast<std::ptrdiff_t>(coefficients_.size());
  const double per_radian = static_cast<double>(n) / kTwoPi;
  const double x = angle * per_radian, floor_x = std::floor(x), f = x - floor_x;
  std::ptrdiff_t i = static_cast<std::ptrdiff_t>(floor_x) % n;
  if (i < 0) i += n;
  const auto at = [&](std::ptrdiff_t k) {
    if (k < 0) k += n;
    if (k >= n) k -= n;
    return coefficients_[static_cast<std::size_t>(k)];
  };
  const double a = at(i - 1), b = at(i), c = at(i + 1), d = at(i + 2);
  const double g = 1.0 - f, f2 = f * f;
  value = (a * g * g * g + b * (4.0 + f2 * (3.0 * f - 6.0)) + c * (4.0 + g * g * (3.0 * g - 6.0)) + d * f2 * f) / 6.0;
  slope = 0.5 * per_radian * (-a * g * g + b * (3.0 * f2 - 4.0 * f) + c * (1.0 + 2.0 * f - 3.0 * f2) + d * f2);
}

Interval PeriodicSpline::bounds(double from, double span) const {
  if (is_constant()) return Interval(coefficients_[0]);
  const auto n = static_cast<std::ptrdiff_t>(coefficients_.size());
  const double per_radian = static_cast<double>(n) / kTwoPi;
  const auto first = static_cast<std::ptrdiff_t>(std::floor(from * per_radian)) - 1;
  const auto last = static_cast<std::ptrdiff_t>(std::floor((from + span) * per_radian)) + 2;
  if (last - first >= n) return bounds();
  std::ptrdiff_t i = first % n;
  if (i < 0) i += n;
  Interval range(coefficients_[static_cast<std::size_t>(i)]);
  for (std::ptrdiff_t k = first + 1; k <= last; ++k) {
    if (++i == n) i = 0;
    const double c = coefficients_[static_cast<std::size_t>(i)];
    range.lo = std::min(range.lo, c);
    range.hi = std::max(range.hi, c);
  }
  return range;
}

Interval PeriodicSpline::bounds() const {
  const auto [lo, hi] = std::minmax_element(coefficients_.begin(), coefficients_.end());
  return {*lo, *hi};
}

bool PeriodicSpline::close_to(const PeriodicSpline& other, double tolerance) const {
  return std::equal(coefficients_.begin(), coefficients_.end(), other.coefficients_.begin(),
                    other.coefficients_.end(),
                    [&](double a, double b) { return std::abs(a - b) <= tolerance * std::abs(a); });
}

double PeriodicSpline::slope_bound() const {
  double largest = 0.0;
  const std::size_t n = coefficients_.size();
  for (std::size_t i = 0; i < n; ++i)
    largest = std::max(largest, std::abs(coefficients_[(i + 1) % n] - coefficients_[i]));
  return largest * static_cast<double>(n) / kTwoPi;
}

double PeriodicSpline::slope_bound(double from, double span) const {
  if (is_constant()) return 0.0;
  const auto n = static_cast<std::ptrdiff_t>(coefficients_.size());
  const double per_radian = static_cast<double>(n) / kTwoPi;
  const auto first = static_cast<std::ptrdiff_t>(std::floor(from * per_radian)) - 1;
  const auto last = static_cast<std::ptrdiff_t>(std::floor((from + span) * per_radian)) + 2;
  if (last - first >= n) return slope_bound();
  const auto at = [&](std::ptrdiff_t i) { return coefficients_[static_cast<std::size_t>(((i % n) + n) % n)]; };
  double largest = 0.0;
  for (std::ptrdiff_t i = first; i < last; ++i) largest = std::max(largest, std::abs(at(i + 1) - at(i)));
  return largest * per_radian;
}

}  // namespace whorl
