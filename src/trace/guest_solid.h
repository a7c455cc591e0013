// SPDX-License-Identifier: Apache-2.0
// Another scene's shell on this one, traced in its own frame.
#pragma once

#include "trace/attached_solids.h"
#include "trace/embree_solid.h"
#include "trace/ray_box.h"

namespace whorl::trace {

/// The guest must outlive it. Hits are ornament of the shell that it stands on.
class GuestSolid {
 public:
  explicit GuestSolid(const scene::Guest& guest)
      : guest_(guest), field_(*guest.shell), solid_(field_, {kTolerance * guest.shell->height_mm, false}), box_(scene::box_of(guest)) {}
  GuestSolid(const GuestSolid&) = delete;
  GuestSolid& operator=(const GuestSolid&) = delete;

  bool meets_box(const Ray& ray) const {
    double t0 = static_cast<double>(ray.t_min), t1 = static_cast<double>(ray.t_max);
    return clip(ray, box_, t0, t1);
  }
  bool closest(const Ray& ray, Hit& hit) const {
    if (!meets_box(ray)) return false;
    Hit own;
    if (!solid_.closest(to_own(ray), own)) return false;
    hit = {};
    hit.t = own.t;
    hit.position = ray.origin + own.t * ray.direction;
    hit.normal = Vec3f(guest_.frame.to_world(Vec3(own.normal)));
    hit.part = Part::kOrnament;
    hit.series = guest_.series + (own.part == Part::kInterior && !own.parietal ? 1 : 0);
    hit.passage = guest_.passage;
    hit.safe_offset = own.safe_offset;
    return true;
  }
  bool occluded(const Ray& ray) const { return meets_box(ray) && solid_.occluded(to_own(ray)); }
  bool holds(const Vec3& p) const { return box_.intersects(p) && field_.place_at(guest_.frame.to_frame(p - guest_.origin)).state == field::State::kSolid; }
  void add_stretches(const Ray& ray, std::vector<AttachedSolids::Within>& out) const {
    if (!meets_box(ray)) return;
    thread_local std::vector<Crossing> met;
    const Ray own = to_own(ray);
    solid_.crossings(own, field_.place_at(Vec3(own.origin) + static_cast<double>(own.t_min) * Vec3(own.direction)).state, met);
    for (std::size_t i = 0; i < met.size(); ++i)
      if (met[i].after == field::State::kSolid)
        out.push_back({static_cast<double>(met[i].t), static_cast<double>(i + 1 < met.size() ? met[i + 1].t : ray.t_max)});
  }
  std::size_t bytes() const { return solid_.cells().bytes() + solid_.hierarchy_bytes(); }

 private:
  static constexpr double kTolerance = 1e-5;  // of its height

  Ray to_own(const Ray& ray) const {
    Ray own = ray;
    own.origin = Vec3f(guest_.frame.to_frame(Vec3(ray.origin) - guest_.origin));
    own.direction = Vec3f(guest_.frame.to_frame(Vec3(ray.direction)));
    return own;
  }

  const scene::Guest& guest_;
  field::Field field_;
  EmbreeSolid solid_;
  Box3 box_;
};

}  // namespace whorl::trace
