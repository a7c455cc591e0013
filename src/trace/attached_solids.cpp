// SPDX-License-Identifier: Apache-2.0
// One hierarchy over three kinds of solids.
#include "trace/attached_solids.h"

#include "diagnostics/error.h"
#include "math/parallel.h"
#include "trace/bead.h"
#include "trace/embree_ray.h"
#include "trace/guest_solid.h"
#include "trace/horn.h"
#include "trace/ledge.h"
#include "trace/ray_box.h"
#include "trace/sphere_march.h"

#include <algorithm>
#include <array>
#include <atomic>
#include <cmath>
#include <memory>

namespace whorl::trace {
namespace {

using field::State;

// Places of a solid that may lie in a lumen: where it reaches farthest from the shell's own wall.
bool in_lumen(const field::Field& field, const Vec3& p) { return field.place_at(p).state == State::kLumen; }

bool stands_in_lumen(const field::Field& field, const scene::Bead& b) {
  const auto semi_axis = [&](int k) { return Vec3(b.rows[k]) / Vec3(b.rows[k]).length2(); };
  const Vec3 c(b.centre), forward = semi_axis(0), across = semi_axis(1);
  if (in_lumen(field, c + semi_axis(2))) return true;
  for (const Vec3& side : {forward, -forward, across, -across})
    if (in_lumen(field, c + side)) return true;
  return false;
}

bool stands_in_lumen(const field::Field& field, const scene::Horn& h) {
  constexpr int kAlong = 8;
  for (int i = 0; i <= kAlong; ++i) {
    const double s = h.length * i / kAlong;
    const scene::AxisPlace at = scene::axis_at(h, s);
    const double radius = h.foot_radius + (h.tip_radius - h.foot_radius) * i / kAlong;
    const Vec3 side = at.axis.cross(at.front);
    for (const Vec3& off : {at.front, -at.front, side, -side})
      if (in_lumen(field, at.point + radius * off)) return true;
  }
  return false;
}

bool stands_in_lumen(const field::Field& field, const scene::Ledge& l) {
  // A grid over its box; what holds a lumen's place is in the way.
  const Box3 box = box_of(l, field);
  constexpr int kGrid = 12;
  for (int k = 0; k <= kGrid; ++k)
    for (int j = 0; j <= kGrid; ++j)
      for (int i = 0; i <= kGrid; ++i) {
        const Vec3 f(static_cast<double>(i) / kGrid, static_cast<double>(j) / kGrid, static_cast<double>(k) / kGrid);
        const Vec3 p = box.min + (box.max - box.min) * f;
        if (value_of(l, field, p) > 0.0 && in_lumen(field, p)) return true;
      }
  return false;
}

template <class Solid>
std::vector<Solid> standing(const field::Field& field, const std::vector<Solid>& all, std::size_t& left_out) {
  std::vector<char> keep(all.size());
  parallel_for(all.size(), 256, [&](std::size_t i) { keep[i] = !stands_in_lumen(field, all[i]); });
  std::vector<Solid> kept;
  kept.reserve(static_cast<std::size_t>(std::count(keep.begin(), keep.end(), 1)));
  for (std::size_t i = 0; i < all.size(); ++i)
    if (keep[i]) kept.push_back(all[i]);
  left_out += all.size() - kept.size();
  return kept;
}

enum Kind : unsigned { kBeads, kHorns, kLedges, kKinds };

struct Element {
  Kind kind;
  std::uint32_t index;
};

struct Query : embree::Payload {
  explicit Query(const Ray& r) : ray(r) { embree::prepare(*this); }
  Ray ray;
  std::vector<Element>* visited = nullptr;  // gather elements instead of looking for a hit
};

Vec3 along(const Ray& ray, double t) { return Vec3(ray.origin) + t * Vec3(ray.direction); }

}  // namespace

struct AttachedSolids::Impl {
  const field::Field& field;
  std::vector<scene::Bead> beads;
  std::vector<scene::Horn> horns;
  std::vector<scene::Ledge> ledges;
  std::vector<Box3> ledge_boxes;
  std::vector<std::unique_ptr<GuestSolid>> guests;
  std::size_t left_out = 0;
  double resolution;  // mm
  std::atomic<std::ptrdiff_t> hierarchy_bytes{0};
  RTCDevice device = nullptr;
  RTCScene scene = nullptr;

