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
  std::uint8_t function;
};

// Local coordinates of the segment's four nodes.
struct Nodes {
  Float4 x, y, z;
};

Nodes nodes_of(const Cell& cell, const CellRay& ray, CellSegment segment) {
  const float scale = 1.0f / cell.half;
  const Float4 part{0.0f, 1.0f / 3.0f, 2.0f / 3.0f, 1.0f};
  const Float4 t = segment.t0 + part * (segment.t1 - segment.t0);
  return {(ray.origin[0] - cell.centre[0] + t * ray.direction[0]) * scale,
          (ray.origin[1] - cell.centre[1] + t * ray.direction[1]) * scale,
          (ray.origin[2] - cell.centre[2] + t * ray.direction[2]) * scale};
}

constexpr int kMostEvents = 3 * 64;

// Signs at the start, and every sign change in order along the segment.
int gather(const Cell& cell, const Nodes& nodes, std::uint64_t& positive, Event* events) {
  int found = 0;
  positive = 0;
  const Cubic* cubics = cell.cubics();
  for (int k = 0; k < cell.function_count; ++k) {
    const UnitCubic c = UnitCubic::through(evaluate(cubics[k], nodes.x, nodes.y, nodes.z));
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

// The function nearest to its zero at the segment's start: whose surface a ray has found that starts in solid.
std::uint8_t nearest_function(const Cell& cell, const Nodes& nodes) {
  std::uint8_t best = 0;
  float least = std::numeric_limits<float>::infinity();
  for (int k = 0; k < cell.function_count; ++k) {
    const float v = std::abs(evaluate(cell.cubics()[k], nodes.x[0], nodes.y[0], nodes.z[0]));
    if (v < least) {
      least = v;
      best = static_cast<std::uint8_t>(k);
    }
  }
  return best;
}

Float4 size_of(Float4 v) { return v < 0.0f ? -v : v; }

// A cell of one function, which is solid where `sign` times it is positive.
bool first_solid_of_one(const Cell& cell, const Nodes& nodes, float sign, CellSegment segment, CellHit& hit) {
  const UnitCubic c = UnitCubic::through(sign * evaluate(cell.cubics()[0], nodes.x, nodes.y, nodes.z));
  if (c.b0 > 0.0f) {
    hit = {segment.t0, 0, cell.air};
    return true;
  }
  float roots[3];
  if (sign_changes(c, roots) == 0) return false;
  hit = {segment.t0 + roots[0] * (segment.t1 - segment.t0), 0, cell.air};
  return true;
}

}  // namespace

CellRay::CellRay(const Ray& ray)
    : origin{ray.origin.x, ray.origin.y, ray.origin.z, 0.0f}, direction{ray.direction.x, ray.direction.y, ray.direction.z, 0.0f} {
  for (int i = 0; i < 4; ++i) {
    const float d = direction[i];
    inverse[i] = 1.0f / (std::abs(d) > 1e-30f ? d : std::copysign(1e-30f, d));
  }
  inverse_size = size_of(inverse);
}

bool clip(const Cell& cell, const CellRay& ray, float t_min, float t_max, CellSegment& segment) {
  constexpr float kUlps = 4.0f * std::numeric_limits<float>::epsilon();
  const Float4 centre{cell.centre[0], cell.centre[1], cell.centre[2], 0.0f};
  const Float4 to_centre = centre - ray.origin;
  // Wider by what centre, half and their distance to the origin are rounded by: for a ray along the face this is all that
  // counts, and neighbours that each miss it by a rounding would leave a slit.
  const Float4 reach = cell.half + kPadding * (size_of(centre) + cell.half) + kUlps * size_of(to_centre);
  const Float4 middle = to_centre * ray.inverse, span = reach * ray.inverse_size;
  const Float4 slack = kUlps * (size_of(middle) + span);
  const Float4 near = middle - span - slack, far = middle + span + slack;
  const float t0 = std::max(std::max(near[0], near[1]), std::max(near[2], t_min));
  const float t1 = std::min(std::min(far[0], far[1]), std::min(far[2], t_max));
  segment = {t0, t1};
  return t0 <= t1;
}

bool first_solid(const Cell& cell, const CellRay& ray, CellSegment segment, CellHit& hit) {
  const Nodes nodes = nodes_of(cell, ray, segment);
  if (cell.kind == CellKind::kSolidWherePositive) return first_solid_of_one(cell, nodes, 1.0f, segment, hit);
  if (cell.kind == CellKind::kSolidWhereNegative) return first_solid_of_one(cell, nodes, -1.0f, segment, hit);
  const CellOwner* owners = cell.owners();
  std::uint64_t positive;
  Event events[kMostEvents];
  const int count = gather(cell, nodes, positive, events);
  State before = decide(owners, cell.owner_count, positive);
  if (before == State::kSolid) {
    hit = {segment.t0, nearest_function(cell, nodes), State::kOutside};
    hit.before = decide(owners, cell.owner_count, positive ^ (std::uint64_t{1} << hit.function));
    if (hit.before == State::kSolid) hit.before = State::kOutside;
    return true;
  }
  for (int i = 0; i < count; ++i) {
    positive ^= std::uint64_t{1} << events[i].function;
    const State after = decide(owners, cell.owner_count, positive);
    if (after == State::kSolid) {
      hit = {segment.t0 + events[i].s * (segment.t1 - segment.t0), events[i].function, before};
      return true;
    }
    before = after;
  }
  return false;
}

int changes(const Cell& cell, const CellRay& ray, CellSegment segment, State& at_start, Change* out, int capacity) {
  const CellOwner* owners = cell.owners();
  const Nodes nodes = nodes_of(cell, ray, segment);
  std::uint64_t positive;
  Event events[kMostEvents];
  const int count = gather(cell, nodes, positive, events);
  State state = at_start = decide(owners, cell.owner_count, positive);
  int written = 0;
  for (int i = 0; i < count && written < capacity; ++i) {
    positive ^= std::uint64_t{1} << events[i].function;
    const State after = decide(owners, cell.owner_count, positive);
    if (after != state) out[written++] = {segment.t0 + events[i].s * (segment.t1 - segment.t0), after, events[i].function};
    state = after;
  }
  return written;
}

}  // namespace whorl::trace
