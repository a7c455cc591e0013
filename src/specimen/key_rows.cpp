// SPDX-License-Identifier: Apache-2.0
// The rows of the table of keys. Ranges that no shell exceeds, or that keep a slip of the pen from passing.
#include "specimen/key_table.h"

namespace whorl::specimen {
namespace {

using enum KeyType;

constexpr Range kExpansion{1.0, 1e6, true, false};
constexpr Range kShellSize{0.1, 5000.0};  // mm; the largest ammonites known stay under 3 m
constexpr Range kThickness{0.001, 100.0};
constexpr Range kAnyTurn{-360.0, 360.0};
constexpr Range kLine{1.0, 200.0};  // characters
constexpr Range kNothing{};

constexpr KeyRow kRows[] = {
    {"", "format", kWhole, {1.0, 1.0}, "", "", kRequired, "version of this format"},

    {"specimen", "name", kText, kLine, "", "", kRequired, "name of the specimen, for caption and metadata"},
    {"specimen", "coiling", kWord, kNothing, "", "dextral|sinistral", kRequired, "the way it coils, never guessed"},
    {"specimen", "catalogue", kText, kLine, "", "", kNoDefault, "catalogue number"},
    {"specimen", "author", kText, kLine, "", "", kNoDefault, "author of the name or of the plate"},
    {"specimen", "locality", kText, kLine, "", "", kNoDefault, "where it was found"},
    {"specimen", "note", kText, {1.0, 2000.0}, "", "", kNoDefault, "anything else"},
    {"specimen", "licence", kText, kLine, "", "", kNoDefault, "terms under which the figure may be used"},
    {"specimen", "mineral", kWord, kNothing, "", "aragonite|calcite", "\"aragonite\"", "mineral of the wall"},

    {"growth", "whorls", kNumber, {0.5, 40.0}, "whorls", "", kRequired, "turns from the pole to the lip"},
    {"growth", "W", kStages, kExpansion, "", "", kRequired, "whorl expansion per turn"},
    {"growth", "D", kNumber, {-0.5, 1.0, false, true}, "", "", kRequired, "distance of the inner margin from the axis / that of the outer"},
    {"growth", "T", kNumber, {0.0, 50.0}, "", "", kRequired, "descent along the axis / distance from the axis"},
    {"growth", "start", kNumber, {0.0, 39.75}, "whorls", "", "(0.75, at most whorls - 0.25)", "whorls before this are the embryonic shell, a rounded cap"},
    {"growth", "W_distance", kStages, kExpansion, "", "", kNoDefault, "expansion of the distance from the axis, in place of W"},
    {"growth", "W_depth", kStages, kExpansion, "", "", kNoDefault, "expansion of the depth below the pole, in place of W"},
    {"growth", "W_section", kStages, kExpansion, "", "", kNoDefault, "expansion of the whorl section, in place of W"},

    {"section", "S", kNumber, {0.2, 5.0}, "", "", "1.0", "height of the section along the axis / its breadth"},
    {"section", "roll", kNumber, {-90.0, 90.0}, "degrees", "", "0.0", "turn of the section; + leans the upper end away from the axis"},
    {"section.lobe", "at", kNumber, {-180.0, 360.0}, "degrees", "", kRequired, "direction of the keel, shoulder or groove"},
    {"section.lobe", "reach", kNumber, {-0.8, 3.0}, "", "", kRequired, "extra radius as a fraction of the local one; negative for a groove"},
    {"section.lobe", "width", kNumber, {1.0, 180.0}, "degrees", "", "30.0", "width at half reach"},

    {"size", "shell_height", kNumber, kShellSize, "mm", "", kNoDefault, "height of the shell along the axis"},
    {"size", "shell_width", kNumber, kShellSize, "mm", "", kNoDefault, "greatest width across the axis"},
    {"size", "aperture_height", kNumber, kShellSize, "mm", "", kNoDefault, "height of the aperture"},
    {"size", "aperture_width", kNumber, kShellSize, "mm", "", kNoDefault, "width of the aperture"},

    {"wall", "thickness", kNumber, kThickness, "mm", "", kRequired, "thickness of the wall at the lip"},
    {"wall", "growth", kWord, kNothing, "", "proportional|constant", "\"proportional\"", "whether the wall thickens with the section"},
    {"wall", "columella", kNumber, {0.0, 0.9}, "", "", "0.0", "radius of the pillar / half-breadth of the aperture; 0 leaves the axis to D"},

    {"lip", "inclination", kNumber, {-60.0, 60.0}, "degrees", "", "0.0", "angle between aperture plane and axis; + prosocline"},
    {"lip", "thickness", kNumber, kThickness, "mm", "", "(the thickness of the wall)", "thickness of the rounded rim"},

    {"look", "exterior", kColour, kNothing, "", "", "\"#d8c7a8\"", "colour of the outside"},
    {"look", "interior", kColour, kNothing, "", "", "\"#f1e6da\"", "colour of the inside"},
    {"look", "section", kColour, kNothing, "", "", "\"#b08d82\"", "colour of cut faces"},
    {"look", "gloss", kNumber, {0.0, 1.0}, "", "", "0.35", "0 matt to 1 polished"},

    {"light", "azimuth", kNumber, kAnyTurn, "degrees", "", "135.0", "direction on the page, anticlockwise from the right"},
    {"light", "elevation", kNumber, {0.0, 90.0}, "degrees", "", "45.0", "angle out of the page, towards the reader"},
    {"light", "softness", kNumber, {0.0, 60.0}, "degrees", "", "12.0", "angular radius of the key light"},
    {"light", "fill", kNumber, {0.0, 2.0}, "", "", "0.35", "fill light / key light"},

    {"lamp", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.12", "place on the centre line of the lumen, counted back from the lip"},
    {"lamp", "radius", kNumber, {0.001, 100.0}, "mm", "", kRequired, "radius of the glowing ball"},
    {"lamp", "strength", kNumber, {0.0, 10000.0}, "", "", "40.0", "radiance as a multiple of a matt white card facing the key light"},
    {"lamp", "temperature", kNumber, {1000.0, 20000.0}, "kelvin", "", "3200.0", "colour temperature"},

    {"plate", "width", kNumber, {20.0, 1000.0}, "mm", "", "180.0", "width on paper"},
    {"plate", "resolution", kNumber, {72.0, 2400.0}, "pixels per inch", "", "600.0", "pixels per inch of paper"},
    {"plate", "background", kWord, kNothing, "", "white|black|clear", "\"white\"", "ground of the plate"},
    {"plate", "columns", kWhole, {1.0, 12.0}, "", "", "3", "panels side by side"},
    {"plate", "gap", kNumber, {0.0, 50.0}, "mm", "", "4.0", "space between panels"},
    {"plate", "letters", kWord, kNothing, "", "none|A|a|(a)", "\"A\"", "how panels are lettered"},
    {"plate", "bar", kBar, {0.001, 1000.0}, "mm", "", "\"auto\"", "length of the scale bar"},
    {"plate", "quality", kWord, kNothing, "", "draft|proof|print", "\"print\"", "how much noise may stay"},

    {"panel", "view", kView, kNothing, "", "apertural|abapertural|right lateral|left lateral|apical|umbilical|axial section", kRequired, "from where the specimen is seen"},
    {"panel", "scale", kNumber, {0.1, 20.0}, "", "", "1.0", "enlargement over the common scale of the plate"},
    {"panel.view", "azimuth", kNumber, kAnyTurn, "degrees", "", kRequired, "degrees the eye walks to its right round the upright shell, from the apertural view"},
    {"panel.view", "elevation", kNumber, {-90.0, 90.0}, "degrees", "", kRequired, "degrees the eye rises towards the apex"},
};

}  // namespace

std::span<const KeyRow> key_table() { return kRows; }

}  // namespace whorl::specimen
