// SPDX-License-Identifier: Apache-2.0
// The rays of the race: the same for every contender.
#pragma once

#include "contender.h"
#include "shape.h"

#include <vector>

namespace whorl::bench {

struct RaySets {
  std::vector<trace::Ray> camera;     // apertural, right lateral and apical views, in scan order
  std::vector<trace::Ray> scattered;  // cosine-distributed directions from the camera rays' hits
  std::vector<trace::Ray> shadow;     // from those hits that face it, towards the key light's disc
};

/// `pixels` camera rays a view. Where rays start on the surface they start `offset_mm` above it, which clears every contender's error.
RaySets make_ray_sets(const Shape& shape, const Contender& reference, std::size_t pixels, double offset_mm);

}  // namespace whorl::bench
