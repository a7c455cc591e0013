// SPDX-License-Identifier: Apache-2.0
// The record of a whole turn.
#pragma once

#include "plate/record.h"
#include "sequence/turn_plan.h"
#include "specimen/specimen.h"

#include <filesystem>
#include <string>

namespace whorl::sequence {

/// JSON: what all frames share, and for each its number, file, azimuth, whether it is whole, and its seconds (from the frame's
/// own record). Depends on the plan and on the frames in the folder alone, so that every part of a divided turn ends
/// with the same text.
std::string turn_record_text(const TurnPlan& plan, const specimen::Specimen& specimen, const plate::RunFacts& run,
                             const std::filesystem::path& folder, const std::string& stem, const std::string& key);

}  // namespace whorl::sequence