  explicit Impl(const field::Field& f) : field(f), resolution(2e-6 * f.scene().height_mm) {
    const scene::Attached& all = f.scene().attached;
    beads = standing(f, all.beads, left_out);
    horns = standing(f, all.horns, left_out);
    ledges = standing(f, all.ledges, left_out);
    for (const scene::Ledge& l : ledges) ledge_boxes.push_back(trace::box_of(l, f));
    for (const scene::Guest& g : all.guests) {
      // The middle of it stands clear of the shell, or it would be in a later whorl.
      const Box3 own = scene::box_of(g);
      if (in_lumen(f, 0.5 * (own.min + own.max)))
        ++left_out;
      else
        guests.push_back(std::make_unique<GuestSolid>(g));
    }
  }
  ~Impl() {
    if (scene) rtcReleaseScene(scene);
    if (device) rtcReleaseDevice(device);
  }

  static bool note_memory(void* self, ssize_t bytes, bool) {
    static_cast<Impl*>(self)->hierarchy_bytes += bytes;
    return true;
  }

  Box3 box(Element e) const {
    switch (e.kind) {
      case kBeads: return scene::box_of(beads[e.index]);
      case kHorns: return scene::box_of(horns[e.index]);
      default: return ledge_boxes[e.index];
    }
  }
  double value(Element e, const Vec3& p) const {
    return e.kind == kHorns ? value_of(horns[e.index], p) : value_of(ledges[e.index], field, p);
  }
  double clear(Element e, double v) const { return e.kind == kHorns ? clear_of_horn(horns[e.index], v) : clear_of_ledge(v); }

  /// The next change of sides in [t0, t1].
  bool change(Element e, const Ray& ray, double t0, double t1, bool inside, double& at) const {
    if (e.kind == kBeads) {
      Through through;
      if (!through_bead(beads[e.index], ray, through)) return false;
      // At the start a ray may be on the other side already.
      const bool within = through.in <= t0 && t0 < through.out;
      at = within != inside ? t0 : inside ? through.out : through.in;
      return at >= t0 && at <= t1;
    }
    const auto value_at = [&](double t) { return value(e, along(ray, t)); };
    const auto clear_at = [&](double v) { return clear(e, v); };
    if (inside) return next_change(value_at, clear_at, t0, t1, resolution, true, at);
    return clip(ray, box(e), t0, t1) && next_change(value_at, clear_at, t0, t1, resolution, false, at);
  }

  bool holds(Element e, const Vec3& p) const { return e.kind == kBeads ? trace::holds(beads[e.index], p) : value(e, p) > 0.0; }

  Vec3 normal(Element e, const Vec3& p) const {
    if (e.kind == kBeads) return normal_of(beads[e.index], p);
    // Small against the thinnest edge, large against rounding.
    const double thin = e.kind == kHorns ? std::max(horns[e.index].tip_radius, 0.02 * horns[e.index].foot_radius)
                                         : std::min(ledges[e.index].height, ledges[e.index].half_thickness > 0.0
                                                                                ? ledges[e.index].half_thickness
                                                                                : ledges[e.index].height);
    const double h = 0.01 * thin;
    Vec3 g;
    for (int i = 0; i < 3; ++i) {
      Vec3 a = p, b = p;
      a[i] -= h;
      b[i] += h;
      g[i] = value(e, a) - value(e, b);
    }
    const double length = g.length();
    return length > 0.0 ? g / length : Vec3(0.0, 0.0, 1.0);
  }

  struct User {
    Impl* self;
    Kind kind;
  };
  std::array<User, kKinds> users{};

