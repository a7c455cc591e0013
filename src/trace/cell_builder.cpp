// SPDX-License-Identifier: Apache-2.0
// Octree construction of the surface cells.
#include "trace/cells.h"

#include "math/parallel.h"
#include "trace/unit_cubic.h"

#include <algorithm>
#include <bit>
#include <cmath>

namespace whorl::trace {
namespace {

using field::Part;
using field::Term;

enum class Sign : std::int8_t { kNegative, kUnknown, kPositive };

Sign sign_of(const Interval& range) {
  return range.lo > 0.0 ? Sign::kPositive : range.hi < 0.0 ? Sign::kNegative : Sign::kUnknown;
}

struct Owner {
  Part part;         // of its outside
  double theta;      // passage, or 0
  Sign outer = Sign::kUnknown, hollow = Sign::kNegative, opening = Sign::kNegative;
  double opening_theta = 0.0;

  Term outer_term() const { return {part, theta}; }
  Term hollow_term() const { return {part == Part::kWhorl ? Part::kWhorlHollow : Part::kChamberHollow, theta}; }
  Term opening_term() const { return {Part::kChamberOpening, opening_theta}; }
};

constexpr std::size_t kMostFunctions = 24;
constexpr int kSpreadDepth = 4;        // the octree's upper levels, built by one thread, hand the rest to all
constexpr double kFitBelow = 0.6;      // of the smallest half-breadth at hand: above this cells are split unfitted
constexpr double kRelative = 0.05;     // error allowed as a part of the function's own value
constexpr int kFinest = 13;            // levels below the root: a cell of 1/8192 of the shell

// A function over a box, as a cubic (none where the cell will be marched exactly).
struct Fitted {
  Cubic cubic;
  FunctionFacts facts;
};

struct Job {
  Box3 box;
  std::vector<Owner> owners;
};

bool holds_axis(const Box3& box) {
  return box.min.x <= 0.0 && box.max.x >= 0.0 && box.min.y <= 0.0 && box.max.y >= 0.0;
}

double centre_azimuth(const Box3& box) {
  const Vec3 c = 0.5 * (box.min + box.max);
  return std::atan2(c.y, c.x);
}

class Builder {
 public:
  Builder(const field::Field& field, double tolerance, double smallest_half, CellSet& out)
      : field_(field), tolerance_(tolerance), smallest_half_(smallest_half), out_(out) {}

  // Narrows the owners' signs over the box; false where the box holds no boundary.
  bool narrow(const Box3& box, std::vector<Owner>& owners) const;
  void build(const Box3& box, const std::vector<Owner>& owners);
  std::vector<Owner> for_child(const Box3& parent, const Box3& child, std::vector<Owner> owners) const;
  std::vector<Owner> all_owners(const Box3& box) const;

 private:
  bool fit(const Box3& box, std::vector<Owner>& owners);
  void emit(const Box3& box, const std::vector<Owner>& owners, const std::vector<Fitted>& fitted, bool exact);
  bool verified(const Box3& box, const Term& term, const Cubic& cubic) const;
  bool fit_term_values(const Box3& box, const Term& term, Fitted& out, Sign& sign) const;

