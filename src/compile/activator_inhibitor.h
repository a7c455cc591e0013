// SPDX-License-Identifier: Apache-2.0
// The activator-inhibitor model of pigment along a growing mantle edge.
//
// Meinhardt & Klinger 1987, A model for pattern formation on the shells of molluscs, J. theor. Biol. 126: 63-89; set on shells
// by Fowler, Meinhardt & Prusinkiewicz 1992, Modeling seashells, Computer Graphics 26(2): 379-387:
//   a_t = s (a^2 / b + b_a) - r_a a + D_a a_xx,    b_t = s a^2 - r_b b + D_b b_xx + b_b.
// For b_a = b_b = 0 the even steady state is a = r_b / r_a, b = s r_b / r_a^2. It is stable against even changes for
// r_b > r_a; at r_b = r_a it begins to swing with the angular frequency r_a; for r_b > r_a it breaks up into stripes where
// D_b / D_a > (3 + 2 sqrt 2) r_b / r_a, first at the wavenumber k with k^2 = sqrt(r_a r_b / (D_a D_b)).
#pragma once

#include <cstdint>
#include <vector>

namespace whorl::compile {

struct ReactionRates {
  double activator_decay = 1.0, inhibitor_decay = 1.0;  // r_a, r_b
  double source = 1.0;                                  // s
  double activator_base = 0.0, inhibitor_base = 0.0;    // b_a, b_b
  double activator_spread = 0.0, inhibitor_spread = 0.0;  // D_a, D_b
};

struct SteadyState {
  double activator, inhibitor;
};

/// The even steady state with the most activator, by Newton's method from above; closed form for b_a = b_b = 0.
SteadyState steady_state(const ReactionRates& rates);

/// A closed edge in nodes of equal length. Production is taken at the start of a step, decay and spread at its end: concentrations
/// stay positive for steps of any length, and any spread is stable.
class GrowingEdge {
 public:
  /// The steady state everywhere; the source density of each node differs from `rates.source` by up to `variation` of it, by
  /// chance.
  GrowingEdge(const ReactionRates& rates, int nodes, double variation, std::uint64_t seed);

  /// One step of time `dt`, the edge being `length` long.
  void step(double dt, double length);

  std::vector<double>& activator() { return a_; }
  std::vector<double>& inhibitor() { return b_; }
  const std::vector<double>& activator() const { return a_; }
  const std::vector<double>& inhibitor() const { return b_; }

 private:
  void spread(std::vector<double>& c, double per_node) const;

  ReactionRates rates_;
  std::vector<double> source_, a_, b_;
  mutable std::vector<double> upper_, corner_;  // of the cyclic elimination
};

}  // namespace whorl::compile
