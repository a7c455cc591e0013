// SPDX-License-Identifier: Apache-2.0
// Runs each pattern from its onset to the lip while the growth law widens the edge.
#include "compile/edge_patterns.h"

#include "compile/activator_inhibitor.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::compile {
namespace {

using scene::EdgePattern;

constexpr int kNodes = 1024;
constexpr double kColumnsPerTurn = 1024.0;
constexpr double kStepsPerDecay = 50.0;  // halving the step moves stripes by less than a node
constexpr double kPastLip = 0.3;         // whorls: inclined lips reach beyond their middle

/// Length of the outline at the lip up to each section angle, as shares of `total` (in half-breadths).
std::vector<float> arc_shares(const growth::CoilingLaw& law, const PeriodicSpline& reach, double& total) {
  constexpr int kFine = 16;  // chords an entry
  const auto point = [&](int i) {
    const double psi = kTwoPi * i / (EdgePattern::kAngles * kFine), r = reach.value(psi);
    return Vec2(r * std::cos(psi), law.S * r * std::sin(psi));
  };
  std::vector<double> passed{0.0};
  double sum = 0.0;
  for (int i = 0; i < EdgePattern::kAngles; ++i) {
    for (int k = 0; k < kFine; ++k) sum += (point(i * kFine + k + 1) - point(i * kFine + k)).length();
    passed.push_back(sum);
  }
  total = sum;
  std::vector<float> shares;
  for (const double one : passed) shares.push_back(static_cast<float>(one / sum));
  return shares;
}

ReactionRates rates_of(const specimen::EdgePattern& p) {
  return {p.activator_decay, p.inhibitor_decay, p.source,          p.activator_base,
          p.inhibitor_base,  p.activator_spread, p.inhibitor_spread};
}

EdgePattern run(const growth::CoilingLaw& law, const specimen::EdgePattern& stated, std::vector<float> arc, double edge) {
  const ReactionRates rates = rates_of(stated);
  EdgePattern pattern;
  pattern.first_turn = std::max(stated.pigment.onset.value, law.theta_start / kTwoPi);
  pattern.columns_per_turn = kColumnsPerTurn;
  pattern.nodes = kNodes;
  const double turns = law.theta_lip / kTwoPi + kPastLip - pattern.first_turn;
  pattern.columns = static_cast<int>(std::ceil(turns * kColumnsPerTurn)) + 1;
  pattern.arc = std::move(arc);
  pattern.levels.reserve(static_cast<std::size_t>(pattern.columns) * kNodes);

  GrowingEdge growing(rates, kNodes, stated.variation, static_cast<std::uint64_t>(stated.seed.value));
  const double steady = steady_state(rates).activator;
  const double fastest = std::max({rates.activator_decay, rates.inhibitor_decay, rates.source});
  const int steps = std::max(1, static_cast<int>(std::ceil(kStepsPerDecay * fastest / kColumnsPerTurn)));
  for (int column = 0; column < pattern.columns; ++column) {
    for (const double a : growing.activator()) {
      const double level = std::clamp(a / steady / static_cast<double>(EdgePattern::kLargest), 0.0, 1.0);
      pattern.levels.push_back(static_cast<std::uint16_t>(std::lround(65535.0 * level)));
    }
    const double theta = kTwoPi * (pattern.first_turn + column / kColumnsPerTurn);
    const double length = edge * law.at(theta).half_breadth;
    for (int i = 0; i < steps; ++i) growing.step(1.0 / kColumnsPerTurn / steps, length);
  }
  return pattern;
}

}  // namespace

void build_edge_patterns(scene::Scene& scene, const specimen::Specimen& specimen, const PeriodicSpline& reach,
                         Faults& faults) {
  if (specimen.colouring.patterns.empty()) return;
  double edge = 0.0;
  const std::vector<float> arc = arc_shares(scene.law, reach, edge);
  const double node = edge * scene.law.half_breadth / kNodes;  // at the lip, mm
  for (const specimen::EdgePattern& stated : specimen.colouring.patterns) {
    // The activator evens out over the square root of spread / decay: finer than a node that is lost, and the pattern mere grain.
    const double least = node * node * stated.activator_decay.value;
    if (stated.activator_spread < least)
      faults.add(stated.activator_spread.where,
                 fmt::format("[[pattern]] activator_spread = {:g} mm^2 a whorl: makes a pattern finer than the {} places at "
                             "which the edge of {:.3g} mm is computed; must be at least {:.3g} with activator_decay = {:g}",
                             stated.activator_spread.value, kNodes, node * kNodes, least, stated.activator_decay.value));
    else
      scene.edge_patterns.push_back(run(scene.law, stated, arc, edge));
  }
}

}  // namespace whorl::compile
