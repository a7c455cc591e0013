// SPDX-License-Identifier: Apache-2.0
// A ray against a box.
#pragma once

#include "trace/surfaces.h"

#include <algorithm>

namespace whorl::trace {

/// Narrows [t0, t1] to the part of the ray within a box; false where there is none.
inline bool clip(const Ray& ray, const Box3& box, double& t0, double& t1) {
  for (int i = 0; i < 3; ++i) {
    const double o = static_cast<double>(ray.origin[i]), d = static_cast<double>(ray.direction[i]);
    if (d == 0.0) {
      if (o < box.min[i] || o > box.max[i]) return false;
      continue;
    }
    const double a = (box.min[i] - o) / d, b = (box.max[i] - o) / d;
    t0 = std::max(t0, std::min(a, b));
    t1 = std::min(t1, std::max(a, b));
  }
  return t0 <= t1;
}

}  // namespace whorl::trace
