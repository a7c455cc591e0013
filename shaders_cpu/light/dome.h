// SPDX-License-Identifier: Apache-2.0
// The fill light: the same radiance from every direction of the sphere.
#pragma once

#include "math/hemisphere.h"

namespace whorl::shaders_cpu {

struct Dome {
  Vec3f radiance{0.0f};

  /// A direction over the surface (z = normal), and its density.
  Vec3f sample(float u1, float u2) const noexcept { return cosine_direction(u1, u2); }
  float pdf(float cosine) const noexcept { return cosine_pdf(cosine); }
};

}  // namespace whorl::shaders_cpu
