// SPDX-License-Identifier: Apache-2.0
// The catalogue of definitions. Schools and abbreviations as in print; each meaning says where the ends of the measure lie.
#include "specimen/definitions.h"

#include <fmt/format.h>

#include <algorithm>
#include <iterator>

namespace whorl::specimen {
namespace {

using enum Definition;
constexpr auto kLength = Dimension::kLength;
constexpr auto kAngle = Dimension::kAngle;
constexpr auto kCount = Dimension::kCount;

constexpr DefinitionRow kRows[] = {
    {kShellHeightAxial, "shell_height", "axial", "SH|H|L|SL", kLength, true, false,
     "extent along the axis of coiling, apex to the most basal point, lip included"},
    {kShellWidthAcross, "shell_width", "across_axis", "SW|W|D", kLength, true, false,
     "greatest extent square to the axis, lip included"},
    {kApertureHeightAxial, "aperture_height", "axial", "AH|HPR", kLength, true, false,
     "extent of the aperture along the axis, lip included"},
    {kApertureHeightLongest, "aperture_height", "longest", "AH|HPR", kLength, true, false,
     "greatest length of the aperture along its own long axis, lip included"},
    {kApertureWidthAcross, "aperture_width", "across_axis", "AW|DPR", kLength, true, false,
     "extent of the aperture square to the axis, lip included"},
    {kApertureWidthAcrossLongest, "aperture_width", "across_longest", "AW|DPR", kLength, true, false,
     "extent of the aperture square to its greatest length, lip included"},
    {kLastWhorlHeightFlank, "last_whorl_height", "flank", "BWH|LWH", kLength, false, false,
     "along the axis, from the suture on the flank opposite to the aperture to the base"},
    {kLastWhorlHeightAboveAperture, "last_whorl_height", "above_aperture", "BWH|LWH", kLength, false, false,
     "along the axis, from the suture above the aperture, at the lip, to the base"},
    {kPenultimateHeightBetweenSutures, "penultimate_whorl_height", "between_sutures", "PWH", kLength, false, false,
     "along the axis, between the sutures above and below it on the flank opposite to the aperture"},
    {kPenultimateWidthFlanks, "penultimate_whorl_width", "flank_to_flank", "PWW", kLength, false, false,
     "square to the axis, between the outer margins one whorl and a whorl and a half before the lip"},
    {kSpireHeightLessAperture, "spire_height", "less_aperture", "SpH|HSP|sh", kLength, false, false,
     "shell_height axial less aperture_height axial"},
    {kSpireHeightLessLastWhorl, "spire_height", "less_last_whorl", "SpH|HSP|sh", kLength, false, false,
     "shell_height axial less last_whorl_height flank"},
    {kSpireHeightDirect, "spire_height", "direct", "SpH|HSP|sh", kLength, false, false,
     "read along the axis, from the apex to the suture above the aperture, at the lip"},
    {kApicalAngleEarly, "apical_angle", "early_whorls", "AA", kAngle, false, false,
     "whole angle between the lines that touch the first two whorls after the embryonic shell"},
    {kPleuralAngleLastTwo, "pleural_angle", "last_two_whorls", "PA", kAngle, false, false,
     "whole angle between the lines that touch the last two whorls"},
    {kSpireAngleSutures, "spire_angle", "sutures", "AES", kAngle, false, false,
     "whole angle between the lines through the last two sutures of each flank"},
    {kSuturalAngleChord, "sutural_angle", "chord_to_side", "", kAngle, false, false,
     "in side view at the upper end of the last suture that crosses the spire, between its chord and the side towards the apex"},
    {kSutureSlopeAcross, "suture_slope", "to_cross_plane", "SI", kAngle, false, false,
     "in side view, between the chord of the last suture that crosses the spire and the plane square to the axis"},
    {kWhorlsPole, "whorls", "pole", "N|NTW", kCount, false, false,
     "turns from the pole of the spiral to the lip, as the scene file counts"},
    {kWhorlsNucleusLine, "whorls", "nucleus_line", "N|NTW", kCount, false, false,
     "turns past a line across the apex at the half-circle of the nucleus, where the model's tube begins"},
    {kWhorlsNucleusLineQuarter, "whorls", "nucleus_line_quarter", "N|NTW", kCount, false, false,
     "the same with the starting line that reads a quarter whorl higher"},
    {kWhorlsSutureStart, "whorls", "suture_start", "N|NTW", kCount, false, false,
     "turns from where the suture begins, which in the model is where the tube begins"},
    {kUmbilicusMargins, "umbilicus", "margin_to_margin", "DOM|U|UW|uw", kLength, true, true,
     "square to the axis, between the inner margins of the whorl section half a turn apart"},
    {kUmbilicusSeams, "umbilicus", "seam_to_seam", "DOM|U|UW|uw", kLength, true, true,
     "square to the axis, between the visible umbilical seams half a turn apart, where a whorl meets the one before"},
    {kDiameterSumOfRadii, "conch_diameter", "sum_of_radii", "dm|D", kLength, true, true,
     "sum of the two radii to the venter, half a turn apart"},
    {kWhorlHeightMargin, "whorl_height", "margin_to_venter", "wh|H|WH", kLength, true, true,
     "radial, from the inner margin of the whorl section to the venter"},
    {kWhorlHeightSeam, "whorl_height", "seam_to_venter", "wh|H|WH", kLength, true, true,
     "radial, from the visible umbilical seam to the venter"},
    {kWhorlHeightBetweenSutures, "whorl_height", "between_sutures", "WH", kLength, true, false,
     "along the axis, between the sutures above and below the whorl in one half-plane"},
    {kWhorlWidthAlongAxis, "whorl_width", "along_axis", "ww|T|W|WW|WB", kLength, true, true,
     "thickness of the whorl: extent of its section along the axis"},
    {kWhorlWidthFlanks, "whorl_width", "flank_to_flank", "WW|W", kLength, true, false,
     "square to the axis, between the outer margins half a turn apart"},
    {kWhorlWidthSection, "whorl_width", "section_breadth", "WW|WB", kLength, true, false,
     "square to the axis, between the inner and outer margins of one whorl section"},
    {kWhorlWidthBetweenSutures, "whorl_width", "between_sutures", "WW", kLength, true, false,
     "straight along the flank, between the sutures above and below the whorl"},
    {kWhorlWidthProportional, "whorl_width", "proportional", "WW", kLength, true, false,
     "however it was taken, but the same way on every whorl: only the ratios are used"},
    {kAperturalHeightVenters, "apertural_height", "venter_to_venter", "ah", kLength, true, true,
     "radial, from the venter of the whorl before to the venter"},
    {kLipInclinationProfile, "lip_inclination", "profile", "", kAngle, false, false,
     "between the plane of the aperture and the axis; positive where the lip leads towards the apex (prosocline)"},
    {kWallThicknessWall, "wall_thickness", "wall", "", kLength, false, false,
     "of the ordinary wall of the last whorl, clear of the thickened lip"},
    {kWallThicknessLip, "wall_thickness", "lip", "", kLength, false, false, "of the rim of the aperture"},
};

bool has_abbreviation(const DefinitionRow& row, std::string_view word) {
  for (std::string_view rest = row.abbreviations; !rest.empty();) {
    const std::size_t end = std::min(rest.find('|'), rest.size());
    if (rest.substr(0, end) == word) return true;
    rest.remove_prefix(std::min(end + 1, rest.size()));
  }
  return false;
}

}  // namespace

std::span<const DefinitionRow> all_definitions() { return kRows; }

const DefinitionRow& row_of(Definition id) { return kRows[static_cast<std::size_t>(id)]; }

std::string written_definition(Definition id) {
  return fmt::format("{} {}", row_of(id).quantity, row_of(id).definition);
}

const DefinitionRow* find_definition(std::string_view quantity, std::string_view definition) {
  const DefinitionRow* found = nullptr;
  for (const DefinitionRow* row : possible_definitions(quantity)) {
    if (row->definition != definition) continue;
    if (found != nullptr) return nullptr;  // an abbreviation of two quantities that share the word
    found = row;
  }
  return found;
}

std::vector<const DefinitionRow*> possible_definitions(std::string_view quantity) {
  std::vector<const DefinitionRow*> rows;
  for (const DefinitionRow& row : kRows)
    if (row.quantity == quantity || has_abbreviation(row, quantity)) rows.push_back(&row);
  return rows;
}

std::vector<std::string_view> quantity_names() {
  std::vector<std::string_view> names;
  for (const DefinitionRow& row : kRows)
    if (std::find(names.begin(), names.end(), row.quantity) == names.end()) names.push_back(row.quantity);
  return names;
}

}  // namespace whorl::specimen
