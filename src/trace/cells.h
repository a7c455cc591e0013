// SPDX-License-Identifier: Apache-2.0
// Surface cells: disjoint boxes, each with everything that decides what is solid inside it.
#pragma once

#include "field/field.h"
#include "trace/cubic.h"

#include <cmath>
#include <cstdint>
#include <limits>
#include <vector>

namespace whorl::trace {

/// How a cell is marched.
enum class CellKind : std::uint8_t {
  kSolidWherePositive,  // one function, solid where it is positive
  kSolidWhereNegative,  // one function, solid where it is negative
  kByGrowthOrder,       // several functions
  kExact,               // no cubic fits at the smallest size: the functions themselves
};

/// One function that changes sign in the cell, as a cubic of local coordinates (-1 .. 1); mm.
struct alignas(16) CellTerm {
  float cubic[kCubicTerms];
  float steepness;  // bound of the exact function's gradient in the cell
  field::Part part;
  double theta;     // of the passage
};

/// One whorl (or embryonic shell, or columella) in growth order. An index names a term of the cell.
struct CellOwner {
  static constexpr std::int8_t kAlways = -1, kNever = -2;  // surely positive, surely negative all over the cell
  std::int8_t outer = kNever, hollow = kNever, opening = kNever;
};

struct Cell {
  float centre[3];
  float half;
  std::uint32_t first_term, first_owner;
  std::uint8_t term_count, owner_count;
  CellKind kind;
};

/// What rounding to floats may move a face of the cell by, along one axis: marching and hierarchy take cells for that much
/// larger, so that neighbours overlap rather than part.
inline float padding(const Cell& cell, int axis) {
  return 4.0f * std::numeric_limits<float>::epsilon() * (std::abs(cell.centre[axis]) + cell.half);
}

struct CellSet {
  std::vector<Cell> cells;
  std::vector<CellTerm> terms;
  std::vector<CellOwner> owners;
  double tolerance_mm = 0.0;
  double smallest_half = 0.0;
  std::size_t exact_cells = 0;

  std::size_t bytes() const {
    return cells.size() * sizeof(Cell) + terms.size() * sizeof(CellTerm) + owners.size() * sizeof(CellOwner);
  }
};

/// The first owner in growth order whose outside is positive decides. Bit i of `positive` is the sign of term i.
inline field::State decide(const CellOwner* owners, int count, std::uint64_t positive) {
  const auto holds = [positive](std::int8_t i) { return i == CellOwner::kAlways || (i >= 0 && (positive >> i & 1u)); };
  for (int k = 0; k < count; ++k)
    if (holds(owners[k].outer))
      return holds(owners[k].hollow) || holds(owners[k].opening) ? field::State::kLumen : field::State::kSolid;
  return field::State::kOutside;
}

/// Splits space until the zero set of every cell's cubics lies within `tolerance_mm` of the function's own (verified on
/// lines away from the fitted points). Cells that can hold no boundary are left out. Deterministic for any number of threads.
CellSet build_cells(const field::Field& field, double tolerance_mm);

}  // namespace whorl::trace
