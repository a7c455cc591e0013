// SPDX-License-Identifier: Apache-2.0
// Quadrature over the microfacet normals that are seen from one direction.
#pragma once

#include "math/vec.h"
#include "shaders_cpu/surface/ggx.h"

#include <algorithm>
#include <utility>
#include <vector>

namespace whorl::shaders_cpu {

/// Places and weights on [0, 1].
struct Rule {
  std::vector<double> place, weight;
};
Rule gauss_legendre(int order);

/// G2/G1 for the visible normal at a place of the unit disc, with the cosine at which light meets that facet; below zero (the
/// mirrored direction's height) where the facet mirrors below the horizon.
inline double mirrored(const Vec3& wo, double lambda_o, double alpha, double radius, double angle, double& facing) {
  const Vec3 h = ggx_visible_normal(wo, alpha, radius, angle);
  facing = wo.dot(h);
  const Vec3 wi = h * (2.0 * facing) - wo;
  if (wi.z <= 0.0) return std::min(wi.z, -1e-300);
  return (1.0 + lambda_o) / (1.0 + lambda_o + ggx_lambda(wi, alpha));
}

/// Calls take(facing, weight) at the places of the rule: the sum of weight F(facing) is the directional albedo of a surface whose
/// facets reflect F. The disc of Heitz's method is halved by its mirror symmetry and cut where the integrand has kinks: along its
/// diameter, and along each radius at the horizon. The radius runs as a sine, which takes away the infinite slope at the rim.
template <class Take>
void over_visible_normals(double cosine, double alpha, const Rule& rule, Take take) {
  const Vec3 wo(std::sqrt(1.0 - cosine * cosine), 0.0, cosine);
  const double lambda_o = ggx_lambda(wo, alpha);
  for (std::size_t a = 0; a < rule.place.size(); ++a)
    for (int half = 0; half < 2; ++half) {
      const double angle = 0.5 * kPi * (rule.place[a] - half);
      double facing = 0.0;
      const auto at = [&](double s) { return mirrored(wo, lambda_o, alpha, std::sin(0.5 * kPi * s), angle, facing); };
      double low = 0.0, high = 1.0;
      const bool seen = at(low) > 0.0, crosses = seen != (at(high) > 0.0);
      for (int step = 0; crosses && step < 40; ++step) {
        const double middle = 0.5 * (low + high);
        ((at(middle) > 0.0) == seen ? low : high) = middle;
      }
      const double cut = crosses ? low : 1.0;
      for (std::size_t r = 0; r < rule.place.size(); ++r)
        for (const auto& [from, to] : {std::pair{0.0, cut}, std::pair{cut, 1.0}}) {
          const double s = from + (to - from) * rule.place[r];
          // 2 r dr over two quarter turns of four, mirrored: the weights sum to 1.
          const double weight = (to - from) * rule.weight[r] * rule.weight[a] * 0.25 * kPi * std::sin(kPi * s);
          if (!(weight > 0.0)) continue;
          const double kept = at(s);
          if (kept > 0.0) take(facing, weight * kept);
        }
    }
}

}  // namespace whorl::shaders_cpu
