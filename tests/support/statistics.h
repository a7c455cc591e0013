// SPDX-License-Identifier: Apache-2.0
// Means with their standard errors and the chi-square test, for tests of sampling.
#pragma once

#include <cmath>
#include <cstddef>
#include <vector>

namespace whorl::test {

/// Running mean and variance (Welford).
class Mean {
 public:
  void add(double value) {
    ++count_;
    const double step = value - mean_;
    mean_ += step / static_cast<double>(count_);
    squares_ += step * (value - mean_);
  }
  double value() const { return mean_; }
  double variance() const { return count_ > 1 ? squares_ / static_cast<double>(count_ - 1) : 0.0; }
  double standard_error() const { return std::sqrt(variance() / static_cast<double>(count_)); }
  /// How far the mean lies from `expected`, in standard errors.
  double sigmas_from(double expected) const { return std::abs(mean_ - expected) / standard_error(); }

 private:
  std::size_t count_ = 0;
  double mean_ = 0.0, squares_ = 0.0;
};

/// Pearson's statistic of counts against expected counts as a normal deviate (Wilson & Hilferty 1931, PNAS 17): above 4
/// happens once in 30,000 fair runs. Bins that expect fewer than 8 are pooled.
inline double chi_square_sigmas(const std::vector<double>& counts, const std::vector<double>& expected) {
  double statistic = 0.0, pooled_count = 0.0, pooled_expected = 0.0;
  int bins = 0;
  const auto bin = [&](double count, double expectation) {
    statistic += (count - expectation) * (count - expectation) / expectation;
    ++bins;
  };
  for (std::size_t i = 0; i < counts.size(); ++i) {
    if (expected[i] >= 8.0) {
      bin(counts[i], expected[i]);
    } else {
      pooled_count += counts[i];
      pooled_expected += expected[i];
    }
  }
  if (pooled_expected > 0.0) bin(pooled_count, pooled_expected);
  const double freedom = bins - 1, spread = 2.0 / (9.0 * freedom);
  return (std::cbrt(statistic / freedom) - (1.0 - spread)) / std::sqrt(spread);
}

}  // namespace whorl::test
