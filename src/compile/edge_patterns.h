// SPDX-License-Identifier: Apache-2.0
// Stated pattern models -> their pictures over the shell.
#pragma once

#include "compile/faults.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Needs the law in mm and the outlines. Faults: a pattern finer than the nodes of the edge can show.
void build_edge_patterns(scene::Scene& scene, const specimen::Specimen& specimen, const PeriodicSpline& reach,
                         Faults& faults);

}  // namespace whorl::compile
