// SPDX-License-Identifier: Apache-2.0
// The measurements that a specimen may state: quantities, each under the definitions that the trade has for it.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

namespace whorl::specimen {

/// One way of taking one quantity. The order is that of the catalogue.
enum class Definition {
  kShellHeightAxial,
  kShellWidthAcross,
  kApertureHeightAxial,
  kApertureHeightLongest,
  kApertureWidthAcross,
  kApertureWidthAcrossLongest,
  kLastWhorlHeightFlank,
  kLastWhorlHeightAboveAperture,
  kPenultimateHeightBetweenSutures,
  kPenultimateWidthFlanks,
  kSpireHeightLessAperture,
  kSpireHeightLessLastWhorl,
  kSpireHeightDirect,
  kApicalAngleEarly,
  kPleuralAngleLastTwo,
  kSpireAngleSutures,
  kSuturalAngleChord,
  kSutureSlopeAcross,
  kWhorlsPole,
  kWhorlsNucleusLine,
  kWhorlsNucleusLineQuarter,
  kWhorlsSutureStart,
  kUmbilicusMargins,
  kUmbilicusSeams,
  kDiameterSumOfRadii,
  kWhorlHeightMargin,
  kWhorlHeightSeam,
  kWhorlHeightBetweenSutures,
  kWhorlWidthAlongAxis,
  kWhorlWidthFlanks,
  kWhorlWidthSection,
  kWhorlWidthBetweenSutures,
  kWhorlWidthProportional,
  kAperturalHeightVenters,
  kLipInclinationProfile,
  kWallThicknessWall,
  kWallThicknessLip,
};

enum class Dimension { kLength, kAngle, kCount };

struct DefinitionRow {
  Definition id;
  std::string_view quantity, definition;
  std::string_view abbreviations;  // parted by '|', as printed; each may stand for other quantities too
  Dimension dimension;
  bool at_stages;    // may be taken at an earlier stage of growth
  bool planispiral;  // of the ammonoid school: taken in the plane of coiling
  std::string_view meaning;
};

std::span<const DefinitionRow> all_definitions();
const DefinitionRow& row_of(Definition id);
/// "shell_height axial".
std::string written_definition(Definition id);
/// Null where there is no such pair. `quantity` may be one of the abbreviations if the definition then leaves one row only.
const DefinitionRow* find_definition(std::string_view quantity, std::string_view definition);
/// The rows that a quantity or an abbreviation without a definition may mean.
std::vector<const DefinitionRow*> possible_definitions(std::string_view quantity);
/// All names of quantities, each once.
std::vector<std::string_view> quantity_names();

}  // namespace whorl::specimen
