// SPDX-License-Identifier: Apache-2.0
// The shell that a fit tries: a coiling law with elliptic whorl sections, in millimetres.
#pragma once

#include "growth/coiling_law.h"

namespace whorl::fit {

struct Form {
  growth::CoilingLaw law;        // lengths in mm
  double tan_inclination = 0.0;  // of the aperture to the axis
  double wall_mm = 0.0, lip_mm = 0.0;
};

}  // namespace whorl::fit
