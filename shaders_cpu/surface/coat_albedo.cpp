// SPDX-License-Identifier: Apache-2.0
// Quadrature and table of a coat's directional albedo.
#include "shaders_cpu/surface/coat_albedo.h"

#include "math/parallel.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/ggx.h"

#include <utility>
#include <vector>

namespace whorl::shaders_cpu {
namespace {

/// Stands for grazing incidence, where the integrand has a limit but no value.
constexpr double kLeastCosine = 1e-6;

struct Rule {
  std::vector<double> place, weight;  // on [0, 1]
};

/// Gauss-Legendre nodes by Newton's method on the Legendre polynomial.
Rule gauss_legendre(int order) {
  Rule rule;
  for (int i = 0; i < order; ++i) {
    double x = std::cos(kPi * (i + 0.75) / (order + 0.5)), slope = 1.0;
    for (int step = 0; step < 50; ++step) {
      double p0 = 1.0, p1 = x;
      for (int k = 2; k <= order; ++k) {
        const double p2 = ((2 * k - 1) * x * p1 - (k - 1) * p0) / k;
        p0 = p1;
        p1 = p2;
      }
      slope = order * (x * p1 - p0) / (x * x - 1.0);
      const double change = p1 / slope;
      x -= change;
      if (std::abs(change) < 1e-15) break;
    }
    rule.place.push_back(0.5 * (1.0 + x));
    rule.weight.push_back(1.0 / ((1.0 - x * x) * slope * slope));
  }
  return rule;
}

/// F G2/G1 for the visible normal at a place of the unit disc; below zero (the mirrored direction's height) where the facet
/// mirrors below the horizon.
double mirrored(const Vec3& wo, double lambda_o, double index, double alpha, double radius, double angle) {
  const Vec3 h = ggx_visible_normal(wo, alpha, radius, angle);
  const double facing = wo.dot(h);
  const Vec3 wi = h * (2.0 * facing) - wo;
  if (wi.z <= 0.0) return std::min(wi.z, -1e-300);
  return fresnel_dielectric(facing, index) * (1.0 + lambda_o) / (1.0 + lambda_o + ggx_lambda(wi, alpha));
}

/// Mean of F G2/G1 over the visible normals. The disc of Heitz's method is halved by its mirror symmetry and cut where the
/// integrand has kinks: along its diameter, and along each radius at the horizon. The radius runs as a sine, which takes
/// away the infinite slope at the rim.
double integrate(double cosine, double index, double alpha, const Rule& rule) {
  const Vec3 wo(std::sqrt(1.0 - cosine * cosine), 0.0, cosine);
  const double lambda_o = ggx_lambda(wo, alpha);
  double sum = 0.0;
  for (std::size_t a = 0; a < rule.place.size(); ++a)
    for (int half = 0; half < 2; ++half) {
      const double angle = 0.5 * kPi * (rule.place[a] - half);
      const auto at = [&](double s) { return mirrored(wo, lambda_o, index, alpha, std::sin(0.5 * kPi * s), angle); };
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
          if (weight > 0.0) sum += weight * std::max(0.0, at(s));
        }
    }
  return sum;
}

}  // namespace

double coat_albedo_quadrature(double cosine, double index, double alpha, int order) {
  return integrate(cosine, index, alpha, gauss_legendre(order));
}

CoatAlbedo::CoatAlbedo(double index, double alpha)
    : index_(static_cast<float>(index)), alpha_(static_cast<float>(alpha)) {
  constexpr int kOrder = 16;  // within 2e-5 of order 256
  const Rule rule = gauss_legendre(kOrder);
  parallel_for(kNodes, 8, [&](std::size_t i) {
    const double u = static_cast<double>(i) / (kNodes - 1);
    nodes_[i] = static_cast<float>(integrate(std::max(u * u, kLeastCosine), index, alpha, rule));
  });
  double sum = 0.0;  // exact integral of c times a linear piece
  for (int i = 0; i + 1 < kNodes; ++i) {
    const double a = cos_of(i), b = cos_of(i + 1);
    const double ea = nodes_[static_cast<std::size_t>(i)], eb = nodes_[static_cast<std::size_t>(i) + 1];
    sum += (b - a) * (ea * (2.0 * a + b) + eb * (a + 2.0 * b)) / 6.0;
  }
  mean_ = static_cast<float>(2.0 * sum);
}

}  // namespace whorl::shaders_cpu
