// SPDX-License-Identifier: Apache-2.0
// The one tone curve from scene radiance to the display: fixed, so that plates can be compared.
#pragma once

#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {

/// What a matt white card that faces the key light (radiance 1) prints as: sRGB 243 of 255, leaving room above for
/// highlights alone.
inline constexpr double kCardDisplay = 0.9;
/// The largest display value that is told apart from white; nearer ones round to white even at 16 bits.
inline constexpr double kBelowWhite = 1.0 - 1e-6;

/// Scene-linear to display-linear: straight up to the card, then a shoulder that nears 1; once differentiable.
/// Applied to each channel alone: below the card that changes nothing in hue, above it an over-bright lamp goes evenly
/// to white as on film, and no colour can leave the gamut or lose its order of brightness, as it could if luminance were
/// kept instead.
inline double tone(double scene) noexcept {
  if (scene <= 1.0) return kCardDisplay * scene;
  return 1.0 - (1.0 - kCardDisplay) * std::exp(-kCardDisplay / (1.0 - kCardDisplay) * (scene - 1.0));
}

/// The scene value that prints as `display`; values above kBelowWhite give that of kBelowWhite (about 2.28).
inline double inverse_tone(double display) noexcept {
  const double y = std::min(display, kBelowWhite);
  if (y <= kCardDisplay) return y / kCardDisplay;
  return 1.0 - (1.0 - kCardDisplay) / kCardDisplay * std::log((1.0 - y) / (1.0 - kCardDisplay));
}

inline Vec3 tone(const Vec3& c) noexcept { return {tone(c.x), tone(c.y), tone(c.z)}; }
inline Vec3 inverse_tone(const Vec3& c) noexcept { return {inverse_tone(c.x), inverse_tone(c.y), inverse_tone(c.z)}; }

}  // namespace whorl::shaders_cpu
