// SPDX-License-Identifier: Apache-2.0
// The shell as something rays can meet: surface cells as Embree user primitives.
#pragma once

#include "field/field.h"
#include "trace/cells.h"
#include "trace/surfaces.h"

#include <memory>
#include <vector>

namespace whorl::trace {

/// A stretch of a ray with one state.
struct Stretch {
  float t0, t1;
  field::State state;
};

/// What a ray meets at one change of state.
struct Crossing {
  float t;
  field::State before, after;
  field::Part part;
  double theta;  // of the passage
};

struct SolidOptions {
  double tolerance_mm = 1e-3;  // greatest distance of a cell's surface from the true one
  bool exact = false;          // march the functions themselves in every cell
};

class EmbreeSolid final : public Surfaces {
 public:
  /// Builds the cells and their hierarchy. The field must outlive the solid. Throws diagnostics::Error where Embree fails.
  EmbreeSolid(const field::Field& field, const SolidOptions& options);
  ~EmbreeSolid() override;
  EmbreeSolid(const EmbreeSolid&) = delete;
  EmbreeSolid& operator=(const EmbreeSolid&) = delete;

  bool closest(const Ray& ray, Hit& hit) const noexcept override;
  bool occluded(const Ray& ray) const noexcept override;
  GrowthPlace growth_place(const Hit& hit) const noexcept override;

  /// Every change of state along the ray, front to back. The ray starts in the state `start`.
  void crossings(const Ray& ray, field::State start, std::vector<Crossing>& out) const;

  const CellSet& cells() const;
  const field::Field& field() const;
  double cell_seconds() const;       // spent on the cells
  double hierarchy_seconds() const;  // spent on Embree's hierarchy
  std::size_t hierarchy_bytes() const;  // that Embree holds
  /// Switches between cubics and the functions themselves. Not while rays are traced.
  void set_exact(bool exact);

 private:
  struct Impl;
  std::unique_ptr<Impl> impl_;
};

}  // namespace whorl::trace
