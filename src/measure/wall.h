// SPDX-License-Identifier: Apache-2.0
// Wall thickness along the surface normal.
#pragma once

#include "trace/embree_solid.h"

namespace whorl::measure {

struct WallThickness {
  double at_lip = 0.0, at_lip_spread = 0.0;  // median and interquartile range just behind the rim
  double least = 0.0, least_whorl = 0.0;     // over the tube, and where
};

/// From places on the outside, along the inward normal, through to the lumen.
WallThickness wall_thickness(const trace::EmbreeSolid& solid);

}  // namespace whorl::measure
