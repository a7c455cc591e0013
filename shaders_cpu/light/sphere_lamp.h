// SPDX-License-Identifier: Apache-2.0
// A lamp in the shape of an opaque, evenly bright ball, sampled by the cone under which it is seen.
#pragma once

#include "shaders_cpu/light/cone.h"

#include <limits>

namespace whorl::shaders_cpu {

struct SphereLamp {
  Vec3f centre{0.0f};
  float radius = 0.0f;
  Vec3f radiance{0.0f};
};

/// Distance along the unit `direction` at which a ray from `origin` meets the lamp's surface; infinity for a miss.
/// From inside that is the far wall.
inline float lamp_distance(const SphereLamp& lamp, const Vec3f& origin, const Vec3f& direction) noexcept {
  const Vec3f to_centre = lamp.centre - origin;
  const float along = to_centre.dot(direction);
  const Vec3f across = to_centre - direction * along;  // not d^2 - along^2: that cancels for far lamps
  const float half2 = lamp.radius * lamp.radius - across.dot(across);
  constexpr float kMiss = std::numeric_limits<float>::infinity();
  if (half2 < 0.0f) return kMiss;
  const float half = std::sqrt(half2);
  if (along - half >= 0.0f) return along - half;
  const bool inside = to_centre.dot(to_centre) <= lamp.radius * lamp.radius;
  return inside ? std::max(0.0f, along + half) : kMiss;
}

/// A direction towards a lamp with its density; from inside the ball any direction will do.
/// Shirley, Wang, Zimmerman 1996, Monte Carlo Techniques for Direct Lighting Calculations, ACM TOG 15(1).
struct LampView {
  Cone cone;
  explicit LampView(const SphereLamp& lamp, const Vec3f& from) noexcept {
    const Vec3f to_centre = lamp.centre - from;
    const float d2 = to_centre.dot(to_centre), r2 = lamp.radius * lamp.radius;
    if (d2 <= r2)
      cone.one_minus_cos = 2.0f;
    else
      cone = {to_centre * (1.0f / std::sqrt(d2)), one_minus_cos_of_sin2(r2 / d2)};
  }
};

}  // namespace whorl::shaders_cpu
