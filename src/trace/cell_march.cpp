// SPDX-License-Identifier: Apache-2.0
// Marching the cubics of a cell: a cubic of three coordinates is a cubic of t along a ray, so roots are isolated, not sought.
#include "trace/cell_march.h"

#include "trace/unit_cubic.h"

#include <algorithm>
#include <cmath>

namespace whorl::trace {
namespace {

using field::State;

struct Event {
  float s;
  std::uint8_t term;
};

// Local coordinates of the segment's four nodes.
struct Nodes {
  Float4 x, y, z;
};

Nodes nodes_of(const Cell& cell, const Ray& ray, CellSegment segment) {
  const float scale = 1.0f / cell.half;
  const Float4 part{0.0f, 1.0f / 3.0f, 2.0f / 3.0f, 1.0f};
  const Float4 t = segment.t0 + part * (segment.t1 - segment.t0);
  return {(ray.origin.x - cell.centre[0] + t * ray.direction.x) * scale,
          (ray.origin.y - cell.centre[1] + t * ray.direction.y) * scale,
          (ray.origin.z - cell.centre[2] + t * ray.direction.z) * scale};
}

constexpr int kMostEvents = 3 * 64;

// Signs at the start, and every sign change in order along the segment.
int gather(const CellTerm* terms, int count, const Nodes& nodes, std::uint64_t& positive, Event* events) {
  int found = 0;
  positive = 0;
  for (int k = 0; k < count; ++k) {
    const UnitCubic c = UnitCubic::through(evaluate(terms[k].cubic, nodes.x, nodes.y, nodes.z));
    if (c.b0 > 0.0f) positive |= std::uint64_t{1} << k;
    float roots[3];
    const int n = sign_changes(c, roots);
    for (int i = 0; i < n; ++i) {
      int at = found++;
      for (; at > 0 && events[at - 1].s > roots[i]; --at) events[at] = events[at - 1];
      events[at] = {roots[i], static_cast<std::uint8_t>(k)};
    }
  }
  return found;
}

// The term nearest to its zero at the segment's start: whose surface a ray has found that starts in solid.
std::uint8_t nearest_term(const CellTerm* terms, int count, const Nodes& nodes) {
  std::uint8_t best = 0;
  float least = std::numeric_limits<float>::infinity();
  for (int k = 0; k < count; ++k) {
    const float v = std::abs(evaluate(terms[k].cubic, nodes.x[0], nodes.y[0], nodes.z[0]));
    if (v < least) {
      least = v;
      best = static_cast<std::uint8_t>(k);
    }
  }
  return best;
}

}  // namespace

bool clip(const Cell& cell, const Ray& ray, CellSegment& segment) {
  float t0 = ray.t_min, t1 = ray.t_max;
  constexpr float kUlps = 4.0f * 1.1920929e-7f;
  for (int i = 0; i < 3; ++i) {
    const float d = ray.direction[i];
    const float inverse = 1.0f / (std::abs(d) > 1e-30f ? d : std::copysign(1e-30f, d));
    const float to_centre = cell.centre[i] - ray.origin[i];
    // Wider by what centre, half and their distance to the origin are rounded by: for a ray along the face this is all that
    // counts, and neighbours that each miss it by a rounding would leave a slit.
    const float reach = std::copysign(cell.half + padding(cell, i) + kUlps * std::abs(to_centre), d);
    const float near = (to_centre - reach) * inverse;
    const float far = (to_centre + reach) * inverse;
    t0 = std::max(t0, near - kUlps * std::abs(near));
    t1 = std::min(t1, far + kUlps * std::abs(far));
  }
  segment = {t0, t1};
  return t0 <= t1;
}

bool first_solid(const CellSet& set, const Cell& cell, const Ray& ray, CellSegment segment, CellHit& hit) {
  const CellTerm* terms = set.terms.data() + cell.first_term;
  const Nodes nodes = nodes_of(cell, ray, segment);
  const float span = segment.t1 - segment.t0;
  if (cell.kind != CellKind::kByGrowthOrder) {
    const float sign = cell.kind == CellKind::kSolidWherePositive ? 1.0f : -1.0f;
    const UnitCubic c = UnitCubic::through(sign * evaluate(terms[0].cubic, nodes.x, nodes.y, nodes.z));
    const CellOwner* owners = set.owners.data() + cell.first_owner;
    if (c.b0 > 0.0f) {
      hit = {segment.t0, 0, State::kOutside};
    } else {
      float roots[3];
      if (sign_changes(c, roots) == 0) return false;
      hit = {segment.t0 + roots[0] * span, 0, State::kOutside};
    }
    hit.before = decide(owners, cell.owner_count, cell.kind == CellKind::kSolidWherePositive ? 0u : 1u);
    return true;
  }
  const CellOwner* owners = set.owners.data() + cell.first_owner;
  std::uint64_t positive;
  Event events[kMostEvents];
  const int count = gather(terms, cell.term_count, nodes, positive, events);
  State before = decide(owners, cell.owner_count, positive);
  if (before == State::kSolid) {
    hit = {segment.t0, nearest_term(terms, cell.term_count, nodes), State::kOutside};
    hit.before = decide(owners, cell.owner_count, positive ^ (std::uint64_t{1} << hit.term));
    if (hit.before == State::kSolid) hit.before = State::kOutside;
    return true;
  }
  for (int i = 0; i < count; ++i) {
    positive ^= std::uint64_t{1} << events[i].term;
    const State after = decide(owners, cell.owner_count, positive);
    if (after == State::kSolid) {
      hit = {segment.t0 + events[i].s * span, events[i].term, before};
      return true;
    }
    before = after;
  }
  return false;
}

int changes(const CellSet& set, const Cell& cell, const Ray& ray, CellSegment segment, State& at_start, Change* out,
            int capacity) {
  const CellTerm* terms = set.terms.data() + cell.first_term;
  const CellOwner* owners = set.owners.data() + cell.first_owner;
  const Nodes nodes = nodes_of(cell, ray, segment);
  std::uint64_t positive;
  Event events[kMostEvents];
  const int count = gather(terms, cell.term_count, nodes, positive, events);
  State state = at_start = decide(owners, cell.owner_count, positive);
  int written = 0;
  for (int i = 0; i < count && written < capacity; ++i) {
    positive ^= std::uint64_t{1} << events[i].term;
    const State after = decide(owners, cell.owner_count, positive);
    if (after != state) out[written++] = {segment.t0 + events[i].s * (segment.t1 - segment.t0), after, events[i].term};
    state = after;
  }
  return written;
}

}  // namespace whorl::trace
