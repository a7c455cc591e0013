// SPDX-License-Identifier: Apache-2.0
// What a series of successive whorls says by itself, in the ways in which such series have been worked out in print.
#include "fit/series_summary.h"

#include "fit/models.h"
#include "math/vec.h"

#include <Eigen/Dense>

#include <algorithm>
#include <cmath>
#include <limits>

namespace whorl::fit {

double spiral_angle(double W) { return degrees(std::atan(kTwoPi / std::log(W))); }

double spiral_angle_on_cone(double W, double semi_angle_deg) {
  return degrees(std::atan(kTwoPi * std::sin(radians(semi_angle_deg)) / std::log(W)));
}

double W_from_sums(double long_sum, double short_sum, int whorls) {
  return std::pow(long_sum / short_sum - 1.0, 2.0 / whorls);
}

double W_from_sutural_angle(double sutural_deg, double apical_deg) {
  const double ratio = std::sin(radians(sutural_deg)) / std::sin(radians(sutural_deg + apical_deg));
  return ratio * ratio;
}

double own_scatter(const specimen::Series& series, double reading_error) {
  const auto count = static_cast<Eigen::Index>(series.values.size());
  Eigen::VectorXd ln(count);
  double explained = 0.0;  // mean variance of ln value from the reading error
  for (Eigen::Index i = 0; i < count; ++i) {
    const double value = series.values[static_cast<std::size_t>(i)];
    ln[i] = std::log(value);
    explained += std::pow(reading_error / value, 2) / static_cast<double>(count);
  }
  double best = std::numeric_limits<double>::infinity(), variance = 0.0;
  for (const Eigen::Index terms : {2, 3}) {
    if (count <= terms) continue;
    Eigen::MatrixXd powers(count, terms);
    for (Eigen::Index i = 0; i < count; ++i)
      for (Eigen::Index k = 0; k < terms; ++k)
        powers(i, k) = std::pow(2.0 * static_cast<double>(i) / static_cast<double>(count - 1) - 1.0, static_cast<double>(k));
    const double sum = (ln - powers * powers.colPivHouseholderQr().solve(ln)).squaredNorm();
    const auto n = static_cast<double>(count);
    // A perfect series has no scatter: its logarithm would be infinite.
    const double aicc = corrected_aic(n * std::log(std::max(sum, 1e-20) / n), static_cast<std::size_t>(terms) + 1,
                                      static_cast<std::size_t>(count));
    if (terms > 2 && !(aicc < best)) continue;
    best = aicc;
    variance = sum / (n - static_cast<double>(terms));
  }
  return std::sqrt(std::max(0.0, variance - explained));
}

SeriesResult summary_of(const specimen::Series& series) {
  SeriesResult result;
  const std::vector<double>& values = series.values;
  const auto count = static_cast<double>(values.size());
  const double turns = series.turn * (count - 1.0);
  result.end_to_end_W = std::pow(values.back() / values.front(), 1.0 / turns);
  // Straight line through ln value by turn.
  double mean = 0.0, square = 0.0, cross = 0.0;
  for (const double value : values) mean += std::log(value) / count;
  for (std::size_t i = 0; i < values.size(); ++i) {
    const double turn = series.turn * (static_cast<double>(i) - 0.5 * (count - 1.0));
    square += turn * turn;
    cross += turn * std::log(values[i]);
  }
  const double slope = cross / square;
  result.least_squares_W = std::exp(slope);
  double sum = 0.0;
  for (std::size_t i = 0; i < values.size(); ++i) {
    const double turn = series.turn * (static_cast<double>(i) - 0.5 * (count - 1.0));
    sum += std::pow(std::log(values[i]) - mean - slope * turn, 2);
  }
  result.rms_of_ln = std::sqrt(sum / count);

  const auto apart = static_cast<std::size_t>(std::lround(1.0 / series.turn));
  if (values.size() <= apart) return result;
  std::vector<double> ratios;
  for (std::size_t i = apart; i < values.size(); ++i) ratios.push_back(values[i] / values[i - apart]);
  double angles = 0.0;
  for (const double ratio : ratios) angles += spiral_angle(ratio) / static_cast<double>(ratios.size());
  result.mean_spiral_angle = angles;
  result.first_ratio = ratios.front();
  result.last_ratio = ratios.back();
  const auto [low, high] = std::minmax_element(ratios.begin(), ratios.end());
  result.spread_of_ratios = *high / *low;
  return result;
}

}  // namespace whorl::fit
