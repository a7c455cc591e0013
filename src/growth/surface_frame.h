// SPDX-License-Identifier: Apache-2.0
// The frame in which things stand on the outside of the shell.
#pragma once

#include "growth/extents.h"

namespace whorl::growth {

/// A place on the sculptured outside and its directions, unit and perpendicular to one another.
struct SurfaceFrame {
  double theta;    // growth angle of the half-plane that holds it
  Vec3 point, normal, forward, across;  // forward: towards the lip, across the growth line; across: along it
  double scale;    // size of the whorl there / at the lip
};

/// At a growth, counted along growth lines as the lip lay there, and a section angle; radians. The normal is that of the plain outline.
SurfaceFrame surface_frame(const Exterior& shell, double growth, double psi);

}  // namespace whorl::growth
