// SPDX-License-Identifier: Apache-2.0
// The integral of a piecewise straight growth rate, in closed form.
#include "growth/expansion.h"

#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl::growth {

Expansion::Expansion(const specimen::Stages& stages, double theta_lip) {
  knots_.clear();
  for (const specimen::Stage& stage : stages) {
    const double theta = kTwoPi * stage.whorl, rate = std::log(stage.W) / kTwoPi;
    double sum = 0.0;
    if (!knots_.empty()) {
      const Knot& before = knots_.back();
      sum = before.integral + 0.5 * (before.rate + rate) * (theta - before.theta);
    }
    knots_.push_back({theta, rate, sum});
  }
  at_lip_ = integral(theta_lip);
}

double Expansion::integral(double theta) const {
  const Knot& first = knots_.front();
  const Knot& last = knots_.back();
  if (theta <= first.theta || knots_.size() == 1) return first.rate * (theta - first.theta);
  if (theta >= last.theta) return last.integral + last.rate * (theta - last.theta);
  const auto after = std::upper_bound(knots_.begin(), knots_.end(), theta,
                                      [](double t, const Knot& k) { return t < k.theta; });
  const Knot &a = *(after - 1), &b = *after;
  const double x = theta - a.theta;
  return a.integral + x * (a.rate + 0.5 * x * (b.rate - a.rate) / (b.theta - a.theta));
}

double Expansion::factor(double theta) const { return std::exp(integral(theta) - at_lip_); }

double Expansion::rate(double theta) const {
  if (theta <= knots_.front().theta || knots_.size() == 1) return knots_.front().rate;
  if (theta >= knots_.back().theta) return knots_.back().rate;
  const auto after = std::upper_bound(knots_.begin(), knots_.end(), theta,
                                      [](double t, const Knot& k) { return t < k.theta; });
  const Knot &a = *(after - 1), &b = *after;
  return a.rate + (b.rate - a.rate) * (theta - a.theta) / (b.theta - a.theta);
}

}  // namespace whorl::growth
