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

bool SectionedSolid::solid_at(const Ray& ray, float t) const noexcept {
  return solid_.field().place_at(Vec3(ray.origin) + static_cast<double>(t) * Vec3(ray.direction)).state ==
         field::State::kSolid;
}

bool SectionedSolid::closest(const Ray& ray, Hit& hit) const noexcept {
  Ray kept = ray;
  bool enters;
  if (!clip(kept, enters)) return false;
  if (!enters || !solid_at(kept, kept.t_min)) return solid_.closest(kept, hit);
  const Vec3 p = Vec3(kept.origin) + static_cast<double>(kept.t_min) * Vec3(kept.direction);
  const field::Place place = solid_.field().place_at(p);
  hit = {};
  hit.t = kept.t_min;
  hit.position = Vec3f(p);
  hit.normal = Vec3f(normal_);
  hit.part = Part::kCutFace;
  hit.passage = place.owner.part == field::Part::kWhorl ? place.owner.theta : solid_.field().scene().law.theta_start;
  hit.safe_offset = static_cast<float>(1e-6 * solid_.field().scene().height_mm);
  return true;
}

bool SectionedSolid::occluded(const Ray& ray) const noexcept {
  Ray kept = ray;
  bool enters;
  if (!clip(kept, enters)) return false;
  return (enters && solid_at(kept, kept.t_min)) || solid_.occluded(kept);
}

}  // namespace whorl::trace
