// SPDX-License-Identifier: Apache-2.0
// The light of a picture: key and fill fixed to the page, lamps fixed to the shell.
#pragma once

#include "math/vec.h"
#include "shaders_cpu/light/dome.h"
#include "shaders_cpu/light/key_light.h"
#include "shaders_cpu/light/portal.h"
#include "shaders_cpu/light/sphere_lamp.h"
#include "specimen/specimen.h"

#include <optional>
#include <span>
#include <vector>

namespace whorl::transport {

/// Everything in the frame of the shell. A matt white card (albedo 1) that faces the key has radiance exactly 1.
struct Lighting {
  shaders_cpu::KeyLight key;
  shaders_cpu::Dome dome;
  std::vector<shaders_cpu::SphereLamp> lamps;
  /// The shell's mouth: places in the lumen send shadow rays through it as well. Plates leave it out: under an even dome scattered rays
  /// find the mouth as well in less time (tools/bench/run portal).
  std::optional<shaders_cpu::Portal> portal;
};

/// A lamp of the scene file with the place that the growth law gives it.
struct PlacedLamp {
  Vec3 centre_mm;
  double radius_mm = 0.0;
  double strength = 0.0;  // radiance as a multiple of the card's
  double temperature_k = 0.0;
};

/// Light for one view. The key comes from `azimuth_deg` (on the page, anticlockwise from right) and `elevation_deg` (out
/// of the page); key and fill irradiances on the card sum to pi, less the stated stops, and stand as 1 to `fill`.
Lighting light_page(const specimen::Light& light, std::span<const PlacedLamp> lamps, const Frame& page_in_shell);

}  // namespace whorl::transport
