// SPDX-License-Identifier: Apache-2.0
// The tube's two chains of stations, outer and lumen.
#pragma once

#include "compile/faults.h"
#include "scene/scene.h"

namespace whorl::compile {

/// Fills outlines, stations, ends and caps of `scene`, whose law and wall are set. Adds a fault where the wall leaves
/// no lumen. `wall_at`, `lip_at`: where the file states the two thicknesses.
void build_tube(scene::Scene& scene, const PeriodicSpline& reach, diagnostics::Position wall_at,
                diagnostics::Position lip_at, Faults& faults);

}  // namespace whorl::compile
