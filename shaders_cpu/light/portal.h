// SPDX-License-Identifier: Apache-2.0
// An opening that all light from outside comes through: a rectangle, sampled evenly in the solid angle under which it is seen.
#pragma once

#include "math/vec.h"

namespace whorl::shaders_cpu {

/// The rectangle centre +- half_u +- half_v; the halves are perpendicular. `outwards` is unit, towards the light.
struct Portal {
  Vec3 centre{0.0}, half_u{0.0}, half_v{0.0}, outwards{0.0, 0.0, 1.0};

  bool behind(const Vec3f& p) const noexcept { return outwards.dot(Vec3(p) - centre) < 0.0; }
};

/// The portal seen from a place behind it. Ureña, Fajardo, King 2013, An Area-Preserving Parametrization for Spherical Rectangles,
/// Computer Graphics Forum 32(4).
class PortalView {
 public:
  PortalView(const Portal& portal, const Vec3f& from) noexcept;

  /// Too small or too slanted a sight is of no use: nothing is to be sampled then.
  bool usable() const noexcept { return solid_angle_ > 1e-6; }
  float pdf() const noexcept { return static_cast<float>(1.0 / solid_angle_); }
  double solid_angle() const noexcept { return solid_angle_; }
  /// A unit direction for uniform u1, u2 in [0, 1).
  Vec3f sample(float u1, float u2) const noexcept;
  /// Whether a direction goes through the rectangle.
  bool contains(const Vec3f& direction) const noexcept;

 private:
  Vec3 x_, y_, z_;  // along the sides, and away from the viewer's side of the plane
  double x0_, x1_, y0_, y1_, z0_;
  double b0_, b1_, k_, solid_angle_;
};

}  // namespace whorl::shaders_cpu
