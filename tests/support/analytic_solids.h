// SPDX-License-Identifier: Apache-2.0
// Solids with closed-form hits, to test light without the shell's own geometry.
#pragma once

#include "trace/surfaces.h"

#include <algorithm>
#include <cmath>

namespace whorl::test {

/// Clear of float rounding for solids of about unit size.
inline constexpr float kSafeOffset = 1e-4f;

/// A solid ball seen from outside.
class Ball final : public trace::Surfaces {
 public:
  Ball(const Vec3f& centre, float radius, trace::Part part = trace::Part::kExterior)
      : centre_(centre), radius_(radius), part_(part) {}

  bool closest(const trace::Ray& ray, trace::Hit& hit) const noexcept override {
    const Vec3f to_centre = centre_ - ray.origin;
    const float along = to_centre.dot(ray.direction);
    const Vec3f across = to_centre - ray.direction * along;
    const float half2 = radius_ * radius_ - across.dot(across);
    if (half2 < 0.0f) return false;
    const float t = along - std::sqrt(half2);
    if (t < ray.t_min || t > ray.t_max) return false;
    hit.t = t;
    hit.normal = (ray.origin + ray.direction * t - centre_).normalized();
    hit.position = centre_ + hit.normal * radius_;
    hit.part = part_;
    hit.safe_offset = kSafeOffset;
    return true;
  }
  bool occluded(const trace::Ray& ray) const noexcept override {
    trace::Hit unused;
    return closest(ray, unused);
  }
  trace::GrowthPlace growth_place(const trace::Hit&) const noexcept override { return {1.5f, 30.0f}; }

 private:
  Vec3f centre_;
  float radius_;
  trace::Part part_;
};

/// A hollow sphere about the origin with walls of no thickness and a round opening: the cap round +z whose share of the
/// sphere's area is `opening`. Inside is kInterior, outside kExterior.
class OpenSphere final : public trace::Surfaces {
 public:
  OpenSphere(float radius, double opening) : radius_(radius), rim_z_(radius * static_cast<float>(1.0 - 2.0 * opening)) {}

  bool closest(const trace::Ray& ray, trace::Hit& hit) const noexcept override {
    const float along = -ray.origin.dot(ray.direction);
    const Vec3f across = -ray.origin - ray.direction * along;
    const float half2 = radius_ * radius_ - across.dot(across);
    if (half2 < 0.0f) return false;
    const float half = std::sqrt(half2);
    for (const float side : {-1.0f, 1.0f}) {
      const float t = along + side * half;
      if (t < ray.t_min || t > ray.t_max) continue;
      const Vec3f outwards = (ray.origin + ray.direction * t).normalized();
      if (outwards.z * radius_ > rim_z_) continue;
      hit.t = t;
      hit.position = outwards * radius_;
      hit.normal = side < 0.0f ? outwards : -outwards;
      hit.part = side < 0.0f ? trace::Part::kExterior : trace::Part::kInterior;
      hit.safe_offset = kSafeOffset;
      return true;
    }
    return false;
  }
  bool occluded(const trace::Ray& ray) const noexcept override {
    trace::Hit unused;
    return closest(ray, unused);
  }
  trace::GrowthPlace growth_place(const trace::Hit&) const noexcept override { return {}; }

 private:
  float radius_, rim_z_;
};

/// A round card of no thickness; both faces are hit, the normal is that of the face.
class Card final : public trace::Surfaces {
 public:
  Card(const Vec3f& centre, const Vec3f& normal, float radius, trace::Part part = trace::Part::kExterior)
      : centre_(centre), normal_(normal.normalized()), radius_(radius), part_(part) {}

  bool closest(const trace::Ray& ray, trace::Hit& hit) const noexcept override {
    const float slope = ray.direction.dot(normal_);
    if (slope == 0.0f) return false;
    const float t = (centre_ - ray.origin).dot(normal_) / slope;
    if (t < ray.t_min || t > ray.t_max) return false;
    const Vec3f place = ray.origin + ray.direction * t;
    if ((place - centre_).length2() > radius_ * radius_) return false;
    hit.t = t;
    hit.position = place;
    hit.normal = slope < 0.0f ? normal_ : -normal_;
    hit.part = part_;
    hit.safe_offset = kSafeOffset;
    return true;
  }
  bool occluded(const trace::Ray& ray) const noexcept override {
    trace::Hit unused;
    return closest(ray, unused);
  }
  trace::GrowthPlace growth_place(const trace::Hit&) const noexcept override { return {}; }

 private:
  Vec3f centre_, normal_;
  float radius_;
  trace::Part part_;
};

/// Nothing at all.
class Void final : public trace::Surfaces {
 public:
  bool closest(const trace::Ray&, trace::Hit&) const noexcept override { return false; }
  bool occluded(const trace::Ray&) const noexcept override { return false; }
  trace::GrowthPlace growth_place(const trace::Hit&) const noexcept override { return {}; }
};

}  // namespace whorl::test
