// SPDX-License-Identifier: Apache-2.0
// The vector vocabulary: Imath's small vectors under the project's names, and the frames built from them.
#pragma once

#include <ImathBox.h>
#include <ImathMatrix.h>
#include <ImathVec.h>

#include <cmath>
#include <numbers>

namespace whorl {

using Vec2 = Imath::V2d;
using Vec3 = Imath::V3d;
using Vec3f = Imath::V3f;
using Box3 = Imath::Box3d;
using Box3f = Imath::Box3f;

inline constexpr double kPi = std::numbers::pi;
inline constexpr double kTwoPi = 2.0 * std::numbers::pi;
inline constexpr double kMmPerInch = 25.4;  // exact by definition

inline constexpr double radians(double degrees) { return degrees * (kPi / 180.0); }
inline constexpr double degrees(double radians) { return radians * (180.0 / kPi); }

/// Component along the first, second and third axis of a right- or left-handed orthonormal frame.
/// `to_world` turns frame coordinates into world coordinates, `to_frame` the reverse; both keep lengths.
struct Frame {
  Vec3 x{1, 0, 0}, y{0, 1, 0}, z{0, 0, 1};

  Vec3 to_world(const Vec3& v) const { return x * v.x + y * v.y + z * v.z; }
  Vec3 to_frame(const Vec3& v) const { return {x.dot(v), y.dot(v), z.dot(v)}; }
};

/// An orthonormal right-handed frame whose z axis is the unit vector `n`; continuous except at n = -z.
/// Method: Duff et al. 2017, Building an Orthonormal Basis, Revisited, JCGT 6(1).
inline Frame frame_around(const Vec3& n) {
  const double sign = std::copysign(1.0, n.z);
  const double a = -1.0 / (sign + n.z);
  const double b = n.x * n.y * a;
  return {{1.0 + sign * n.x * n.x * a, sign * b, -sign * n.x}, {b, sign + n.y * n.y * a, -n.y}, n};
}

}  // namespace whorl
