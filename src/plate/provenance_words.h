// SPDX-License-Identifier: Apache-2.0
// What of the shell was observed, in words for the caption and in numbers for the record.
#pragma once

#include "plate/figure_plan.h"
#include "specimen/provenance.h"

#include <nlohmann/json.hpp>

#include <optional>
#include <string>

namespace whorl::plate {

/// "Preserved are whorls 1.5 to 4 (outside). Of the length of the coil 60 % is observed, ..": for a specimen that states it.
std::string provenance_sentences(const FigurePlan& plan, const specimen::Specimen& specimen,
                                 const std::optional<specimen::ProvenanceShares>& shares);

nlohmann::ordered_json provenance_record(const FigurePlan& plan, const specimen::Specimen& specimen,
                                         const std::optional<specimen::ProvenanceShares>& shares);

}  // namespace whorl::plate
