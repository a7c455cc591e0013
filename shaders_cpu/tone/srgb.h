// SPDX-License-Identifier: Apache-2.0
// The sRGB transfer function, IEC 61966-2-1.
#pragma once

#include "math/vec.h"

#include <cmath>

namespace whorl::shaders_cpu {

/// Display-linear 0 .. 1 to encoded 0 .. 1.
inline double srgb_encode(double linear) noexcept {
  return linear <= 0.0031308 ? 12.92 * linear : 1.055 * std::pow(linear, 1.0 / 2.4) - 0.055;
}
/// Encoded 0 .. 1 to display-linear 0 .. 1.
inline double srgb_decode(double encoded) noexcept {
  return encoded <= 0.04045 ? encoded / 12.92 : std::pow((encoded + 0.055) / 1.055, 2.4);
}
/// Display-linear colour of an 8-bit sRGB triple.
inline Vec3 srgb_decode_bytes(int red, int green, int blue) noexcept {
  return {srgb_decode(red / 255.0), srgb_decode(green / 255.0), srgb_decode(blue / 255.0)};
}

}  // namespace whorl::shaders_cpu
