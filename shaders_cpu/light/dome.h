// SPDX-License-Identifier: Apache-2.0
// The fill light: the same radiance from every direction of the sphere.
#pragma once

#include "math/vec.h"

namespace whorl::shaders_cpu {

struct Dome {
  Vec3f radiance{0.0f};
};

}  // namespace whorl::shaders_cpu
