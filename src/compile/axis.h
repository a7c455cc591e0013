// SPDX-License-Identifier: Apache-2.0
// What owns the axis: the embryonic shell at the apex and the columella below it.
#pragma once

#include "compile/faults.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Fills the chamber and the pillar of `scene`, whose law, wall and tube are set. Adds a fault where whorls cross the
/// axis and no pillar as thick as the wall parts them.
void build_axis(scene::Scene& scene, const specimen::Specimen& specimen, const PeriodicSpline& reach, Faults& faults);

}  // namespace whorl::compile
