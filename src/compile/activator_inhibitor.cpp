// SPDX-License-Identifier: Apache-2.0
// Steps of the activator-inhibitor model, its diffusion solved implicitly round the edge.
#include "compile/activator_inhibitor.h"

#include "math/hash.h"

#include <cmath>

namespace whorl::compile {

SteadyState steady_state(const ReactionRates& r) {
  // b = (s a^2 + b_b) / r_b put into the first equation; its largest root lies below the starting value.
  const auto inhibitor = [&](double a) { return (r.source * a * a + r.inhibitor_base) / r.inhibitor_decay; };
  const auto balance = [&](double a) {
    return r.source * (a * a / inhibitor(a) + r.activator_base) - r.activator_decay * a;
  };
  double high = (r.inhibitor_decay + r.source * r.activator_base) / r.activator_decay * (1.0 + 1e-12);
  if (r.inhibitor_base == 0.0) return {high, inhibitor(high)};
  // The balance is negative at `high`; walk down to the first change of sign, then halve.
  constexpr int kSteps = 20000;
  double low = 0.0;
  for (int i = 1; i <= kSteps; ++i) {
    const double a = high * (1.0 - static_cast<double>(i) / kSteps);
    if (balance(a) > 0.0 || i == kSteps) {
      low = a;
      high = a + high / kSteps;
      break;
    }
  }
  for (int i = 0; i < 100; ++i) {
    const double middle = 0.5 * (low + high);
    (balance(middle) > 0.0 ? low : high) = middle;
  }
  return {low, inhibitor(low)};
}

GrowingEdge::GrowingEdge(const ReactionRates& rates, int nodes, double variation, std::uint64_t seed) : rates_(rates) {
  const auto count = static_cast<std::size_t>(nodes);
  const SteadyState steady = steady_state(rates);
  a_.assign(count, steady.activator);
  b_.assign(count, steady.inhibitor);
  upper_.resize(count);
  corner_.resize(count);
  for (std::size_t i = 0; i < count; ++i) {
    const double chance = 2.0 * static_cast<double>(unit_float(high_word(hash_with(mix64(seed), i)))) - 1.0;
    source_.push_back(rates.source * (1.0 + variation * chance));
  }
}

// Solves (1 + 2 q) c_i - q (c_{i-1} + c_{i+1}) = d_i round the circle: elimination with the corner entries by the formula of
// Sherman and Morrison (Press et al., Numerical Recipes, section 2.7). The weights sum to 1, so what is spread is kept.
void GrowingEdge::spread(std::vector<double>& c, double q) const {
  if (!(q > 0.0)) return;
  const std::size_t n = c.size();
  const double diagonal = 1.0 + 2.0 * q, gamma = -diagonal;
  // First and last diagonal entries of the reduced system.
  const double first = diagonal - gamma, last = diagonal - q * q / gamma;
  std::vector<double>& z = corner_;
  double pivot = first;
  c[0] /= pivot;
  z[0] = gamma / pivot;
  for (std::size_t i = 1; i < n; ++i) {
    upper_[i] = -q / pivot;
    pivot = (i + 1 == n ? last : diagonal) + q * upper_[i];
    c[i] = (c[i] + q * c[i - 1]) / pivot;
    z[i] = ((i + 1 == n ? -q : 0.0) + q * z[i - 1]) / pivot;
  }
  for (std::size_t i = n - 1; i-- > 0;) {
    c[i] -= upper_[i + 1] * c[i + 1];
    z[i] -= upper_[i + 1] * z[i + 1];
  }
  const double factor = (c[0] - q * c[n - 1] / gamma) / (1.0 + z[0] - q * z[n - 1] / gamma);
  for (std::size_t i = 0; i < n; ++i) c[i] -= factor * z[i];
}

void GrowingEdge::step(double dt, double length) {
  const double node = length / static_cast<double>(a_.size());
  const double keep_a = 1.0 / (1.0 + dt * rates_.activator_decay), keep_b = 1.0 / (1.0 + dt * rates_.inhibitor_decay);
  for (std::size_t i = 0; i < a_.size(); ++i) {
    const double made = source_[i] * a_[i] * a_[i];
    const double a = (a_[i] + dt * (made / b_[i] + source_[i] * rates_.activator_base)) * keep_a;
    b_[i] = (b_[i] + dt * (made + rates_.inhibitor_base)) * keep_b;
    a_[i] = a;
  }
  spread(a_, dt * rates_.activator_spread / (node * node));
  spread(b_, dt * rates_.inhibitor_spread / (node * node));
}

}  // namespace whorl::compile
