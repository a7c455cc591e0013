// SPDX-License-Identifier: Apache-2.0
// Light within a wall: a random walk from where it enters to where it leaves.
//
// Free flights by Beer's law, the phase function of Henyey & Greenstein 1941 (Astrophysical Journal 93: 70-83), Fresnel's
// equations where a flight meets the surface from within (total reflection included). Absorption is carried as weight; walks that carry
// little are cut by chance alone, so the mean is unbiased.
#pragma once

#include "math/basis3f.h"
#include "math/hash.h"
#include "shaders_cpu/surface/fresnel.h"

#include <algorithm>
#include <cmath>
#include <cstdint>

namespace whorl::shaders_cpu {

struct Medium {
  float mean_free_path = 1.0f;  // between events of any kind
  Vec3f albedo{1.0f};           // share of scattering among the events, by channel
  float anisotropy = 0.0f;      // mean cosine of scattering, -1 .. 1
  float index = 1.0f;           // refractive, against air
};

/// Density of scattering by an angle of this cosine, 1/sr.
inline float henyey_greenstein(float cosine, float g) noexcept {
  const float d = 1.0f + g * g - 2.0f * g * cosine;
  return (1.0f - g * g) / (static_cast<float>(4.0 * kPi) * d * std::sqrt(d));
}

/// A direction drawn with that density; `direction` is the way the light goes.
inline Vec3f scattered(const Vec3f& direction, float g, float u1, float u2) noexcept {
  float cosine = 1.0f - 2.0f * u1;
  if (std::abs(g) > 1e-3f) {
    const float s = (1.0f - g * g) / (1.0f - g + 2.0f * g * u1);
    cosine = std::clamp((1.0f + g * g - s * s) / (2.0f * g), -1.0f, 1.0f);
  }
  const float sine = std::sqrt(std::max(0.0f, 1.0f - cosine * cosine)), turn = static_cast<float>(kTwoPi) * u2;
  return unit(Basis3f(direction).to_world({sine * std::cos(turn), sine * std::sin(turn), cosine}));
}

/// Albedo of single scattering of a deep wall without a skin that looks of this colour: the published inversion for the similar
/// isotropic medium of d'Eon's and Kulla & Conty's fits, as given in the OpenPBR specification, 1.1, section 3.6. A guide: thin
/// walls and reflecting faces look otherwise.
inline float scattering_albedo_of(float colour, float g) noexcept {
  const float c = std::clamp(colour, 0.0f, 1.0f);
  const float s = 4.09712f + 4.20863f * c - std::sqrt(9.59217f + 41.6808f * c + 17.7126f * c * c);
  return std::clamp((1.0f - s * s) / (1.0f - g * s * s), 0.0f, 1.0f);
}

/// Numbers in [0, 1) that follow from a key alone.
class WalkNumbers {
 public:
  explicit WalkNumbers(std::uint64_t key) noexcept : key_(key) {}
  float next() noexcept { return unit_float(high_word(hash_with(key_, ++count_))); }

 private:
  std::uint64_t key_, count_ = 0;
};

/// Where a straight flight within the wall meets its surface.
struct WallExit {
  float t = 0.0f;
  Vec3f position, normal;  // normal out of the wall
};

struct WalkEnd {
  bool left = false;      // false: absorbed
  Vec3f weight{0.0f};     // of the light that leaves
  Vec3f direction;        // within the wall, as it meets the surface
  WallExit exit;
};

/// Follows light that goes from `position` (within the wall) in `direction`. `leave(position, direction, limit, exit)` says whether the
/// way of length `limit` meets the surface, and where.
template <class Leave>
WalkEnd walk_in_wall(const Medium& medium, Vec3f position, Vec3f direction, WalkNumbers numbers, const Leave& leave) noexcept {
  constexpr float kCutBelow = 0.1f;
  constexpr int kMostEvents = 1000000;  // ends only walks that a fault keeps within for ever
  Vec3f weight(1.0f);
  WalkEnd end;
  for (int event = 0; event < kMostEvents; ++event) {
    const float flight = -medium.mean_free_path * std::log1p(-numbers.next());
    WallExit exit;
    if (leave(position, direction, flight, exit)) {
      // From within: sines grow by the index on the way out.
      const float inside = std::clamp(direction.dot(exit.normal), 0.0f, 1.0f);
      const float sine2 = medium.index * medium.index * (1.0f - inside * inside);
      const float reflected = sine2 >= 1.0f ? 1.0f : fresnel_dielectric(std::sqrt(1.0f - sine2), medium.index);
      if (!(numbers.next() < reflected)) {
        end.left = true;
        end.weight = weight;
        end.direction = direction;
        end.exit = exit;
        return end;
      }
      position = exit.position;
      direction = unit(direction - exit.normal * (2.0f * direction.dot(exit.normal)));
      continue;
    }
    position += direction * flight;
    weight *= medium.albedo;
    const float most = max_component(weight);
    if (most < kCutBelow) {
      if (!(numbers.next() * kCutBelow < most)) return end;
      weight *= kCutBelow / most;
    }
    const float u1 = numbers.next(), u2 = numbers.next();
    direction = scattered(direction, medium.anisotropy, u1, u2);
  }
  return end;
}

}  // namespace whorl::shaders_cpu
