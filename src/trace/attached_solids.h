// SPDX-License-Identifier: Apache-2.0
// All that stands on the shell as something rays can meet: beads, horns and ledges as Embree user primitives.
#pragma once

#include "field/field.h"
#include "trace/surfaces.h"

#include <cstddef>
#include <memory>
#include <vector>

namespace whorl::trace {

class AttachedSolids final : public Surfaces {
 public:
  /// Takes the scene's attached solids. What would stand in a lumen is left out: a shell resorbs what bars the next whorl's way.
  /// The field must outlive it. Throws diagnostics::Error where Embree fails.
  explicit AttachedSolids(const field::Field& field);
  ~AttachedSolids() override;
  AttachedSolids(const AttachedSolids&) = delete;
  AttachedSolids& operator=(const AttachedSolids&) = delete;

  bool closest(const Ray& ray, Hit& hit) const noexcept override;
  bool occluded(const Ray& ray) const noexcept override;
  GrowthPlace growth_place(const Hit& hit) const noexcept override;

  /// Whether any of them holds a place.
  bool holds(const Vec3& p) const noexcept;
  /// The stretches of the ray that lie within them, united and in order.
  struct Within {
    double in, out;
  };
  void stretches(const Ray& ray, std::vector<Within>& out) const;

  std::size_t size() const;      // elements that stand, a lamella or stripe counted by its pieces
  std::size_t left_out() const;  // elements in a lumen
  std::size_t bytes() const;     // of records and hierarchy

 private:
  struct Impl;
  std::unique_ptr<Impl> impl_;
};

}  // namespace whorl::trace
