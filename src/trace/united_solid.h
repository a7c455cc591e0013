// SPDX-License-Identifier: Apache-2.0
// The shell and all that stands on it as one solid.
#pragma once

#include "trace/attached_solids.h"
#include "trace/embree_solid.h"

namespace whorl::trace {

class UnitedSolid final : public Surfaces {
 public:
  /// `attached` may be null. Both must outlive this.
  UnitedSolid(const EmbreeSolid& shell, const AttachedSolids* attached) : shell_(shell), attached_(attached) {}

  bool closest(const Ray& ray, Hit& hit) const noexcept override {
    const bool shell = shell_.closest(ray, hit);
    if (!attached_) return shell;
    Ray rest = ray;
    if (shell) rest.t_max = hit.t;
    return attached_->closest(rest, hit) || shell;
  }
  bool occluded(const Ray& ray) const noexcept override { return shell_.occluded(ray) || (attached_ && attached_->occluded(ray)); }
  GrowthPlace growth_place(const Hit& hit) const noexcept override { return shell_.growth_place(hit); }

  /// Whether a place is within solid matter, and on which passage.
  bool solid_at(const Vec3& p, double& passage) const noexcept {
    const field::Place place = shell_.field().place_at(p);
    passage = place.owner.part == field::Part::kWhorl ? place.owner.theta : shell_.field().scene().law.theta_start;
    return place.state == field::State::kSolid || (attached_ && attached_->holds(p));
  }
  const field::Field& field() const { return shell_.field(); }
  const EmbreeSolid& shell() const { return shell_; }
  const AttachedSolids* attached() const { return attached_; }

 private:
  const EmbreeSolid& shell_;
  const AttachedSolids* attached_;
};

}  // namespace whorl::trace
