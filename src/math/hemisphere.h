// SPDX-License-Identifier: Apache-2.0
// Directions over a surface, drawn in proportion to their cosine.
#pragma once

#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl {

/// Unit direction with z >= 0 and density cos / pi, for uniform u1, u2 in [0, 1).
inline Vec3f cosine_direction(float u1, float u2) noexcept {
  const float radius = std::sqrt(u1), angle = static_cast<float>(kTwoPi) * u2;
  return {radius * std::cos(angle), radius * std::sin(angle), std::sqrt(std::max(0.0f, 1.0f - u1))};
}
inline float cosine_pdf(float cosine) noexcept { return std::max(0.0f, cosine) * static_cast<float>(1.0 / kPi); }

}  // namespace whorl
