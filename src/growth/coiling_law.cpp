// SPDX-License-Identifier: Apache-2.0
// Raup's parameters turned into lengths at the lip and their expansions.
#include "growth/coiling_law.h"

namespace whorl::growth {

SectionPoint CoilingLaw::drift(double theta, const Station& s, SectionPoint q) const {
  const double du = -by_distance.rate(theta) * s.distance, dv = by_depth.rate(theta) * s.depth;
  const double k = by_section.rate(theta);
  return {(du * roll_cos - dv * roll_sin) / s.half_breadth - k * q.x,
          (du * roll_sin + dv * roll_cos) / (S * s.half_breadth) - k * q.y};
}

CoilingLaw coiling_law(const specimen::Growth& growth, const specimen::Section& section) {
  CoilingLaw law;
  law.theta_lip = kTwoPi * growth.whorls;
  law.theta_start = kTwoPi * growth.start;
  law.half_breadth = 1.0;
  law.distance = (1.0 + growth.D) / (1.0 - growth.D);  // from D = (d - r)/(d + r)
  law.depth = growth.T * law.distance;
  law.S = section.S;
  law.roll_cos = std::cos(radians(section.roll_deg));
  law.roll_sin = std::sin(radians(section.roll_deg));
  const auto expansion = [&](const std::optional<specimen::Stated<specimen::Stages>>& own) {
    return Expansion(own ? own->value : growth.W.value, law.theta_lip);
  };
  law.by_distance = expansion(growth.W_distance);
  law.by_depth = expansion(growth.W_depth);
  law.by_section = expansion(growth.W_section);
  law.one_expansion = law.by_distance == law.by_section && law.by_depth == law.by_section;
  return law;
}

CoilingLaw scaled(CoilingLaw law, double factor) {
  law.distance *= factor;
  law.depth *= factor;
  law.half_breadth *= factor;
  return law;
}

}  // namespace whorl::growth
