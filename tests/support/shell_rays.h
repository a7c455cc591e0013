// SPDX-License-Identifier: Apache-2.0
// Rays for tests, and what they meet when nothing but the state of places is asked.
#pragma once

#include "support/shell_specimen.h"
#include "trace/surfaces.h"

#include <vector>

namespace whorl::test {

/// Rays from all sides at random places of the shell, and from random places of the air around it and in its lumen.
std::vector<trace::Ray> random_rays(const Shell& shell, std::size_t count, unsigned seed);

inline Vec3 place_on(const trace::Ray& ray, double t) { return Vec3(ray.origin) + t * Vec3(ray.direction); }

/// Walks along a ray by `step`, asking Field::place_at at each, and halves where the state changes. What is thinner than a
/// step along the ray can be missed.
struct Walk {
  struct Change {
    double t;
    field::State after;
  };
  field::State start = field::State::kOutside;
  std::vector<Change> changes;
};
Walk walk(const Shell& shell, const trace::Ray& ray, double t_end, double step, bool to_first_solid);

}  // namespace whorl::test
