// SPDX-License-Identifier: Apache-2.0
// The look of a radiograph: what parallel rays leave behind the shell.
#pragma once

#include "trace/united_solid.h"
#include "transport/camera.h"
#include "transport/film.h"
#include "transport/progress.h"

#include <cstdint>
#include <vector>

namespace whorl::transport {

/// Length of a ray within the wall and all that stands on it, mm, over all crossings. The ray starts outside the shell.
struct RayScratch {
  std::vector<trace::Crossing> crossings;
  std::vector<trace::AttachedSolids::Within> within;
};
double wall_length(const trace::UnitedSolid& solid, const trace::Ray& ray, RayScratch& scratch);

struct RadiographJob {
  const trace::EmbreeSolid* solid = nullptr;         // required
  const trace::AttachedSolids* attached = nullptr;  // what stands on it, if anything
  Box3 bounds_mm;  // holds all of the shell; empty: unknown
  Camera camera;
  double attenuation_per_mm = 0.0;
  bool bright_shell = false;  // prints one minus the transmission, else the transmission
  int samples_per_pixel = 16;
  std::uint64_t seed = 0;
  std::uint32_t panel = 0;
};

/// Radiance is such that the printed light (before sRGB coding) is the mean transmission, or one minus it. Coverage is the share of
/// rays that meet wall. Layers are those of the first surface. The pixels depend on the job alone.
Film radiograph(const RadiographJob& job, const Progress& progress);

}  // namespace whorl::transport
