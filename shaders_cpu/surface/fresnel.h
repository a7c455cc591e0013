// SPDX-License-Identifier: Apache-2.0
// What a smooth clear surface reflects.
#pragma once

#include <cmath>

namespace whorl::shaders_cpu {

/// Mean refractive index of a mineral whose three principal indices are known.
constexpr double mean_index(double a, double b, double c) noexcept { return (a + b + c) / 3.0; }
inline constexpr double kAragoniteIndex = mean_index(1.530, 1.681, 1.685);
inline constexpr double kCalciteIndex = mean_index(1.658, 1.658, 1.486);

/// Reflectance of unpolarised light that comes from air onto a dielectric of index `index` >= 1; exact Fresnel
/// equations. `cosine` of the angle of incidence, 0 .. 1.
template <class Real>
Real fresnel_dielectric(Real cosine, Real index) noexcept {
  const Real c = cosine < Real(0) ? Real(0) : (cosine > Real(1) ? Real(1) : cosine);
  const Real cos_inside = std::sqrt(Real(1) - (Real(1) - c * c) / (index * index));
  const Real s = (c - index * cos_inside) / (c + index * cos_inside);
  const Real p = (index * c - cos_inside) / (index * c + cos_inside);
  return Real(0.5) * (s * s + p * p);
}

}  // namespace whorl::shaders_cpu
