// SPDX-License-Identifier: Apache-2.0
// Quadrature and table of a coat's directional albedo.
#include "shaders_cpu/surface/coat_albedo.h"

#include "math/parallel.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/visible_normals.h"

namespace whorl::shaders_cpu {
namespace {

/// Stands for grazing incidence, where the integrand has a limit but no value.
constexpr double kLeastCosine = 1e-6;

double integrate(double cosine, double index, double alpha, const Rule& rule) {
  double sum = 0.0;
  over_visible_normals(cosine, alpha, rule,
                       [&](double facing, double weight) { sum += weight * fresnel_dielectric(facing, index); });
  return sum;
}

}  // namespace

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
