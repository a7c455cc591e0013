// SPDX-License-Identifier: Apache-2.0
// Stated stripes, lamellae, spines and attached elements as solids in their places.
#pragma once

#include "compile/faults.h"
#include "growth/extents.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

namespace whorl::compile {

/// Places all that stands on a shell whose law, wall and outside are known. Faults: a foot too broad for the whorl, more elements
/// than kMostAttached.
void build_attached(scene::Scene& scene, const specimen::Specimen& specimen, const growth::Exterior& shell, Faults& faults);

inline constexpr double kMostAttached = 4e6;

}  // namespace whorl::compile
