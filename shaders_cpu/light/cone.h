// SPDX-License-Identifier: Apache-2.0
// A cone of directions, sampled evenly in solid angle without cancellation however narrow it is.
#pragma once

#include "math/basis3f.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {

/// All directions within an angle t of `axis`. `one_minus_cos` = 1 - cos t is kept instead of cos t: for narrow cones
/// cos t rounds to 1.
struct Cone {
  Vec3f axis{0.0f, 0.0f, 1.0f};
  float one_minus_cos = 0.0f;

  float solid_angle() const noexcept { return static_cast<float>(kTwoPi) * one_minus_cos; }
  float pdf() const noexcept { return 1.0f / solid_angle(); }
  /// For a unit `direction`; |d - axis|^2 = 2 (1 - cos).
  bool contains(const Vec3f& direction) const noexcept {
    const Vec3f apart = direction - axis;
    return apart.dot(apart) <= 2.0f * one_minus_cos;
  }
  /// Even in solid angle for uniform u1, u2.
  Vec3f sample(float u1, float u2) const noexcept {
    const float drop = u1 * one_minus_cos;
    const float sine = std::sqrt(std::max(0.0f, drop * (2.0f - drop)));
    const float angle = static_cast<float>(kTwoPi) * u2;
    return Basis3f(axis).to_world({sine * std::cos(angle), sine * std::sin(angle), 1.0f - drop});
  }
};

/// 1 - cos t from sin^2 t, for t up to a right angle.
template <class Real>
Real one_minus_cos_of_sin2(Real sin2) noexcept {
  return sin2 / (Real(1) + std::sqrt(std::max(Real(0), Real(1) - sin2)));
}

}  // namespace whorl::shaders_cpu
