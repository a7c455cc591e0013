// SPDX-License-Identifier: Apache-2.0
// Two quadratics, of which each counts on its own side of the equator.
#include "trace/bead.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace whorl::trace {
namespace {

Vec3 in_unit(const scene::Bead& b, const Vec3& v) noexcept { return {Vec3(b.rows[0]).dot(v), Vec3(b.rows[1]).dot(v), Vec3(b.rows[2]).dot(v)}; }

}  // namespace

bool through_bead(const scene::Bead& bead, const Ray& ray, Through& through) noexcept {
  const Vec3 from = in_unit(bead, Vec3(ray.origin) - Vec3(bead.centre)), along = in_unit(bead, Vec3(ray.direction));
  constexpr double kNone = std::numeric_limits<double>::infinity();
  through = {kNone, -kNone};
  for (const double z_scale : {1.0, static_cast<double>(bead.below)}) {
    const Vec3 o(from.x, from.y, from.z * z_scale), d(along.x, along.y, along.z * z_scale);
    const double a = d.dot(d), middle = -o.dot(d) / a;
    const Vec3 nearest = o + middle * d;  // not b^2 - 4ac, which cancels from afar
    const double half2 = (1.0 - nearest.dot(nearest)) / a;
    if (half2 < 0.0) {
      if (bead.below >= 1.0f) break;  // the lower half lies within the upper one's mirror image: a miss of that is a miss of both
      continue;
    }
    const double half = std::sqrt(half2);
    if (bead.below == 1.0f) {
      through = {middle - half, middle + half};
      return true;
    }
    for (const double t : {middle - half, middle + half}) {
      const bool above = from.z + t * along.z >= 0.0;
      if (above != (z_scale == 1.0)) continue;
      through.in = std::min(through.in, t);
      through.out = std::max(through.out, t);
    }
  }
  return through.in <= through.out;
}

bool holds(const scene::Bead& bead, const Vec3& p) noexcept {
  Vec3 u = in_unit(bead, p - Vec3(bead.centre));
  if (u.z < 0.0) u.z *= static_cast<double>(bead.below);
  return u.length2() < 1.0;
}

Vec3 normal_of(const scene::Bead& bead, const Vec3& p) noexcept {
  Vec3 u = in_unit(bead, p - Vec3(bead.centre));
  if (u.z < 0.0) u.z *= static_cast<double>(bead.below) * static_cast<double>(bead.below);
  return (u.x * Vec3(bead.rows[0]) + u.y * Vec3(bead.rows[1]) + u.z * Vec3(bead.rows[2])).normalized();
}

}  // namespace whorl::trace
