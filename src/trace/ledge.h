// SPDX-License-Identifier: Apache-2.0
// The signed distance of a piece of a lamella or of a stripe, in the coordinates of growth.
#pragma once

#include "field/field.h"
#include "scene/attached.h"

namespace whorl::trace {

/// Positive inside, mm; near the surface a distance to about a half of itself.
double value_of(const scene::Ledge& ledge, const field::Field& field, const Vec3& p) noexcept;
/// Nothing of the surface is nearer than this to a place of that value within the ledge's box.
inline double clear_of_ledge(double value) noexcept { return 0.5 * std::abs(value); }
/// Holds all of the piece.
Box3 box_of(const scene::Ledge& ledge, const field::Field& field);

}  // namespace whorl::trace
