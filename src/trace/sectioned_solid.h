// SPDX-License-Identifier: Apache-2.0
// A shell cut open by a plane: the half on the reader's side is taken away, the cut face can be hit.
#pragma once

#include "trace/united_solid.h"

namespace whorl::trace {

class SectionedSolid final : public Surfaces {
 public:
  /// Keeps the half in which `normal` . p <= 0: the plane goes through the pole. `normal` is a unit vector towards the reader. The solid
  /// must outlive this.
  SectionedSolid(const UnitedSolid& solid, const Vec3& normal) : solid_(solid), normal_(normal) {}

  bool closest(const Ray& ray, Hit& hit) const noexcept override;
  bool occluded(const Ray& ray) const noexcept override;
  GrowthPlace growth_place(const Hit& hit) const noexcept override { return solid_.growth_place(hit); }

 private:
  // Narrows the ray to the half that is kept; false where it misses it. `enters` where it comes in through the plane.
  bool clip(Ray& ray, bool& enters) const noexcept;
  static Vec3 along(const Ray& ray, float t) noexcept { return Vec3(ray.origin) + static_cast<double>(t) * Vec3(ray.direction); }

  const UnitedSolid& solid_;
  Vec3 normal_;
};

}  // namespace whorl::trace
