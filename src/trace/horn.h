// SPDX-License-Identifier: Apache-2.0
// The signed distance of a horn: a curved, tapered, solid or hollow cone.
#pragma once

#include "scene/attached.h"

namespace whorl::trace {

/// Positive inside, mm; a distance to first order near the surface.
double value_of(const scene::Horn& horn, const Vec3& p) noexcept;
/// Nothing of the surface is nearer than this to a place of that value.
double clear_of_horn(const scene::Horn& horn, double value) noexcept;

}  // namespace whorl::trace
