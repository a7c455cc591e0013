// SPDX-License-Identifier: Apache-2.0
// A local single-precision frame around a normal, for shading.
#pragma once

#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl {

/// `v` scaled to length 1; `v` must not be (nearly) zero.
inline Vec3f unit(const Vec3f& v) noexcept { return v * (1.0f / std::sqrt(v.dot(v))); }
inline float max_component(const Vec3f& v) noexcept { return std::max(v.x, std::max(v.y, v.z)); }
/// Relative luminance of a colour with linear sRGB primaries (IEC 61966-2-1).
inline float luminance(const Vec3f& c) noexcept { return 0.2126f * c.x + 0.7152f * c.y + 0.0722f * c.z; }

/// Orthonormal, right-handed, z = the normal. Method: Duff et al. 2017, Building an Orthonormal Basis, Revisited,
/// JCGT 6(1).
struct Basis3f {
  Vec3f x, y, z;

  explicit Basis3f(const Vec3f& n) noexcept : z(n) {
    const float sign = std::copysign(1.0f, n.z);
    const float a = -1.0f / (sign + n.z);
    const float b = n.x * n.y * a;
    x = {1.0f + sign * n.x * n.x * a, sign * b, -sign * n.x};
    y = {b, sign + n.y * n.y * a, -n.y};
  }
  Vec3f to_world(const Vec3f& v) const noexcept { return x * v.x + y * v.y + z * v.z; }
  Vec3f to_local(const Vec3f& v) const noexcept { return {x.dot(v), y.dot(v), z.dot(v)}; }
};

}  // namespace whorl
