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
  /// Pixels whose noise would be seen take twice as many, again and again, up to this; 0: all take the same.
  int most_samples = 0;
  std::uint64_t seed = 0;
  std::uint32_t panel = 0;     // its number on the plate: panels get different noise
};

/// The samples that `samples_per_pixel` = n really takes: the next power of two, 2 .. 2^30.
int samples_taken(int n) noexcept;

/// Noise is seen where the standard error of a pixel's mean, as independent samples would have it, is more than this on the sRGB scale
/// (0 .. 1) of the print: two steps of 255. Changes between shell and background do not count: they are the outline's.
inline constexpr double kSeenNoise = 2.0 / 255.0;

/// Renders in tiles on all threads. The pixels depend on the job alone, not on the number of threads. Each pixel takes two
/// independently scrambled Sobol nets of half its samples, which go on where they were if it needs more; from their difference comes `Film::noise`, the root mean square
/// over the covered pixels of the standard error of the pixel's luminance.
Film render(const RenderJob& job, const Progress& progress);

}  // namespace whorl::transport
