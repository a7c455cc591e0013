// SPDX-License-Identifier: Apache-2.0
// What a ray meets first: the shell, a lamp, or nothing.
#pragma once

#include "shaders_cpu/light/sphere_lamp.h"
#include "trace/surfaces.h"

#include <span>

namespace whorl::transport {

struct Encounter {
  bool solid = false;                               // `hit` is filled by the shell
  const shaders_cpu::SphereLamp* lamp = nullptr;    // nearer than the shell; only `hit.t` holds then
  trace::Hit hit;

  bool nothing() const noexcept { return !solid && !lamp; }
};

/// Nearest of shell and lamps; at equal distance the lamp.
inline Encounter first_met(const trace::Surfaces& shell, std::span<const shaders_cpu::SphereLamp> lamps,
                           trace::Ray ray) noexcept {
  Encounter met;
  for (const auto& lamp : lamps) {
    const float t = shaders_cpu::lamp_distance(lamp, ray.origin, ray.direction);
    if (t >= ray.t_min && t < ray.t_max) {
      ray.t_max = t;
      met.lamp = &lamp;
      met.hit.t = t;
    }
  }
  if (shell.closest(ray, met.hit)) {
    met.solid = true;
    met.lamp = nullptr;
  }
  return met;
}

/// Whether the way along the ray is barred by the shell or by a lamp other than `target`.
inline bool barred(const trace::Surfaces& shell, std::span<const shaders_cpu::SphereLamp> lamps, const trace::Ray& ray,
                   const shaders_cpu::SphereLamp* target) noexcept {
  for (const auto& lamp : lamps)
    if (&lamp != target && shaders_cpu::lamp_distance(lamp, ray.origin, ray.direction) < ray.t_max) return true;
  return shell.occluded(ray);
}

}  // namespace whorl::transport