  static void bounds(const RTCBoundsFunctionArguments* a) {
    const User& user = *static_cast<const User*>(a->geometryUserPtr);
    const Box3 box = user.self->box({user.kind, a->primID});
    // Rounded outwards: a place of the shell's size in float.
    const auto pad = static_cast<float>(1e-6 * user.self->field.scene().height_mm);
    RTCBounds* b = a->bounds_o;
    b->lower_x = static_cast<float>(box.min.x) - pad;
    b->lower_y = static_cast<float>(box.min.y) - pad;
    b->lower_z = static_cast<float>(box.min.z) - pad;
    b->upper_x = static_cast<float>(box.max.x) + pad;
    b->upper_y = static_cast<float>(box.max.y) + pad;
    b->upper_z = static_cast<float>(box.max.z) + pad;
  }

  static void intersect(const RTCIntersectFunctionNArguments* a) {
    if (!a->valid[0]) return;
    const User& user = *static_cast<const User*>(a->geometryUserPtr);
    auto* rayhit = reinterpret_cast<RTCRayHit*>(a->rayhit);
    const auto* query = reinterpret_cast<const Query*>(a->context);
    double t;
    const bool found = user.self->change({user.kind, a->primID}, query->ray, static_cast<double>(rayhit->ray.tnear),
                                         static_cast<double>(rayhit->ray.tfar), false, t);
    embree::report(a, found);
    if (found) embree::keep_hit(a, static_cast<float>(t));
  }

  static void occluded(const RTCOccludedFunctionNArguments* a) {
    if (!a->valid[0]) return;
    const User& user = *static_cast<const User*>(a->geometryUserPtr);
    auto* ray = reinterpret_cast<RTCRay*>(a->ray);
    auto* query = reinterpret_cast<Query*>(a->context);
    bool found = false;
    double t;
    if (query->visited)
      query->visited->push_back({user.kind, a->primID});
    else
      found = user.self->change({user.kind, a->primID}, query->ray, static_cast<double>(ray->tnear), static_cast<double>(ray->tfar), false, t);
    embree::report(a, found);
    if (found) ray->tfar = -std::numeric_limits<float>::infinity();
  }

  void build() {
    device = rtcNewDevice(embree::kDeviceSettings);
    if (!device) throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "Embree could not be started on this machine");
    rtcSetDeviceMemoryMonitorFunction(device, &Impl::note_memory, this);
    scene = rtcNewScene(device);
    const std::size_t counts[kKinds] = {beads.size(), horns.size(), ledges.size()};
    for (const Kind kind : {kBeads, kHorns, kLedges}) {
      users[kind] = {this, kind};
      RTCGeometry geometry = rtcNewGeometry(device, RTC_GEOMETRY_TYPE_USER);
      rtcSetGeometryUserPrimitiveCount(geometry, static_cast<unsigned>(counts[kind]));
      rtcSetGeometryUserData(geometry, &users[kind]);
      rtcSetGeometryBoundsFunction(geometry, &Impl::bounds, nullptr);
      rtcSetGeometryIntersectFunction(geometry, &Impl::intersect);
      rtcSetGeometryOccludedFunction(geometry, &Impl::occluded);
      rtcCommitGeometry(geometry);
      rtcAttachGeometryByID(scene, geometry, kind);
      rtcReleaseGeometry(geometry);
    }
    rtcCommitScene(scene);
    if (rtcGetDeviceError(device) != RTC_ERROR_NONE)
      throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "Embree could not build the hierarchy of attached elements");
  }

  void visit(const Ray& ray, std::vector<Element>& visited) const {
    visited.clear();
    RTCRay query = embree::ray_of(ray);
    Query payload(ray);
    payload.visited = &visited;
    embree::trace_any(scene, query, payload);
  }
};

AttachedSolids::AttachedSolids(const field::Field& field) : impl_(std::make_unique<Impl>(field)) { impl_->build(); }
AttachedSolids::~AttachedSolids() = default;

