// SPDX-License-Identifier: Apache-2.0
// Renders one panel: every pixel of a view by path tracing.
#pragma once

#include "trace/surfaces.h"
#include "transport/camera.h"
#include "transport/film.h"
#include "transport/lighting.h"
#include "transport/materials.h"
#include "transport/progress.h"

#include <cstdint>

namespace whorl::transport {

struct RenderJob {
  const trace::Surfaces* shell = nullptr;  // required
  Box3 bounds_mm;  // holds all of the shell: pixels that it cannot reach are left out. Empty (the default): unknown
  Camera camera;
  Lighting lighting;
  Materials materials;
  int samples_per_pixel = 64;  // rounded up to a power of two, at least 2
  std::uint64_t seed = 0;
  std::uint32_t panel = 0;     // its number on the plate: panels get different noise
};

/// The samples that `samples_per_pixel` = n really takes: the next power of two, 2 .. 2^30.
int samples_taken(int n) noexcept;

/// Renders in tiles on all threads. The pixels depend on the job alone, not on the number of threads. Each pixel takes two
/// independently scrambled Sobol nets of half the samples; from their difference comes `Film::noise`, the root mean square
/// over the covered pixels of the standard error of the pixel's luminance.
Film render(const RenderJob& job, const Progress& progress);

}  // namespace whorl::transport
