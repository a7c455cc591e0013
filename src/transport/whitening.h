// SPDX-License-Identifier: Apache-2.0
// The look of a coated specimen: a thin dull film of sublimate that is thicker where the surface stands out.
#pragma once

#include "field/field.h"
#include "trace/surfaces.h"

namespace whorl::transport {

/// Safe for several threads at once. Keeps a reference to the field.
class Whitening {
 public:
  explicit Whitening(const field::Field& field);

  /// Grey albedo of the coated surface: that of the coat where it is thick, that of the blackened ground where it is thin.
  Vec3f albedo(const trace::Hit& hit) const noexcept;

  /// How far the surface stands out at a place on it: above 0 on crests, below in hollows, 0 in a plane. Minus the mean of the
  /// signed length within the surface on a small sphere, over its radius; near a smooth surface that goes with radius times mean curvature.
  double relief(const Vec3& p, bool from_inside) const noexcept;

  /// Radius of that sphere, mm.
  double reach_mm() const noexcept { return reach_; }

  static constexpr float kCoat = 0.86f, kGround = 0.16f;  // albedo of the sublimate, and of what it is laid on

 private:
  struct Nearby;
  Nearby nearby(const Vec3& p) const noexcept;
  double body(const Vec3& p, bool from_inside, const Nearby& near) const noexcept;

  const field::Field& field_;
  double reach_, outline_reach_ = 1.0;
};

}  // namespace whorl::transport
