// SPDX-License-Identifier: Apache-2.0
// The internal mould of a shell: the fill of its lumen up to the aperture, with or without the shell cut open round it.
#pragma once

#include "trace/sectioned_solid.h"

#include <optional>

namespace whorl::trace {

class MouldSolid final : public Surfaces {
 public:
  /// The mould alone. The shell must outlive it.
  explicit MouldSolid(const EmbreeSolid& shell) : shell_(shell) {}
  /// The mould, and behind the plane through the pole the shell with all that stands on it: what lies on the side of `open_towards`
  /// (unit) is taken away.
  MouldSolid(const UnitedSolid& shell, const Vec3& open_towards) : shell_(shell.shell()) { rest_.emplace(shell, open_towards); }

  bool closest(const Ray& ray, Hit& hit) const noexcept override;
  bool occluded(const Ray& ray) const noexcept override;
  GrowthPlace growth_place(const Hit& hit) const noexcept override { return shell_.growth_place(hit); }

 private:
  /// Where the ray first comes into the lumen; the crossing's `before` is the lumen itself if it starts there. False for nowhere.
  bool entry(const Ray& ray, Crossing& found) const;

  const EmbreeSolid& shell_;
  std::optional<SectionedSolid> rest_;
};

}  // namespace whorl::trace
