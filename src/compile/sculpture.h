// SPDX-License-Identifier: Apache-2.0
// Stated sculpture as reliefs in the coordinates of growth.
#pragma once

#include "compile/faults.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Reliefs for a shell whose half-breadth at the lip is `half_breadth_mm`.
growth::Sculpture sculpture_of(const specimen::Specimen& specimen, const growth::CoilingLaw& law, double half_breadth_mm);

/// Joins the sculpture to a scene whose tube is built. Faults: too high to be one with the whorl, or cut too deep into the wall.
void build_sculpture(scene::Scene& scene, const specimen::Specimen& specimen, Faults& faults);

}  // namespace whorl::compile
