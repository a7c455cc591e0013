// SPDX-License-Identifier: Apache-2.0
// Marching the functions themselves through a cell: sphere tracing (Hart 1996, The Visual Computer 12: 527-545) with the cell's own bounds
// of steepness, each change of state then bisected to the limit of the ray's numbers.
#include "trace/cell_march.h"

#include <algorithm>
#include <cmath>

namespace whorl::trace {
namespace {

using field::State;

// Steps are never shorter than this part of the cell: a feature the ray grazes over less than that can be missed. This is
// the oracle's tangency band.
constexpr double kLeastStep = 1e-6;

struct Sample {
  State state;
  std::uint64_t positive;
  double safe;  // distance to any change of sign, by the bounds of steepness
};

Vec3 vec(const Float4& v) { return {static_cast<double>(v[0]), static_cast<double>(v[1]), static_cast<double>(v[2])}; }

class Marcher {
 public:
  Marcher(const field::Field& field, const CellSet& set, const Cell& cell, const CellRay& ray)
      : field_(field),
        functions_(set.facts(cell)),
        cell_(cell),
        origin_(vec(ray.origin)),
        direction_(vec(ray.direction)) {}

  Sample at(double t) const {
    const Vec3 p = origin_ + t * direction_;
    Sample sample{State::kOutside, 0, 1e300};
    for (int k = 0; k < cell_.function_count; ++k) {
      const FunctionFacts& f = functions_[k];
      double v;
      const bool pair = f.part == field::Part::kWhorl && k + 1 < cell_.function_count &&
                        functions_[k + 1].part == field::Part::kWhorlHollow && functions_[k + 1].theta == f.theta;
      if (pair) {
        double hollow;
        field_.whorl(p, f.theta, v, hollow);
        note(sample, k + 1, hollow);
      } else {
        v = field_.value(f.term(), p);
      }
      note(sample, k, v);
      if (pair) ++k;
    }
    sample.state = decide(cell_.owners(), cell_.owner_count, sample.positive);
    return sample;
  }

  // The next change of state in (from, to]; false where there is none. `t` is where the new state holds.
  bool next_change(double from, const Sample& start, double to, double& t, Sample& after) const {
    const double least = kLeastStep * cell_.half;
    double here = from;
    Sample now = start;
    while (here < to) {
      const double next = std::min(to, here + std::max(now.safe, least));
      const Sample then = at(next);
      if (then.state != now.state) {
        double lo = here, hi = next;
        after = then;
        for (int i = 0; i < 60 && hi - lo > 1e-12; ++i) {
          const double mid = 0.5 * (lo + hi);
          const Sample m = at(mid);
          if (m.state != now.state) {
            hi = mid;
            after = m;
          } else {
            lo = mid;
          }
        }
        t = hi;
        return true;
      }
      here = next;
      now = then;
    }
    return false;
  }

  // The function whose sign differs between two samples, nearest to zero at t where several do.
  std::uint8_t changed(double t, const Sample& a, const Sample& b) const {
    const std::uint64_t differ = a.positive ^ b.positive;
    std::uint8_t best = 0;
    double least = 1e300;
    for (int k = 0; k < cell_.function_count; ++k) {
      if (differ && !(differ >> k & 1u)) continue;
      const double v = std::abs(field_.value(functions_[k].term(), origin_ + t * direction_));
      if (v < least) {
        least = v;
        best = static_cast<std::uint8_t>(k);
      }
    }
    return best;
  }

 private:
  void note(Sample& sample, int k, double v) const {
    if (v > 0.0) sample.positive |= std::uint64_t{1} << k;
    sample.safe = std::min(sample.safe, std::abs(v) / static_cast<double>(functions_[k].steepness));
  }

  const field::Field& field_;
  const FunctionFacts* functions_;
  const Cell& cell_;
  Vec3 origin_, direction_;
};

}  // namespace

bool first_solid_exact(const field::Field& field, const CellSet& set, const Cell& cell, const CellRay& ray,
                       CellSegment segment, CellHit& hit) {
  const Marcher march(field, set, cell, ray);
  Sample now = march.at(segment.t0);
  if (now.state == State::kSolid) {
    hit = {segment.t0, march.changed(segment.t0, now, now), State::kOutside};
    return true;
  }
  double here = segment.t0;
  for (int i = 0; i < 64; ++i) {
    double t;
    Sample after{};
    if (!march.next_change(here, now, segment.t1, t, after)) return false;
    if (after.state == State::kSolid) {
      hit = {static_cast<float>(t), march.changed(t, march.at(std::max(here, t - 1e-9)), after), now.state};
      return true;
    }
    here = t;
    now = after;
  }
  return false;
}

int changes_exact(const field::Field& field, const CellSet& set, const Cell& cell, const CellRay& ray, CellSegment segment,
                  State& at_start, Change* out, int capacity) {
  const Marcher march(field, set, cell, ray);
  Sample now = march.at(segment.t0);
  at_start = now.state;
  double here = segment.t0;
  int written = 0;
  while (written < capacity) {
    double t;
    Sample after{};
    if (!march.next_change(here, now, segment.t1, t, after)) break;
    out[written++] = {static_cast<float>(t), after.state, march.changed(t, now, after)};
    here = t;
    now = after;
  }
  return written;
}

}  // namespace whorl::trace
