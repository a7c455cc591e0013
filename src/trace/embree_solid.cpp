// SPDX-License-Identifier: Apache-2.0
// Callbacks, and what is known of a hit.
#include "trace/embree_solid.h"

#include "diagnostics/error.h"
#include "trace/cell_march.h"
#include "trace/embree_ray.h"

#include <algorithm>
#include <atomic>
#include <chrono>
#include <cmath>

namespace whorl::trace {
namespace {

using field::State;

double seconds_since(std::chrono::steady_clock::time_point start) {
  return std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
}

struct Query : embree::Payload {
  explicit Query(const Ray& r) : ray(r) { embree::prepare(*this); }
  CellRay ray;
  std::vector<std::uint32_t>* visited = nullptr;  // gather cells instead of looking for a hit
};

}  // namespace

struct EmbreeSolid::Impl {
  const field::Field& field;
  CellSet set;
  bool exact = false;
  double cell_seconds = 0.0, hierarchy_seconds = 0.0;
  std::atomic<std::ptrdiff_t> hierarchy_bytes{0};
  RTCDevice device = nullptr;
  RTCScene scene = nullptr;

  explicit Impl(const field::Field& f) : field(f) {}
  ~Impl() {
    if (scene) rtcReleaseScene(scene);
    if (device) rtcReleaseDevice(device);
  }

  static bool note_memory(void* self, ssize_t bytes, bool) {
    static_cast<Impl*>(self)->hierarchy_bytes += bytes;
    return true;
  }

  bool march(const Cell& cell, const CellRay& ray, float t_min, float t_max, CellHit& hit) const {
    CellSegment segment;
    if (!clip(cell, ray, t_min, t_max, segment)) return false;
    if (exact || cell.kind == CellKind::kExact) return first_solid_exact(field, set, cell, ray, segment, hit);
    return first_solid(cell, ray, segment, hit);
  }

  static void bounds(const RTCBoundsFunctionArguments* a) {
    const Cell& cell = static_cast<const Impl*>(a->geometryUserPtr)->set.cell(a->primID);
    // A little more than the clip keeps, so that the hierarchy never culls what it would.
    const auto half = [&](int i) { return cell.half * 1.00001f + 2.0f * padding(cell, i); };
    RTCBounds* b = a->bounds_o;
    b->lower_x = cell.centre[0] - half(0);
    b->lower_y = cell.centre[1] - half(1);
    b->lower_z = cell.centre[2] - half(2);
    b->upper_x = cell.centre[0] + half(0);
    b->upper_y = cell.centre[1] + half(1);
    b->upper_z = cell.centre[2] + half(2);
  }

  static void intersect(const RTCIntersectFunctionNArguments* a) {
    if (!a->valid[0]) return;
    const Impl& self = *static_cast<const Impl*>(a->geometryUserPtr);
    auto* rayhit = reinterpret_cast<RTCRayHit*>(a->rayhit);
    const auto* query = reinterpret_cast<const Query*>(a->context);
    CellHit hit;
    const bool found = self.march(self.set.cell(a->primID), query->ray, rayhit->ray.tnear, rayhit->ray.tfar, hit);
    embree::report(a, found);
    // u and v: which surface, and which air it was met from.
    if (found) embree::keep_hit(a, hit.t, static_cast<float>(hit.function), static_cast<float>(static_cast<int>(hit.before)));
  }

  static void occluded(const RTCOccludedFunctionNArguments* a) {
    if (!a->valid[0]) return;
    const Impl& self = *static_cast<const Impl*>(a->geometryUserPtr);
    auto* ray = reinterpret_cast<RTCRay*>(a->ray);
    auto* query = reinterpret_cast<Query*>(a->context);
    bool found = false;
    if (query->visited) {
      query->visited->push_back(a->primID);
    } else {
      CellHit hit;
      found = self.march(self.set.cell(a->primID), query->ray, ray->tnear, ray->tfar, hit);
    }
    embree::report(a, found);
    if (found) ray->tfar = -std::numeric_limits<float>::infinity();
  }

