// SPDX-License-Identifier: Apache-2.0
// The key light: a disc of directions, evenly bright, infinitely far away.
#pragma once

#include "shaders_cpu/light/cone.h"

namespace whorl::shaders_cpu {

/// Narrowest and widest angular radius: below, rays to a point of light; above, light from behind the card.
inline constexpr double kMinSoftnessDeg = 0.05, kMaxSoftnessDeg = 90.0;

struct KeyLight {
  Cone cone;
  Vec3f radiance{0.0f};

  Vec3f radiance_along(const Vec3f& direction) const noexcept { return cone.contains(direction) ? radiance : Vec3f(0.0f); }
};

/// The cone of angular radius `softness_deg` (held to the limits above) round the unit vector `towards_light`.
inline Cone key_cone(const Vec3& towards_light, double softness_deg) {
  const double half = std::sin(0.5 * radians(std::clamp(softness_deg, kMinSoftnessDeg, kMaxSoftnessDeg)));
  return {Vec3f(towards_light), static_cast<float>(2.0 * half * half)};
}

/// Irradiance, per unit of radiance, on a card that faces the disc: pi sin^2 of the angular radius.
inline double facing_irradiance(double softness_deg) {
  const double sine = std::sin(radians(std::clamp(softness_deg, kMinSoftnessDeg, kMaxSoftnessDeg)));
  return kPi * sine * sine;
}

}  // namespace whorl::shaders_cpu
