// SPDX-License-Identifier: Apache-2.0
// Rays against the half of a shell.
#include "trace/sectioned_solid.h"

#include <algorithm>

namespace whorl::trace {

bool SectionedSolid::clip(Ray& ray, bool& enters) const noexcept {
  const double at_origin = normal_.dot(Vec3(ray.origin)), rate = normal_.dot(Vec3(ray.direction));
  const double at_start = at_origin + rate * static_cast<double>(ray.t_min);
  enters = false;
  if (at_start > 0.0) {
    if (rate >= 0.0) return false;
    ray.t_min = static_cast<float>(-at_origin / rate);
    enters = true;
  } else if (rate > 0.0) {
    ray.t_max = std::min(ray.t_max, static_cast<float>(-at_origin / rate));
  }
  return ray.t_min <= ray.t_max;
}

bool SectionedSolid::closest(const Ray& ray, Hit& hit) const noexcept {
  Ray kept = ray;
  bool enters;
  if (!clip(kept, enters)) return false;
  const Vec3 p = along(kept, kept.t_min);
  double passage;
  if (!enters || !solid_.solid_at(p, passage)) return solid_.closest(kept, hit);
  hit = {};
  hit.t = kept.t_min;
  hit.position = Vec3f(p);
  hit.normal = Vec3f(normal_);
  hit.part = Part::kCutFace;
  hit.passage = passage;
  hit.safe_offset = static_cast<float>(1e-6 * solid_.field().scene().height_mm);
  return true;
}

bool SectionedSolid::occluded(const Ray& ray) const noexcept {
  Ray kept = ray;
  bool enters;
  if (!clip(kept, enters)) return false;
  double passage;
  return (enters && solid_.solid_at(along(kept, kept.t_min), passage)) || solid_.occluded(kept);
}

}  // namespace whorl::trace