  void describe(const Cell& cell, std::uint32_t function, State before, Hit& hit) const {
    const FunctionFacts& facts = set.facts(cell)[function];
    Vec3 gradient;
    if (exact || cell.kind == CellKind::kExact) {
      gradient = field.gradient(facts.term(), Vec3(hit.position));
    } else {
      float g[3];
      const float scale = 1.0f / cell.half;
      trace::gradient(cell.cubics()[function], (hit.position.x - cell.centre[0]) * scale, (hit.position.y - cell.centre[1]) * scale,
                      (hit.position.z - cell.centre[2]) * scale, g);
      gradient = {g[0], g[1], g[2]};
    }
    const bool hollow = facts.part == field::Part::kWhorlHollow || facts.part == field::Part::kChamberHollow ||
                        facts.part == field::Part::kChamberOpening;
    const double length = gradient.length();
    if (length > 0.0) gradient *= (hollow ? 1.0 : -1.0) / length;
    hit.normal = Vec3f(gradient);
    hit.part = hollow || before == State::kLumen ? Part::kInterior : Part::kExterior;
    hit.parietal = !hollow && before == State::kLumen;
    hit.passage = facts.part == field::Part::kWhorl || facts.part == field::Part::kWhorlHollow
                      ? facts.theta
                      : field.scene().law.theta_start;
    // Clear of the cell's own error, of the neighbours', and of the rounding of a place in the shell.
    hit.safe_offset = static_cast<float>(3.0 * set.tolerance_mm + 1e-6 * field.scene().height_mm);
  }
};

EmbreeSolid::EmbreeSolid(const field::Field& field, const SolidOptions& options)
    : impl_(std::make_unique<Impl>(field)) {
  Impl& self = *impl_;
  self.exact = options.exact;
  auto start = std::chrono::steady_clock::now();
  self.set = build_cells(field, options.tolerance_mm);
  self.cell_seconds = seconds_since(start);

  start = std::chrono::steady_clock::now();
  self.device = rtcNewDevice(embree::kDeviceSettings);
  if (!self.device)
    throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "Embree could not be started on this machine");
  rtcSetDeviceMemoryMonitorFunction(self.device, &Impl::note_memory, impl_.get());
  self.scene = rtcNewScene(self.device);
  rtcSetSceneFlags(self.scene, RTC_SCENE_FLAG_ROBUST);  // conservative node tests: neighbouring cells share faces
  RTCGeometry geometry = rtcNewGeometry(self.device, RTC_GEOMETRY_TYPE_USER);
  rtcSetGeometryUserPrimitiveCount(geometry, static_cast<unsigned>(self.set.size()));
  rtcSetGeometryUserData(geometry, impl_.get());
  rtcSetGeometryBoundsFunction(geometry, &Impl::bounds, nullptr);
  rtcSetGeometryIntersectFunction(geometry, &Impl::intersect);
  rtcSetGeometryOccludedFunction(geometry, &Impl::occluded);
  rtcCommitGeometry(geometry);
  rtcAttachGeometry(self.scene, geometry);
  rtcReleaseGeometry(geometry);
  rtcCommitScene(self.scene);
  if (rtcGetDeviceError(self.device) != RTC_ERROR_NONE)
    throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "Embree could not build the hierarchy of surface cells");
  self.hierarchy_seconds = seconds_since(start);
}

EmbreeSolid::~EmbreeSolid() = default;

bool EmbreeSolid::closest(const Ray& ray, Hit& hit) const noexcept {
  RTCRayHit query = embree::query_of(ray);
  Query payload(ray);
  embree::trace_closest(impl_->scene, query, payload);
  if (query.hit.geomID == RTC_INVALID_GEOMETRY_ID) return false;
  const Cell& cell = impl_->set.cell(query.hit.primID);
  hit.t = query.ray.tfar;
  hit.position = ray.origin + hit.t * ray.direction;
  impl_->describe(cell, static_cast<std::uint32_t>(query.hit.u), static_cast<State>(static_cast<int>(query.hit.v)), hit);
  return true;
}

bool EmbreeSolid::occluded(const Ray& ray) const noexcept {
  RTCRay query = embree::ray_of(ray);
  Query payload(ray);
  embree::trace_any(impl_->scene, query, payload);
  return query.tfar < 0.0f;
}

GrowthPlace EmbreeSolid::growth_place(const Hit& hit) const noexcept {
  double growth, around;
  impl_->field.coordinates(Vec3(hit.position), hit.passage, growth, around);
  return {static_cast<float>(growth / kTwoPi), static_cast<float>(degrees(around))};
}

void EmbreeSolid::crossings(const Ray& ray, State start, std::vector<Crossing>& out) const {
  out.clear();
  thread_local std::vector<std::uint32_t> visited;
  visited.clear();
  RTCRay query = embree::ray_of(ray);
  Query payload(ray);
  payload.visited = &visited;
  embree::trace_any(impl_->scene, query, payload);

  struct Leg {
    CellSegment segment;
    std::uint32_t cell;
  };
  thread_local std::vector<Leg> legs;
  legs.clear();
  for (const std::uint32_t id : visited) {
    CellSegment segment;
    if (clip(impl_->set.cell(id), payload.ray, ray.t_min, ray.t_max, segment) && segment.t1 > segment.t0) legs.push_back({segment, id});
  }
  std::sort(legs.begin(), legs.end(), [](const Leg& a, const Leg& b) {
    return a.segment.t0 != b.segment.t0 ? a.segment.t0 < b.segment.t0 : a.cell < b.cell;
  });
  State state = start;
  constexpr int kCapacity = 64;
  Change change[kCapacity];
  float reached = ray.t_min;
  for (Leg& leg : legs) {
    const Cell& cell = impl_->set.cell(leg.cell);
    leg.segment.t0 = std::max(leg.segment.t0, reached);  // clips overlap by their rounding
    if (leg.segment.t1 <= leg.segment.t0) continue;
    reached = leg.segment.t1;
    State entry;
    const int count = impl_->exact || cell.kind == CellKind::kExact
                          ? changes_exact(impl_->field, impl_->set, cell, payload.ray, leg.segment, entry, change, kCapacity)
                          : changes(cell, payload.ray, leg.segment, entry, change, kCapacity);
    const FunctionFacts* functions = impl_->set.facts(cell);
    if (entry != state) out.push_back({leg.segment.t0, state, entry, functions[0].part, functions[0].theta});
    state = entry;
    for (int i = 0; i < count; ++i) {
      const FunctionFacts& met = functions[change[i].function];
      out.push_back({change[i].t, state, change[i].after, met.part, met.theta});
      state = change[i].after;
    }
  }
}

const CellSet& EmbreeSolid::cells() const { return impl_->set; }
const field::Field& EmbreeSolid::field() const { return impl_->field; }
double EmbreeSolid::cell_seconds() const { return impl_->cell_seconds; }
double EmbreeSolid::hierarchy_seconds() const { return impl_->hierarchy_seconds; }
std::size_t EmbreeSolid::hierarchy_bytes() const { return static_cast<std::size_t>(impl_->hierarchy_bytes.load()); }
void EmbreeSolid::set_exact(bool exact) { impl_->exact = exact; }

}  // namespace whorl::trace
