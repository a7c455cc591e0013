// SPDX-License-Identifier: Apache-2.0
// The rows of a measurement file's table of keys.
#include "specimen/key_table.h"

namespace whorl::specimen {
namespace {

using enum KeyType;

constexpr Range kLine{1.0, 200.0};
constexpr Range kNothing{};
constexpr Range kValue{-360.0, 200000.0};  // any unit; each dimension has its own narrower range
constexpr Range kPositive{0.0, 10000.0, true, false};
constexpr Range kStage{0.0, 40.0};

constexpr KeyRow kRows[] = {
    {"", "format", kWhole, {1.0, 1.0}, "", "", kRequired, "version of this format"},
    {"", "unit", kWord, kNothing, "", "mm|cm|um|in", "\"mm\"", "unit of all lengths of the file"},
    {"", "step", kNumber, kPositive, "", "", kNoDefault, "instrument step of the lengths that state neither step nor error, in the unit of the file"},
    {"", "tolerance", kNumber, {0.0, 50.0}, "%", "", "2.0", "misfit of a value that still counts as fitting"},

    {"specimen", "name", kText, kLine, "", "", kRequired, "name of the specimen"},
    {"specimen", "coiling", kWord, kNothing, "", "dextral|sinistral", kRequired, "the way it coils, never guessed"},
    {"specimen", "catalogue", kText, kLine, "", "", kNoDefault, "catalogue number"},
    {"specimen", "author", kText, kLine, "", "", kNoDefault, "who measured, or the author of the name"},
    {"specimen", "locality", kText, kLine, "", "", kNoDefault, "where it was found"},
    {"specimen", "note", kText, {1.0, 2000.0}, "", "", kNoDefault, "anything else, such as the source of the figures"},
    {"specimen", "licence", kText, kLine, "", "", kNoDefault, "terms under which the figures may be used"},
    {"specimen", "mineral", kWord, kNothing, "", "aragonite|calcite", "\"aragonite\"", "mineral of the wall"},
    {"specimen", "measured", kWord, kNothing, "", "shell|internal mould", "\"shell\"", "what the readings were taken on"},

    {"wall", "thickness", kNumber, kPositive, "", "", kNoDefault, "of the shell round an internal mould, at its lip, in the unit of the file"},

    {"preserved", "from", kNumber, kStage, "whorls", "", "(the apex)", "the end that lies nearer to the apex"},
    {"preserved", "to", kNumber, kStage, "whorls", "", "(the lip)", "the end that lies nearer to the lip"},
    {"preserved", "counted", kWord, kNothing, "", "from the pole|from the lip", "\"from the pole\"", "where the whorls of from and to are counted from"},
    {"preserved", "parts", kWord, kNothing, "", "whole|wall|outside|inside", "\"whole\"", "what is preserved there"},

    {"held", "whorls", kNumber, {0.5, 40.0}, "whorls", "", kNoDefault, "turns from the pole to the lip"},
    {"held", "W", kNumber, {1.0, 1e6, true, false}, "", "", kNoDefault, "whorl expansion per turn"},
    {"held", "D", kNumber, {-0.5, 1.0, false, true}, "", "", kNoDefault, "distance of the inner margin from the axis / that of the outer"},
    {"held", "T", kNumber, {0.0, 50.0}, "", "", kNoDefault, "descent along the axis / distance from the axis; 0 for a planispiral shell"},
    {"held", "S", kNumber, {0.2, 5.0}, "", "", kNoDefault, "height of the section along the axis / its breadth"},
    {"held", "start", kNumber, {0.0, 39.75}, "whorls", "", kNoDefault, "whorls before this are the embryonic shell"},
    {"held", "roll", kNumber, {-90.0, 90.0}, "degrees", "", kNoDefault, "turn of the section; + leans the upper end away from the axis"},
    {"held", "columella", kNumber, {0.0, 0.9}, "", "", kNoDefault, "radius of the pillar / half-breadth of the aperture"},

    {"measurement", "quantity", kText, kLine, "", "", kRequired, "what was measured"},
    {"measurement", "definition", kText, kLine, "", "", kRequired, "how: the identifier of its definition"},
    {"measurement", "value", kReading, kValue, "", "", kRequired, "the value as read, in the unit of the file, degrees or whorls"},
    {"measurement", "unit", kText, kLine, "", "", kNoDefault, "unit of the value, if it shall be said again; must be the file's"},
    {"measurement", "step", kNumber, kPositive, "", "", kNoDefault, "instrument step, in the unit of the value"},
    {"measurement", "error", kNumber, kPositive, "", "", kNoDefault, "standard error in place of a step"},
    {"measurement", "behind_lip", kNumber, kStage, "whorls", "", kNoDefault, "stage of growth: whorls back from the lip"},
    {"measurement", "at_whorl", kNumber, kStage, "whorls", "", kNoDefault, "stage of growth: whorls from the pole"},
    {"measurement", "at_diameter", kNumber, kPositive, "", "", kNoDefault, "stage of growth: the diameter of the shell then, in the unit of the file"},

    {"series", "quantity", kText, kLine, "", "", kRequired, "what was measured on successive whorls"},
    {"series", "definition", kText, kLine, "", "", kRequired, "how: the identifier of its definition"},
    {"series", "values", kNumbers, kPositive, "", "", kRequired, "the values as read, in the unit of the file"},
    {"series", "interval", kWord, kNothing, "", "full turns|half turns", kRequired, "growth between two values"},
    {"series", "order", kWord, kNothing, "", "from the apex|from the lip", kRequired, "which end the first value lies at"},
    {"series", "unit", kText, kLine, "", "", kNoDefault, "unit of the values, if it shall be said again; must be the file's"},
    {"series", "step", kNumber, kPositive, "", "", kNoDefault, "instrument step, in the unit of the values"},
    {"series", "error", kNumber, kPositive, "", "", kNoDefault, "standard error in place of a step"},
    {"series", "scatter", kNumber, {0.0, 50.0}, "%", "", "(estimated from the series)", "natural irregularity from whorl to whorl"},
    {"series", "behind_lip", kNumber, kStage, "whorls", "", "0.0", "whorls between the lip and the value nearest to it"},

    {"outline", "kind", kWord, kNothing, "", "silhouette|section|suture", kRequired, "what was traced: the shell's silhouette or sutures in a side view, or one whorl section"},
    {"outline", "view", kWord, kNothing, "", "apertural|abapertural|right lateral|left lateral", "\"apertural\"", "from where, the axis upright; of a silhouette or sutures"},
    {"outline", "file", kText, kLine, "", "", kRequired, "table of the points, beside the measurement file: columns x, y and, if wanted, missing"},
    {"outline", "scale", kNumber, kPositive, "", "", "1.0", "length of one unit of the points, in the unit of the file: mm a pixel"},
    {"outline", "y_axis", kWord, kNothing, "", "up|down", "\"up\"", "whether y grows towards the apex, or away from it as in pictures"},
    {"outline", "error", kNumber, kPositive, "", "", kRequired, "standard error of a point, in the unit of the file"},
    {"outline", "behind_lip", kNumber, kStage, "whorls", "", "0.0", "stage of growth of a section: whorls back from the lip"},
};

}  // namespace

std::span<const KeyRow> measurement_key_table() { return kRows; }

}  // namespace whorl::specimen
