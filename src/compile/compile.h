// SPDX-License-Identifier: Apache-2.0
// From what was stated to the compiled scene, once.
#pragma once

#include "growth/extents.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Solves the stated size, builds both chains of stations, embryonic shell, columella, growth front and lamps.
/// Throws diagnostics::InvalidInput with every fault that only the geometry shows: whorls that cross the axis, a wall
/// thicker than the tube, grooves that meet the section's centre, lamps that do not fit into the lumen.
scene::Scene compile_scene(const specimen::Specimen& specimen);

/// The outside of a compiled shell, for framing views.
growth::Exterior exterior_of(const scene::Scene& scene);

}  // namespace whorl::compile
