// SPDX-License-Identifier: Apache-2.0
// The walk from the eye through the shell to the light.
#include "transport/path.h"

#include "math/basis3f.h"
#include "math/hash.h"
#include "shaders_cpu/tone/curve.h"
#include "transport/encounter.h"
#include "transport/lamp_choice.h"

#include <algorithm>
#include <bit>
#include <cmath>
#include <optional>

namespace whorl::transport {
namespace {

using shaders_cpu::Reflection;
using shaders_cpu::SphereLamp;

/// Roulette plays once a path carries less than this. Measured on an open sphere with a lamp (noise^2 * time): 0.2 and 0.3
/// alike, 0.5 is 20 % worse, roulette by the full throughput from bounce 4 on 45 % worse, no roulette until 0.05 7 % worse.
constexpr float kRouletteBelow = 0.2f;

/// Smallest cosine between a shading normal and the direction back along the ray.
constexpr float kLeastFacing = 1e-3f;

/// Block layout of one bounce: scattering; key and a lamp; the portal.
constexpr std::uint32_t kScatterBlock = 0, kLightBlock = 1, kPortalBlock = 2, kBlocks = 3;

/// Weight of the technique with density `own` where another could have drawn the same with density `other`.
float power_weight(float own, float other) noexcept {
  const float ratio = other / own;
  return 1.0f / (1.0f + ratio * ratio);
}

/// The normal, turned towards the viewer only as far as needed: fitted normals can look away at grazing incidence.
Vec3f facing(const Vec3f& normal, const Vec3f& to_viewer) noexcept {
  const float cosine = normal.dot(to_viewer);
  return cosine >= kLeastFacing ? normal : unit(normal + to_viewer * (kLeastFacing - cosine));
}

/// A key for the many numbers of a walk within the wall.
std::uint64_t key_of(const std::array<float, kSobolDimensions>& u) noexcept {
  std::uint64_t key = 0;
  for (const float one : u) key = hash_with(key, std::bit_cast<std::uint32_t>(one));
  return key;
}

}  // namespace

/// A place on the shell from which light is gathered.
struct PathTracer::Vertex {
  Vec3f start;    // clear of the surface
  Vec3f outward;  // true normal
  Basis3f basis;  // round the shading normal
  shaders_cpu::SurfaceView surface;
  std::optional<shaders_cpu::PortalView> seen_portal;  // from within the lumen

  Vertex(const trace::Hit& hit, const Vec3f& to_viewer, const Materials& materials, const shaders_cpu::Portal* portal) noexcept
      : start(hit.position + hit.normal * hit.safe_offset),
        outward(hit.normal),
        basis(facing(hit.normal, to_viewer)),
        surface(materials.wall && hit.part != trace::Part::kOrnament ? shaders_cpu::SurfaceView::face(materials.surface(hit), basis.to_local(to_viewer))
                               : shaders_cpu::SurfaceView(materials.surface(hit), basis.to_local(to_viewer))) {
    look_out(hit, portal);
  }
  /// Where light comes out of a translucent wall.
  Vertex(const trace::Hit& hit, const Materials& materials, const shaders_cpu::Portal* portal) noexcept
      : start(hit.position + hit.normal * hit.safe_offset),
        outward(hit.normal),
        basis(hit.normal),
        surface(shaders_cpu::SurfaceView::leaving(materials.surface(hit))) {
    look_out(hit, portal);
  }
  void look_out(const trace::Hit& hit, const shaders_cpu::Portal* portal) noexcept {
    if (!portal || hit.part != trace::Part::kInterior || !portal->behind(start)) return;
    seen_portal.emplace(*portal, start);
    if (!seen_portal->usable()) seen_portal.reset();
  }