  const field::Field& field_;
  double tolerance_, smallest_half_;
  CellSet& out_;
};

// Which states can occur, as bits.
unsigned possible_states(const std::vector<Owner>& owners) {
  unsigned states = 0;
  const auto bit = [](field::State s) { return 1u << static_cast<unsigned>(s); };
  for (const Owner& o : owners) {
    if (o.outer == Sign::kNegative) continue;
    const bool surely_hollow = o.hollow == Sign::kPositive || o.opening == Sign::kPositive;
    if (surely_hollow || o.hollow == Sign::kUnknown || o.opening == Sign::kUnknown) states |= bit(field::State::kLumen);
    if (!surely_hollow) states |= bit(field::State::kSolid);
    if (o.outer == Sign::kPositive) return states;
  }
  return states | bit(field::State::kOutside);
}

// Drops owners that can't hold the box and those behind one that surely does.
bool simplify(std::vector<Owner>& owners) {
  std::erase_if(owners, [](const Owner& o) { return o.outer == Sign::kNegative; });
  for (std::size_t i = 0; i < owners.size(); ++i) {
    Owner& o = owners[i];
    if (o.hollow == Sign::kPositive) o.opening = Sign::kNegative;
    if (o.opening == Sign::kPositive) o.hollow = Sign::kNegative;
    if (o.outer == Sign::kPositive) owners.resize(i + 1);
  }
  return std::popcount(possible_states(owners)) > 1;
}

bool Builder::narrow(const Box3& box, std::vector<Owner>& owners) const {
  for (Owner& o : owners) {
    if (o.part == Part::kWhorl) {
      if (o.outer != Sign::kUnknown && o.hollow != Sign::kUnknown) continue;
      Interval outer, hollow;
      field_.whorl_bounds(box, o.theta, outer, hollow);
      if (o.outer == Sign::kUnknown) o.outer = sign_of(outer);
      if (o.hollow == Sign::kUnknown) o.hollow = sign_of(hollow);
    } else {
      if (o.outer == Sign::kUnknown) o.outer = sign_of(field_.bounds(o.outer_term(), box));
      if (o.hollow == Sign::kUnknown) o.hollow = sign_of(field_.bounds(o.hollow_term(), box));
      if (o.opening == Sign::kUnknown) o.opening = sign_of(field_.bounds(o.opening_term(), box));
    }
    if (o.outer == Sign::kPositive) break;
  }
  return simplify(owners);
}

// Everything that can own a place in the box, unjudged.
std::vector<Owner> Builder::all_owners(const Box3& box) const {
  std::vector<Owner> owners;
  Owner chamber{Part::kChamber, 0.0};
  chamber.hollow = Sign::kUnknown;
  if (field_.scene().chamber.open) chamber.opening = Sign::kUnknown;
  chamber.opening_theta = field_.opening_theta();
  owners.push_back(chamber);
  if (field_.scene().pillar.present) owners.push_back({Part::kPillar, 0.0});
  // One passage more at either end: a box that spreads over azimuths reaches half a turn before and after its middle.
  double first, last;
  field_.passages(centre_azimuth(box), first, last);
  for (double theta = first - kTwoPi; theta <= last + kTwoPi + 1e-9; theta += kTwoPi) {
    Owner o{Part::kWhorl, theta};
    o.hollow = Sign::kUnknown;
    owners.push_back(o);
  }
  return owners;
}

// Passages follow the azimuth from parent to child, also across the seam at +-pi: one shift for all of them. Round the
// axis there is no such shift, and a child begins anew.
std::vector<Owner> Builder::for_child(const Box3& parent, const Box3& child, std::vector<Owner> owners) const {
  if (holds_axis(parent)) return all_owners(child);
  const double shift = std::remainder(centre_azimuth(child) - centre_azimuth(parent), kTwoPi);
  for (Owner& o : owners)
    if (o.part == Part::kWhorl) o.theta += shift;
  return owners;
}

// Whether the cubic is true where it matters: on its own zero set, found along the edges, the middle lines of the faces
// and those of the cell (away from the fitted points, whose residuals flatter), and not far off at the corners.
bool Builder::verified(const Box3& box, const Term& term, const Cubic& cubic) const {
  const Vec3 c = 0.5 * (box.min + box.max);
  const double half = 0.5 * (box.max.x - box.min.x);
  for (int corner = 0; corner < 8; ++corner) {
    const float x = corner & 1 ? 1.0f : -1.0f, y = corner & 2 ? 1.0f : -1.0f, z = corner & 4 ? 1.0f : -1.0f;
    const double v = field_.value(term, c + half * Vec3(x, y, z));
    if (std::abs(v - static_cast<double>(evaluate(cubic, x, y, z))) > tolerance_ + kRelative * std::abs(v)) return false;
  }
  const Float4 s{-1.0f, -1.0f / 3.0f, 1.0f / 3.0f, 1.0f};
  for (int axis = 0; axis < 3; ++axis)
    for (float u = -1.0f; u <= 1.0f; u += 1.0f)
      for (float v = -1.0f; v <= 1.0f; v += 1.0f) {
        const Float4 line[3] = {axis == 0 ? s : splat(u), axis == 1 ? s : axis == 0 ? splat(u) : splat(v),
                                axis == 2 ? s : splat(v)};
        float roots[3];
        const int count = sign_changes(UnitCubic::through(evaluate(cubic, line[0], line[1], line[2])), roots);
        for (int i = 0; i < count; ++i) {
          Vec3 p;
          for (int k = 0; k < 3; ++k)
            p[k] = k == axis ? 2.0 * static_cast<double>(roots[i]) - 1.0 : static_cast<double>(line[k][0]);
          if (std::abs(field_.value(term, c + half * p)) > tolerance_) return false;
        }
      }
  return true;
}

// Fits one function; false where no cubic is near enough.
bool Builder::fit_term_values(const Box3& box, const Term& term, Fitted& out, Sign& sign) const {
  const Vec3 c = 0.5 * (box.min + box.max);
  const double half = 0.5 * (box.max.x - box.min.x);
  std::array<double, kFitNodes * kFitNodes * kFitNodes> values;
  const auto& n = fit_nodes();
  double least = 1e300;
  std::size_t at = 0;
  for (std::size_t k = 0; k < kFitNodes; ++k)
    for (std::size_t j = 0; j < kFitNodes; ++j)
      for (std::size_t i = 0; i < kFitNodes; ++i) {
        const double v = field_.value(term, c + half * Vec3(n[i], n[j], n[k]));
        values[at++] = v;
        least = std::min(least, std::abs(v));
      }
  const CubicFit fit = fit_cubic(values);
  if (fit.left_out > 3.0 * tolerance_ + kRelative * least) return false;
  out.cubic = fit.cubic;
  if (!verified(box, term, out.cubic)) return false;
  const double swing = fit.swing + 2.0 * tolerance_;
  if (fit.middle > swing + kRelative * std::abs(fit.middle)) sign = Sign::kPositive;
  if (-fit.middle > swing + kRelative * std::abs(fit.middle)) sign = Sign::kNegative;
  out.facts = {term.theta, static_cast<float>(field_.steepness(term, box)), term.part};
  return true;
}

void Builder::emit(const Box3& box, const std::vector<Owner>& owners, const std::vector<Fitted>& fitted, bool exact) {
  Cell cell{};
  for (int i = 0; i < 3; ++i) cell.centre[i] = static_cast<float>(0.5 * (box.min[i] + box.max[i]));
  cell.half = static_cast<float>(0.5 * (box.max.x - box.min.x));
  std::vector<Cubic> cubics;
  std::vector<FunctionFacts> facts;
  const auto index = [&](Sign sign, const Term& term) -> std::int8_t {
    if (sign == Sign::kPositive) return CellOwner::kAlways;
    if (sign == Sign::kNegative) return CellOwner::kNever;
    for (const Fitted& f : fitted)
      if (f.facts.part == term.part && f.facts.theta == term.theta) {
        cubics.push_back(f.cubic);
        facts.push_back(f.facts);
        return static_cast<std::int8_t>(cubics.size() - 1);
      }
    return CellOwner::kNever;
  };
  std::vector<CellOwner> program;
  for (const Owner& o : owners)
    program.push_back({index(o.outer, o.outer_term()), index(o.hollow, o.hollow_term()), index(o.opening, o.opening_term())});
  const auto owner_count = static_cast<int>(program.size());
  cell.kind = CellKind::kByGrowthOrder;
  if (cubics.size() == 1) {
    const field::State if_positive = decide(program.data(), owner_count, 1u), if_negative = decide(program.data(), owner_count, 0u);
    if (if_positive == field::State::kSolid && if_negative != field::State::kSolid) {
      cell.kind = CellKind::kSolidWherePositive;
      cell.air = if_negative;
    }
    if (if_positive != field::State::kSolid && if_negative == field::State::kSolid) {
      cell.kind = CellKind::kSolidWhereNegative;
      cell.air = if_positive;
    }
  }
  if (exact) cell.kind = CellKind::kExact;
  out_.add(cell, cubics, program, facts);
}

// Fits every open function; true when the cell is settled (kept, or found to hold no boundary after all).
bool Builder::fit(const Box3& box, std::vector<Owner>& owners) {
  std::vector<Fitted> all_fitted;
  const auto settle = [&](Sign& sign, const Term& term) {
    if (sign != Sign::kUnknown) return true;
    Fitted fitted{};
    if (!fit_term_values(box, term, fitted, sign)) return false;
    if (sign == Sign::kUnknown) all_fitted.push_back(fitted);
    return true;
  };
  for (Owner& o : owners) {
    if (!settle(o.outer, o.outer_term())) return false;
    if (o.outer == Sign::kNegative) continue;
    if (!settle(o.hollow, o.hollow_term()) || !settle(o.opening, o.opening_term())) return false;
  }
  if (!simplify(owners)) return true;
  if (all_fitted.size() > kMostFunctions) return false;
  emit(box, owners, all_fitted, false);
  return true;
}

void Builder::build(const Box3& box, const std::vector<Owner>& parent_owners) {
  std::vector<Owner> owners = parent_owners;
  if (!narrow(box, owners)) return;
  const double half = 0.5 * (box.max.x - box.min.x);
  double smallest = 1e300;
  bool needs_azimuth = false;
  for (const Owner& o : owners) {
    const double theta = o.part == Part::kWhorl ? o.theta : field_.scene().law.theta_start;
    smallest = std::min(smallest, field_.scene().law.at(theta).half_breadth);
    needs_azimuth = needs_azimuth || o.part == Part::kWhorl || o.opening == Sign::kUnknown;
  }
  const bool may_fit = half < kFitBelow * smallest && !(holds_axis(box) && needs_azimuth);
  if (may_fit) {
    std::vector<Owner> fitted = owners;
    if (fit(box, fitted)) return;
  }
  if (half <= smallest_half_) {
    std::vector<Fitted> unfitted;
    const auto take = [&](Sign sign, const Term& term) {
      if (sign != Sign::kUnknown) return;
      unfitted.push_back({{}, {term.theta, static_cast<float>(field_.steepness(term, box)), term.part}});
    };
    for (const Owner& o : owners) {
      take(o.outer, o.outer_term());
      take(o.hollow, o.hollow_term());
      take(o.opening, o.opening_term());
    }
    emit(box, owners, unfitted, true);
    return;
  }
  const Vec3 c = 0.5 * (box.min + box.max);
  for (int octant = 0; octant < 8; ++octant) {
    Box3 child = box;
    for (int i = 0; i < 3; ++i) (octant >> i & 1 ? child.min[i] : child.max[i]) = c[i];
    build(child, for_child(box, child, owners));
  }
}

}  // namespace

CellSet build_cells(const field::Field& field, double tolerance_mm) {
  const Box3& bounds = field.scene().bounds;
  const Vec3 size = bounds.max - bounds.min;
  const double half = 0.5 * std::max({size.x, size.y, size.z});
  const Vec3 centre = 0.5 * (bounds.min + bounds.max);
  const Box3 root{centre - Vec3(half), centre + Vec3(half)};

  CellSet all;
  all.tolerance_mm = tolerance_mm;
  const double smallest_half = half / std::exp2(kFinest);
  const Builder upper(field, tolerance_mm, smallest_half, all);
  std::vector<Job> jobs{{root, upper.all_owners(root)}};
  for (int depth = 0; depth < kSpreadDepth; ++depth) {
    std::vector<Job> next;
    for (Job& job : jobs) {
      if (!upper.narrow(job.box, job.owners)) continue;
      const Vec3 c = 0.5 * (job.box.min + job.box.max);
      for (int octant = 0; octant < 8; ++octant) {
        Box3 child = job.box;
        for (int i = 0; i < 3; ++i) (octant >> i & 1 ? child.min[i] : child.max[i]) = c[i];
        next.push_back({child, upper.for_child(job.box, child, job.owners)});
      }
    }
    jobs = std::move(next);
  }

  std::vector<CellSet> parts(jobs.size());
  parallel_for(jobs.size(), 1, [&](std::size_t i) {
    Builder(field, tolerance_mm, smallest_half, parts[i]).build(jobs[i].box, jobs[i].owners);
  });
  for (CellSet& part : parts) {
    all.append(part);
    part = {};
  }
  return all;
}

}  // namespace whorl::trace
