// SPDX-License-Identifier: Apache-2.0
// Lamps inside the lumen.
#pragma once

#include "compile/faults.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Places every lamp on the lumen's centre line; adds a fault for one that is not inside the tube or touches its wall.
void build_lamps(scene::Scene& scene, const specimen::Specimen& specimen, Faults& faults);

}  // namespace whorl::compile