  /// Light can only come from above both normals: the shell is opaque.
  bool open_to(const Vec3f& direction, const Vec3f& wi) const noexcept { return wi.z > 0.0f && direction.dot(outward) > 0.0f; }
  trace::Ray ray(const Vec3f& direction) const noexcept {
    trace::Ray ray;
    ray.origin = start;
    ray.direction = direction;
    return ray;
  }
};

PathTracer::PathTracer(const trace::Surfaces& shell, const Lighting& lighting, const Materials& materials)
    : shell_(shell),
      lighting_(lighting),
      materials_(materials),
      section_radiance_(Vec3f(shaders_cpu::inverse_tone(Vec3(materials.section_display)))),
      portal_(lighting.portal && max_component(lighting.dome.radiance) > 0.0f ? &*lighting.portal : nullptr) {}

Vec3f PathTracer::direct(const Vertex& v, const SobolStream& stream, std::uint32_t block,
                         RayCounts& counts) const noexcept {
  Vec3f total(0.0f);
  const auto gather = [&](const Vec3f& direction, const Vec3f& wi, float pdf, const Vec3f& radiance, float distance,
                          const SphereLamp* target) {
    if (!v.open_to(direction, wi) || !(pdf > 0.0f)) return;
    const Reflection r = v.surface.reflect(wi);
    const Vec3f light = r.value * radiance * (wi.z / pdf * power_weight(pdf, r.pdf));
    if (!(max_component(light) > 0.0f)) return;
    trace::Ray ray = v.ray(direction);
    ray.t_max = distance;
    ++counts.shadow;
    if (!barred(shell_, lighting_.lamps, ray, target)) total += light;
  };
  constexpr float kFar = std::numeric_limits<float>::infinity();
  auto u = stream.block(block + kLightBlock);

  if (max_component(lighting_.key.radiance) > 0.0f) {
    const Vec3f direction = lighting_.key.cone.sample(u[0], u[1]);
    gather(direction, v.basis.to_local(direction), lighting_.key.cone.pdf(), lighting_.key.radiance, kFar, nullptr);
  }
  if (!lighting_.lamps.empty()) {
    const LampChoice choice(lighting_.lamps, v.start);
    const std::size_t k = choice.choose(u[2]);
    if (k < lighting_.lamps.size()) {
      const SphereLamp& lamp = lighting_.lamps[k];
      const Vec3f direction = shaders_cpu::LampView(lamp, v.start).cone.sample(u[2], u[3]);
      float distance = shaders_cpu::lamp_distance(lamp, v.start, direction);
      if (!(distance < kFar)) distance = (lamp.centre - v.start).length();  // rounding at the lamp's rim
      gather(direction, v.basis.to_local(direction), choice.pdf(lamp), lamp.radiance, distance, &lamp);
    }
  }
  if (v.seen_portal) {
    u = stream.block(block + kPortalBlock);
    const Vec3f direction = v.seen_portal->sample(u[0], u[1]);
    gather(direction, v.basis.to_local(direction), v.seen_portal->pdf(), lighting_.dome.radiance, kFar, nullptr);
  }
  return total;
}

Vec3f PathTracer::sky(const Vertex& v, const Vec3f& direction, float scatter_pdf) const noexcept {
  Vec3f total = lighting_.dome.radiance;
  if (v.seen_portal && v.seen_portal->contains(direction)) total *= power_weight(scatter_pdf, v.seen_portal->pdf());
  if (lighting_.key.cone.contains(direction))
    total += lighting_.key.radiance * power_weight(scatter_pdf, lighting_.key.cone.pdf());
  return total;
}

Glimpse PathTracer::look(const trace::Ray& camera_ray, const SobolStream& stream, std::uint32_t first_block,
                         RayCounts& counts) const noexcept {
  trace::Ray ray = camera_ray;
  Encounter met = first_met(shell_, lighting_.lamps, ray);
  ++counts.camera;
  if (met.nothing()) return {};
  if (met.lamp) return {met.lamp->radiance, true};
  if (met.hit.part == trace::Part::kCutFace) return {section_radiance_, true};

  Glimpse seen{Vec3f(0.0f), true};
  Vec3f throughput(1.0f);
  std::uint32_t block = first_block;
  for (int bounce = 1; bounce <= kMaxBounces; ++bounce) {
    Vertex v(met.hit, -ray.direction, materials_, portal_);
    seen.radiance += throughput * direct(v, stream, block, counts);

    auto u = stream.block(block + kScatterBlock);
    block += kBlocks;
    if (v.surface.enters(u[0])) {
      const auto way = stream.block(block++);
      const auto out = materials_.wall->follow(met.hit, u[1], u[2], key_of(way));
      if (!out) break;
      throughput *= v.surface.entering() * out->weight;
      v = Vertex(out->hit, materials_, portal_);
      seen.radiance += throughput * direct(v, stream, block, counts);
      u = stream.block(block + kScatterBlock);
      block += kBlocks;
    }
    const shaders_cpu::Scatter next = v.surface.scatter(u[0], u[1], u[2]);
    const Vec3f direction = v.basis.to_world(next.direction);
    if (!(next.reflection.pdf > 0.0f) || !v.open_to(direction, next.direction)) break;
    throughput *= next.reflection.value * (next.direction.z / next.reflection.pdf);
    const float strength = max_component(throughput);
    if (strength < kRouletteBelow) {
      if (!(u[3] * kRouletteBelow < strength)) break;
      throughput *= kRouletteBelow / strength;
    }
    ray = v.ray(direction);
    met = first_met(shell_, lighting_.lamps, ray);
    ++counts.scattered;
    if (met.nothing()) {
      seen.radiance += throughput * sky(v, direction, next.reflection.pdf);
      break;
    }
    if (met.lamp) {
      const float lamp_pdf = LampChoice(lighting_.lamps, ray.origin).pdf(*met.lamp);
      seen.radiance += throughput * met.lamp->radiance * power_weight(next.reflection.pdf, lamp_pdf);
      break;
    }
  }
  return seen;
}

}  // namespace whorl::transport
