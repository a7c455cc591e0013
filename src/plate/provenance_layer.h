// SPDX-License-Identifier: Apache-2.0
// The provenance of what each pixel shows.
#pragma once

#include "field/field.h"
#include "specimen/provenance.h"
#include "transport/camera.h"
#include "transport/film.h"

namespace whorl::plate {

/// Fills `provenance` of the film's facts from their depth, normal and part, which `camera` rendered. Lamps and empty pixels have none.
void add_provenance(const specimen::Preservation& preservation, const field::Field& field, const transport::Camera& camera,
                    transport::Film& film);

}  // namespace whorl::plate
