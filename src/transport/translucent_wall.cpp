// SPDX-License-Identifier: Apache-2.0
// Walks within the solid: flights end where the state changes along them.
#include "transport/translucent_wall.h"

#include "math/hemisphere.h"
#include "shaders_cpu/tone/srgb.h"

#include <vector>

namespace whorl::transport {
namespace {

bool is_hollow(field::Part part) {
  return part == field::Part::kWhorlHollow || part == field::Part::kChamberHollow || part == field::Part::kChamberOpening;
}

}  // namespace

std::optional<TranslucentWall::Emergence> TranslucentWall::follow(const trace::Hit& entry, float u1, float u2,
                                                                  std::uint64_t key) const noexcept {
  thread_local std::vector<trace::Crossing> crossings;
  trace::Crossing last{};
  const auto leave = [&](const Vec3f& position, const Vec3f& direction, float limit, shaders_cpu::WallExit& exit) noexcept {
    trace::Ray ray;
    ray.origin = position;
    ray.direction = direction;
    ray.t_max = limit;
    solid_.crossings(ray, field::State::kSolid, crossings);
    for (const trace::Crossing& crossing : crossings) {
      if (crossing.after == field::State::kSolid) continue;
      last = crossing;
      exit.t = crossing.t;
      const Vec3 p = Vec3(position) + Vec3(direction) * static_cast<double>(crossing.t);
      Vec3 outwards = solid_.field().gradient({crossing.part, crossing.theta}, p) * (is_hollow(crossing.part) ? 1.0 : -1.0);
      const double length = outwards.length();
      exit.normal = length > 0.0 ? Vec3f(outwards / length) : direction;
      // A place between two surfaces may be left over an edge: the way out is always forwards.
      if (exit.normal.dot(direction) <= 0.0f) exit.normal = direction;
      exit.position = Vec3f(p) - exit.normal * entry.safe_offset;
      return true;
    }
    return false;
  };

  const Vec3f start = entry.position - entry.normal * entry.safe_offset;
  const Vec3f inwards = Basis3f(-entry.normal).to_world(cosine_direction(u1, u2));
  const shaders_cpu::WalkEnd end = walk_in_wall(medium_, start, inwards, shaders_cpu::WalkNumbers(key), leave);
  if (!end.left) return std::nullopt;
  Emergence out;
  out.weight = end.weight;
  out.hit.normal = end.exit.normal;
  out.hit.position = end.exit.position + end.exit.normal * entry.safe_offset;
  out.hit.part = is_hollow(last.part) || last.after == field::State::kLumen ? trace::Part::kInterior : trace::Part::kExterior;
  out.hit.parietal = !is_hollow(last.part) && last.after == field::State::kLumen;
  const bool tube = last.part == field::Part::kWhorl || last.part == field::Part::kWhorlHollow;
  out.hit.passage = tube ? last.theta : solid_.field().scene().law.theta_start;
  out.hit.safe_offset = entry.safe_offset;
  return out;
}

std::optional<shaders_cpu::Medium> make_medium(const specimen::Specimen& specimen) {
  const specimen::Translucence& t = specimen.translucence;
  if (!(t.mean_free_path_mm > 0.0)) return std::nullopt;
  shaders_cpu::Medium medium;
  medium.mean_free_path = static_cast<float>(t.mean_free_path_mm.value);
  medium.anisotropy = static_cast<float>(t.anisotropy.value);
  medium.index = static_cast<float>(specimen.identity.mineral.value == specimen::Mineral::kAragonite
                                        ? shaders_cpu::kAragoniteIndex
                                        : shaders_cpu::kCalciteIndex);
  const Vec3 colour = shaders_cpu::srgb_decode_bytes(t.colour.value.red, t.colour.value.green, t.colour.value.blue);
  for (int c = 0; c < 3; ++c)
    medium.albedo[c] = shaders_cpu::scattering_albedo_of(static_cast<float>(colour[c]), medium.anisotropy);
  return medium;
}

}  // namespace whorl::transport
