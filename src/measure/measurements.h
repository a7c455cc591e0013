// SPDX-License-Identifier: Apache-2.0
// What a shell measures, taken on its solid, each value with how it was taken and how far it can be trusted.
#pragma once

#include "specimen/specimen.h"
#include "trace/embree_solid.h"

#include <cstdint>
#include <string>

namespace whorl::measure {

/// A value with its method and the standard error or bound of the estimate, in the value's own unit.
struct Measured {
  double value = 0.0;
  double error = 0.0;
  std::string method;
};

/// Lengths in mm, areas in mm^2, volumes in mm^3, angles in degrees.
struct Measurements {
  Measured shell_height, shell_width;
  Measured aperture_height, aperture_width;
  Measured last_whorl_height, spire_height;
  Measured whorls;
  Measured apical_angle_deg;
  Measured wall_thickness_lip, wall_thickness_min;
  Measured outer_volume, lumen_volume, wall_volume;
  Measured outer_area, inner_area;
  Measured mass_g;
  Measured raup_W, raup_D, raup_T, raup_S;
};

struct MeasureOptions {
  int lines = 1 << 19;     // for volumes and areas; a power of two
  std::uint64_t seed = 0;  // of those lines
};

/// Measures the solid that rays meet. Uses all threads.
Measurements measure_shell(const trace::EmbreeSolid& solid, specimen::Mineral mineral, const MeasureOptions& options);

}  // namespace whorl::measure
