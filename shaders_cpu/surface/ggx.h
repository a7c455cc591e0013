// SPDX-License-Identifier: Apache-2.0
// The GGX distribution of microfacets, isotropic: density, shadowing, and sampling of the visible ones.
//
// All directions are unit vectors in the frame of the surface (z = normal), pointing away from it.
// Walter et al. 2007, Microfacet Models for Refraction through Rough Surfaces; Heitz 2014, JCGT 3(2).
#pragma once

#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {

/// Density of facet normals `h` per projected area; integrates to 1 against cos.
template <class Real>
Real ggx_density(const Imath::Vec3<Real>& h, Real alpha) noexcept {
  const Real a2 = alpha * alpha;
  // cos^2 (a2 - 1) + 1, written so that nothing cancels for smooth surfaces.
  const Real q = a2 * h.z * h.z + h.x * h.x + h.y * h.y;
  return a2 / (Real(kPi) * q * q);
}

/// Smith's Lambda: masked to visible facet area. Infinite for grazing directions.
template <class Real>
Real ggx_lambda(const Imath::Vec3<Real>& w, Real alpha) noexcept {
  const Real a2_tan2 = alpha * alpha * (w.x * w.x + w.y * w.y) / (w.z * w.z);
  return Real(0.5) * (std::sqrt(Real(1) + a2_tan2) - Real(1));
}

/// A normal among those visible from `wo` (wo.z >= 0), with density G1(wo) max(0, wo.h) D(h) / wo.z.
/// Heitz 2018, Sampling the GGX Distribution of Visible Normals, JCGT 7(4). `radius`, `angle_rad`: a point of the unit
/// disc in polar coordinates; radius = sqrt(u1), angle = 2 pi u2 for uniform u1, u2.
template <class Real>
Imath::Vec3<Real> ggx_visible_normal(const Imath::Vec3<Real>& wo, Real alpha, Real radius, Real angle_rad) noexcept {
  using V = Imath::Vec3<Real>;
  const V stretched(alpha * wo.x, alpha * wo.y, wo.z);
  const V v = stretched * (Real(1) / std::sqrt(stretched.dot(stretched)));
  const Real across2 = v.x * v.x + v.y * v.y;
  const V side = across2 > Real(0) ? V(-v.y, v.x, 0) * (Real(1) / std::sqrt(across2)) : V(1, 0, 0);
  const V up = v.cross(side);
  const Real t1 = radius * std::cos(angle_rad);
  const Real rim = std::sqrt(std::max(Real(0), Real(1) - t1 * t1));
  const Real s = Real(0.5) * (Real(1) + v.z);
  const Real t2 = (Real(1) - s) * rim + s * radius * std::sin(angle_rad);
  const V n = side * t1 + up * t2 + v * std::sqrt(std::max(Real(0), Real(1) - t1 * t1 - t2 * t2));
  const V h(alpha * n.x, alpha * n.y, std::max(Real(1e-7), n.z));
  return h * (Real(1) / std::sqrt(h.dot(h)));
}

/// Density (per solid angle, also below the horizon) of directions that are `wo` mirrored at a visible normal `h`.
template <class Real>
Real ggx_reflection_pdf(const Imath::Vec3<Real>& wo, const Imath::Vec3<Real>& h, Real alpha) noexcept {
  return ggx_density(h, alpha) / (Real(4) * wo.z * (Real(1) + ggx_lambda(wo, alpha)));
}

}  // namespace whorl::shaders_cpu
