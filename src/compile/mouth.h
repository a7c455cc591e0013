// SPDX-License-Identifier: Apache-2.0
// The mouth as an opening for light.
#pragma once

#include "growth/extents.h"
#include "scene/scene.h"

namespace whorl::compile {

/// The smallest rectangle, in the plane that fits the lumen's edge at the growth front best, that holds that edge.
scene::Mouth mouth_of(const scene::Scene& scene);

}  // namespace whorl::compile
