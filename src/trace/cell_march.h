// SPDX-License-Identifier: Apache-2.0
// One ray through one cell: where the state changes, on the cubics or on the functions themselves.
#pragma once

#include "trace/cells.h"
#include "trace/surfaces.h"

namespace whorl::trace {

/// The stretch of a ray inside a cell.
struct CellSegment {
  float t0, t1;
};

/// A ray made ready for many cells. The fourth lane of each register is idle.
struct CellRay {
  Float4 origin, direction, inverse, inverse_size;
  explicit CellRay(const Ray& ray);
};

/// Clips [t_min, t_max] of the ray to the cell, widened by a few units in the last place so that neighbours leave no gap.
bool clip(const Cell& cell, const CellRay& ray, float t_min, float t_max, CellSegment& segment);

/// Where a ray first finds solid.
struct CellHit {
  float t = 0.0f;
  std::uint8_t function = 0;                        // whose surface it is, an index within the cell
  field::State before = field::State::kOutside;     // the air it came from
};

/// The first place on the segment that is solid. The watertight rule: neighbouring cubics differ by the tolerance, so a ray
/// that should have changed state just before a shared face is caught at the entry of the next cell.
bool first_solid(const Cell& cell, const CellRay& ray, CellSegment segment, CellHit& hit);

/// The same on the functions themselves, by sphere tracing with the cell's own bounds of steepness.
bool first_solid_exact(const field::Field& field, const CellSet& set, const Cell& cell, const CellRay& ray,
                       CellSegment segment, CellHit& hit);

/// A place where the state along a ray changes.
struct Change {
  float t;
  field::State after;
  std::uint8_t function;
};

/// All changes of state on the segment, with the state at its start; `capacity` changes at the most are written.
int changes(const Cell& cell, const CellRay& ray, CellSegment segment, field::State& at_start, Change* out, int capacity);
int changes_exact(const field::Field& field, const CellSet& set, const Cell& cell, const CellRay& ray, CellSegment segment,
                  field::State& at_start, Change* out, int capacity);

}  // namespace whorl::trace
