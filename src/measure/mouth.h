// SPDX-License-Identifier: Apache-2.0
// The mouth and the suture, found on the solid.
#pragma once

#include "trace/embree_solid.h"

namespace whorl::measure {

struct MouthExtent {
  double height = 0.0;  // along the axis
  double width = 0.0;   // away from the axis
  double resolution = 0.0;
};

/// What lies inside the tube at the growth front of the lip and outside all earlier whorls: lip and columella included.
MouthExtent mouth_extent(const field::Field& field);

/// Depth of the suture above the last whorl where it is read: on the flank opposite to the aperture, in apertural view.
/// Returns false where the last whorl hides the one before on that side.
bool suture_depth(const trace::EmbreeSolid& solid, double& z);

}  // namespace whorl::measure
