// SPDX-License-Identifier: Apache-2.0
// How much of a shell was observed.
#pragma once

#include "measure/measurements.h"
#include "specimen/provenance.h"

namespace whorl::measure {

/// Of the coil's length along its centre line, integrated over the coiling law; of the outer surface, by crossings of isotropic lines
/// (Crofton) with the solid, each counted for the place where it lies.
specimen::ProvenanceShares provenance_shares(const trace::EmbreeSolid& solid, const specimen::Preservation& preservation,
                                             const MeasureOptions& options);

}  // namespace whorl::measure
