// SPDX-License-Identifier: Apache-2.0
// Stated colour patterns: how much of a place a band, a flame or a spot covers.
//
// A place is given by growth in whorls (counted along growth lines) and by its section angle in degrees. Cover runs from 0 to
// 1. Every function is pure; irregularity is a hash of the seed and of the element's number along the shell.
#pragma once

#include "math/vec.h"

#include <cstdint>

namespace whorl::shaders_cpu {

/// 1 well within (distance = 0), 0 from `distance` = 1 on; the last `fade` of the way is a smooth ramp.
float soft_cover(float distance, float fade) noexcept;

/// Degrees from `from` to `to` by the shorter way, -180 .. 180.
float degrees_apart(float from, float to) noexcept;

struct BandShape {
  float at_deg = 0.0f, width_deg = 10.0f, fade = 0.2f;
};
float band_cover(const BandShape& band, float around_deg) noexcept;

/// Stripes along growth lines. `breadth` and `sway` count in spacings.
struct FlameShape {
  float per_whorl = 10.0f, breadth = 0.45f, at_deg = 0.0f, width_deg = 360.0f, taper = 0.0f, sway = 0.0f, bends = 4.0f;
  float irregularity = 0.0f, fade = 0.25f;
  std::uint64_t seed = 1;
};
float flame_cover(const FlameShape& flame, double growth, float around_deg) noexcept;

/// A row of ellipses. `length` counts in spacings.
struct SpotShape {
  float per_whorl = 10.0f, length = 0.5f, at_deg = 0.0f, width_deg = 12.0f, stagger = 0.0f;
  float irregularity = 0.0f, fade = 0.3f;
  std::uint64_t seed = 1;
};
float spot_cover(const SpotShape& spot, double growth, float around_deg) noexcept;

}  // namespace whorl::shaders_cpu
