// SPDX-License-Identifier: Apache-2.0
// A ray against a bead: a convex body of two half ellipsoids that share their equator.
#pragma once

#include "scene/attached.h"
#include "trace/surfaces.h"

namespace whorl::trace {

/// Where a ray is within a convex body: from `in` to `out`.
struct Through {
  double in, out;
};
/// False where the line misses. Distances may be negative.
bool through_bead(const scene::Bead& bead, const Ray& ray, Through& through) noexcept;
bool holds(const scene::Bead& bead, const Vec3& p) noexcept;
/// Unit, outwards, at a place of its surface.
Vec3 normal_of(const scene::Bead& bead, const Vec3& p) noexcept;

}  // namespace whorl::trace