bool AttachedSolids::closest(const Ray& whole, Hit& hit) const noexcept {
  Ray ray = whole;
  bool guest = false;
  for (const auto& g : impl_->guests)
    if (g->closest(ray, hit)) {
      guest = true;
      ray.t_max = hit.t;
    }
  RTCRayHit query = embree::query_of(ray);
  Query payload(ray);
  embree::trace_closest(impl_->scene, query, payload);
  if (query.hit.geomID == RTC_INVALID_GEOMETRY_ID) return guest;
  const Element e{static_cast<Kind>(query.hit.geomID), query.hit.primID};
  hit = {};
  hit.t = query.ray.tfar;
  hit.position = ray.origin + hit.t * ray.direction;
  hit.normal = Vec3f(impl_->normal(e, Vec3(hit.position)));
  hit.part = Part::kOrnament;
  switch (e.kind) {
    case kBeads:
      hit.passage = static_cast<double>(impl_->beads[e.index].passage);
      hit.series = impl_->beads[e.index].series;
      break;
    case kHorns:
      hit.passage = static_cast<double>(impl_->horns[e.index].passage);
      hit.series = impl_->horns[e.index].series;
      break;
    default: hit.passage = impl_->ledges[e.index].growth; hit.series = impl_->ledges[e.index].series;
  }
  // Clear of the march's resolution and of the rounding of a place in the shell.
  hit.safe_offset = static_cast<float>(4.0 * impl_->resolution);
  return true;
}

bool AttachedSolids::occluded(const Ray& ray) const noexcept {
  for (const auto& g : impl_->guests)
    if (g->occluded(ray)) return true;
  RTCRay query = embree::ray_of(ray);
  Query payload(ray);
  embree::trace_any(impl_->scene, query, payload);
  return query.tfar < 0.0f;
}

GrowthPlace AttachedSolids::growth_place(const Hit& hit) const noexcept {
  double growth, around;
  impl_->field.coordinates(Vec3(hit.position), hit.passage, growth, around);
  return {static_cast<float>(growth / kTwoPi), static_cast<float>(degrees(around))};
}

bool AttachedSolids::holds(const Vec3& p) const noexcept {
  for (const auto& g : impl_->guests)
    if (g->holds(p)) return true;
  thread_local std::vector<Element> visited;
  Ray ray;
  ray.origin = Vec3f(p);
  ray.direction = {0.0f, 0.0f, 1.0f};
  ray.t_max = static_cast<float>(impl_->resolution);
  impl_->visit(ray, visited);
  return std::any_of(visited.begin(), visited.end(), [&](Element e) { return impl_->holds(e, p); });
}

void AttachedSolids::stretches(const Ray& ray, std::vector<Within>& out) const {
  out.clear();
  thread_local std::vector<Element> visited;
  impl_->visit(ray, visited);
  thread_local std::vector<Within> found;
  found.clear();
  const auto end = static_cast<double>(ray.t_max);
  for (const Element e : visited) {
    double t = static_cast<double>(ray.t_min), in, leave;
    while (impl_->change(e, ray, t, end, false, in)) {
      leave = end;
      double stop = in, last = end;
      clip(ray, impl_->box(e), stop, last);
      if (!impl_->change(e, ray, in, std::min(end, last), true, leave)) leave = std::min(end, last);
      found.push_back({in, leave});
      t = leave + impl_->resolution;
      if (e.kind == kBeads || !(t < end)) break;
    }
  }
  for (const auto& g : impl_->guests) g->add_stretches(ray, found);
  std::sort(found.begin(), found.end(), [](const Within& a, const Within& b) { return a.in < b.in; });
  for (const Within& w : found) {
    if (!out.empty() && w.in <= out.back().out)
      out.back().out = std::max(out.back().out, w.out);
    else
      out.push_back(w);
  }
}

std::size_t AttachedSolids::size() const { return impl_->beads.size() + impl_->horns.size() + impl_->ledges.size() + impl_->guests.size(); }
std::size_t AttachedSolids::left_out() const { return impl_->left_out; }
std::size_t AttachedSolids::bytes() const {
  std::size_t of_guests = 0;
  for (const auto& g : impl_->guests) of_guests += g->bytes();
  return of_guests + impl_->beads.size() * sizeof(scene::Bead) + impl_->horns.size() * sizeof(scene::Horn) +
         impl_->ledges.size() * (sizeof(scene::Ledge) + sizeof(Box3)) + static_cast<std::size_t>(impl_->hierarchy_bytes.load());
}

}  // namespace whorl::trace
