// SPDX-License-Identifier: Apache-2.0
// Other scenes' shells, set down on this one.
#pragma once

#include "compile/faults.h"
#include "growth/extents.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Reads, compiles and places them. Faults: a file that cannot be read or is no sound scene, one with encrusters of its own, one that is
/// let in too deep.
void build_encrusters(scene::Scene& scene, const specimen::Specimen& specimen, const growth::Exterior& shell, Faults& faults);

}  // namespace whorl::compile
