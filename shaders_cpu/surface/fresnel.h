// SPDX-License-Identifier: Apache-2.0
// What a smooth clear surface reflects.
#pragma once

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {

/// Mean refractive index of a mineral whose three principal indices are known.
constexpr double mean_index(double a, double b, double c) noexcept { return (a + b + c) / 3.0; }
inline constexpr double kAragoniteIndex = mean_index(1.530, 1.681, 1.685);
inline constexpr double kCalciteIndex = mean_index(1.658, 1.658, 1.486);

/// Reflectances for light that swings across (s) and in (p) the plane of incidence.
template <class Real>
struct Polarised {
  Real s, p;
};

/// Exact Fresnel equations for light that comes from air onto a dielectric of index `index` >= 1; `cosine` of the angle of
/// incidence, 0 .. 1.
template <class Real>
Polarised<Real> fresnel_polarised(Real cosine, Real index) noexcept {
  const Real c = std::clamp(cosine, Real(0), Real(1));
  const Real inside = std::sqrt(Real(1) - (Real(1) - c * c) / (index * index));
  const Real s = (c - index * inside) / (c + index * inside);
  const Real p = (index * c - inside) / (index * c + inside);
  return {s * s, p * p};
}

/// Reflectance for unpolarised light.
template <class Real>
Real fresnel_dielectric(Real cosine, Real index) noexcept {
  const Polarised<Real> r = fresnel_polarised(cosine, index);
  return Real(0.5) * (r.s + r.p);
}

}  // namespace whorl::shaders_cpu
