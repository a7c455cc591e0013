// SPDX-License-Identifier: Apache-2.0
// Surface cells: disjoint boxes, each with everything that decides what is solid inside it.
#pragma once

#include "field/field.h"
#include "trace/cubic.h"

#include <cmath>
#include <cstddef>
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

/// One whorl (or embryonic shell, or columella) in growth order. An index names a function of the cell.
struct CellOwner {
  static constexpr std::int8_t kAlways = -1, kNever = -2;  // surely positive, surely negative all over the cell
  std::int8_t outer = kNever, hollow = kNever, opening = kNever;
};

/// What a ray does not need of a function until it has met it.
struct FunctionFacts {
  double theta = 0.0;      // of the passage
  float steepness = 0.0f;  // bound of the exact function's gradient in the cell
  field::Part part = field::Part::kWhorl;

  field::Term term() const { return {part, theta}; }
};

/// The head of a cell. Its cubics and its owners follow it in memory, so that a ray waits once for all of them.
/// Lives in a CellSet only.
struct alignas(16) Cell {
  float centre[3];
  float half;
  std::uint32_t first_facts;  // of its functions, in CellSet::facts
  std::uint8_t function_count, owner_count;
  CellKind kind;
  field::State air;  // of a cell with one function: what is on the side that is not solid

  /// One cubic of local coordinates (-1 .. 1) for each function that changes sign in the cell; mm.
  const Cubic* cubics() const { return reinterpret_cast<const Cubic*>(this + 1); }
  const CellOwner* owners() const { return reinterpret_cast<const CellOwner*>(cubics() + function_count); }
};
static_assert(sizeof(Cell) == 32 && sizeof(Cubic) == 80 && sizeof(CellOwner) == 3);

/// What rounding to floats may move a face of the cell by, along one axis: marching and hierarchy take cells for that much
/// larger, so that neighbours overlap rather than part.
inline constexpr float kPadding = 4.0f * std::numeric_limits<float>::epsilon();
inline float padding(const Cell& cell, int axis) { return kPadding * (std::abs(cell.centre[axis]) + cell.half); }

class CellSet {
 public:
  std::size_t size() const { return starts_.size(); }
  const Cell& cell(std::size_t i) const { return reinterpret_cast<const Cell&>(tape_[starts_[i]]); }
  const FunctionFacts* facts(const Cell& cell) const { return facts_.data() + cell.first_facts; }

  std::size_t functions() const { return facts_.size(); }
  std::size_t exact_cells() const { return exact_cells_; }
  std::size_t bytes() const {
    return starts_.size() * sizeof(starts_[0]) + tape_.size() * sizeof(Line) + facts_.size() * sizeof(FunctionFacts);
  }

  double tolerance_mm = 0.0;

  /// Adds a cell; its `first_facts` and counts are filled in.
  void add(Cell head, const std::vector<Cubic>& cubics, const std::vector<CellOwner>& owners,
           const std::vector<FunctionFacts>& facts);
  /// Adds all cells of another set behind its own.
  void append(const CellSet& other);

 private:
  struct alignas(64) Line {  // of the processor's cache
    std::byte bytes[64];
  };
  std::vector<std::uint32_t> starts_;  // of each cell, an index of the tape
  std::vector<Line> tape_;
  std::vector<FunctionFacts> facts_;
  std::size_t exact_cells_ = 0;
};

/// The first owner in growth order whose outside is positive decides. Bit i of `positive` is the sign of function i.
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
