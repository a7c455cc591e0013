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
constexpr Range kShare{0.0, 1.0};
constexpr Range kOnset{0.0, 40.0, false, true}, kEnd{0.0, 40.0, true, false};  // whorls from the pole
constexpr Range kWhorls{0.0, 40.0};      // whorls
constexpr Range kAround{-180.0, 360.0};  // directions round a section, degrees
constexpr Range kRate{0.1, 1000.0};      // a whorl
constexpr Range kSpread{0.0, 10000.0};   // mm^2 a whorl
constexpr Range kSeed{0.0, 1e6};
constexpr Range kRelief{-100.0, 100.0};  // mm
constexpr Range kStanding{0.001, 1000.0};  // mm

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

    {"preserved", "from", kNumber, kWhorls, "whorls", "", "(the apex)", "the end that lies nearer to the apex"},
    {"preserved", "to", kNumber, kWhorls, "whorls", "", "(the lip)", "the end that lies nearer to the lip"},
    {"preserved", "counted", kWord, kNothing, "", "from the pole|from the lip", "\"from the pole\"", "where the whorls of from and to are counted from"},
    {"preserved", "parts", kWord, kNothing, "", "whole|wall|outside|inside", "\"whole\"", "what is preserved there"},

    {"look", "exterior", kColour, kNothing, "", "", "\"#d8c7a8\"", "colour of the outside"},
    {"look", "interior", kColour, kNothing, "", "", "\"#f1e6da\"", "colour of the inside"},
    {"look", "section", kColour, kNothing, "", "", "\"#b08d82\"", "colour of cut faces"},
    {"look", "gloss", kNumber, {0.0, 1.0}, "", "", "0.35", "0 matt to 1 polished"},
    {"look", "lip", kColour, kNothing, "", "", kNoDefault, "colour of the lip; without it outside and inside blend across the rim"},
    {"look", "lip_breadth", kNumber, kThickness, "mm", "", "(the thickness of the lip)", "how far the lip's colour or blending reaches back from the rim"},
    {"look", "callus", kColour, kNothing, "", "", kNoDefault, "colour of the callus: earlier whorl and columella within the aperture"},
    {"look", "callus_breadth", kNumber, {0.0, 100.0}, "mm", "", "0.0", "how far the callus spreads out of the aperture"},

    {"look", "exterior_finish", kWord, kNothing, "", "plain|polished|glazed|periostracum|nacre", "\"plain\"", "surface of the outside"},
    {"look", "interior_finish", kWord, kNothing, "", "plain|polished|glazed|periostracum|nacre", "\"plain\"", "surface of the inside"},
    {"look", "periostracum", kColour, kNothing, "", "", "\"#a5814a\"", "colour of white shell under its periostracum"},
    {"look", "mould", kColour, kNothing, "", "", "\"#b4a58c\"", "colour of the internal mould"},

    {"nacre", "tablet", kNumber, {50.0, 1500.0}, "nm", "", "440.0", "mean thickness of a tablet"},
    {"nacre", "spread", kNumber, {0.0, 300.0}, "nm", "", "12.0", "standard deviation of the tablets' thickness"},
    {"nacre", "sheet", kNumber, {0.0, 200.0}, "nm", "", "20.0", "thickness of the organic sheet between tablets"},
    {"nacre", "sheet_index", kNumber, {1.3, 1.7}, "", "", "1.5", "refractive index of the sheets"},
    {"nacre", "layers", kWhole, {1.0, 1000.0}, "", "", "60", "tablets that lie on one another"},
    {"nacre", "drift", kNumber, {0.0, 0.25}, "", "", "0.05", "greatest difference of the thickness over the shell, as a share"},

    {"translucence", "mean_free_path", kNumber, {0.0, 100.0}, "mm", "", "0.0", "way of light in the wall between two events; 0 for opaque shell"},
    {"translucence", "anisotropy", kNumber, {-0.9, 0.95}, "", "", "0.6", "mean cosine of scattering"},
    {"translucence", "colour", kColour, kNothing, "", "", "\"#fbf3e6\"", "colour of a deep wall without its skin"},

    {"band", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the band's middle"},
    {"band", "width", kNumber, {0.5, 360.0}, "degrees", "", kRequired, "width round the section"},
    {"band", "colour", kColour, kNothing, "", "", kRequired, "colour at full strength"},
    {"band", "opacity", kNumber, kShare, "", "", "1.0", "share of what lies below that it hides"},
    {"band", "fade", kNumber, kShare, "", "", "0.2", "share of the half-width over which the edge fades"},
    {"band", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins, counted from the pole"},
    {"band", "end", kNumber, kEnd, "whorls", "", "40.0", "where it ends, the lip at the latest"},
    {"flame", "per_whorl", kNumber, {0.5, 500.0}, "", "", kRequired, "number in a whorl"},
    {"flame", "breadth", kNumber, {0.01, 1.0}, "", "", "0.45", "greatest breadth / spacing"},
    {"flame", "at", kNumber, kAround, "degrees", "", "0.0", "direction of the middle"},
    {"flame", "width", kNumber, {1.0, 360.0}, "degrees", "", "360.0", "reach round the section"},
    {"flame", "taper", kNumber, kShare, "", "", "0.0", "0 even, 1 to a point away from the apex"},
    {"flame", "sway", kNumber, {0.0, 5.0}, "", "", "0.0", "height of the zigzag / spacing"},
    {"flame", "bends", kNumber, {0.5, 50.0}, "", "", "4.0", "bends of the zigzag over the reach"},
    {"flame", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and breadth"},
    {"flame", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"flame", "colour", kColour, kNothing, "", "", kRequired, "colour at full strength"},
    {"flame", "opacity", kNumber, kShare, "", "", "1.0", "share of what lies below that it hides"},
    {"flame", "fade", kNumber, kShare, "", "", "0.25", "share of the half-breadth over which the edge fades"},
    {"flame", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins, counted from the pole"},
    {"flame", "end", kNumber, kEnd, "whorls", "", "40.0", "where it ends, the lip at the latest"},
    {"spot", "per_whorl", kNumber, {0.5, 500.0}, "", "", kRequired, "number in a whorl"},
    {"spot", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the row"},
    {"spot", "width", kNumber, {0.5, 180.0}, "degrees", "", "12.0", "height of a spot round the section"},
    {"spot", "length", kNumber, {0.01, 2.0}, "", "", "0.5", "length of a spot along growth / spacing"},
    {"spot", "stagger", kNumber, kShare, "", "", "0.0", "shift of the row / spacing"},
    {"spot", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and size"},
    {"spot", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"spot", "colour", kColour, kNothing, "", "", kRequired, "colour at full strength"},
    {"spot", "opacity", kNumber, kShare, "", "", "1.0", "share of what lies below that it hides"},
    {"spot", "fade", kNumber, kShare, "", "", "0.3", "share of the radius over which the edge fades"},
    {"spot", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins, counted from the pole"},
    {"spot", "end", kNumber, kEnd, "whorls", "", "40.0", "where it ends, the lip at the latest"},
    {"pattern", "activator_decay", kNumber, kRate, "a whorl", "", kRequired, "rate r_a at which activator is removed"},
    {"pattern", "inhibitor_decay", kNumber, kRate, "a whorl", "", kRequired, "rate r_b at which inhibitor is removed"},
    {"pattern", "source", kNumber, kRate, "a whorl", "", "(activator_decay)", "source density s"},
    {"pattern", "activator_base", kNumber, {0.0, 100.0}, "", "", "0.0", "basic production b_a of activator"},
    {"pattern", "inhibitor_base", kNumber, {0.0, 10000.0}, "a whorl", "", "0.0", "basic production b_b of inhibitor"},
    {"pattern", "activator_spread", kNumber, kSpread, "mm^2 a whorl", "", kRequired, "diffusion D_a of activator along the edge"},
    {"pattern", "inhibitor_spread", kNumber, kSpread, "mm^2 a whorl", "", "0.0", "diffusion D_b of inhibitor along the edge"},
    {"pattern", "variation", kNumber, {0.0, 0.9}, "", "", "0.05", "random difference of the source density along the edge"},
    {"pattern", "threshold", kNumber, {0.01, 100.0}, "", "", "1.2", "pigment where activator / its steady level is above this"},
    {"pattern", "seed", kWhole, kSeed, "", "", "1", "of the variation"},
    {"pattern", "colour", kColour, kNothing, "", "", kRequired, "colour at full strength"},
    {"pattern", "opacity", kNumber, kShare, "", "", "1.0", "share of what lies below that it hides"},
    {"pattern", "fade", kNumber, kShare, "", "", "0.2", "share of the threshold over which the edge fades"},
    {"pattern", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins, counted from the pole"},
    {"pattern", "end", kNumber, kEnd, "whorls", "", "40.0", "where it ends, the lip at the latest"},

    {"cord", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the cord's crest"},
    {"cord", "width", kNumber, {0.5, 180.0}, "degrees", "", kRequired, "width of its foot round the section"},
    {"cord", "height", kNumber, kRelief, "mm", "", kRequired, "height at the lip; a negative one cuts a groove"},
    {"cord", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins to rise, the embryonic shell's end at the earliest"},
    {"cord", "end", kNumber, kEnd, "whorls", "", "40.0", "where it has ended, counted from the pole"},
    {"cord", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},
    {"rib", "per_whorl", kNumber, {0.1, 1000.0}, "", "", kRequired, "number in a whorl"},
    {"rib", "height", kNumber, kRelief, "mm", "", kRequired, "height at the lip; a negative one cuts"},
    {"rib", "breadth", kNumber, {0.02, 1.0}, "", "", "0.6", "breadth of the foot / spacing"},
    {"rib", "at", kNumber, kAround, "degrees", "", "0.0", "direction of the middle"},
    {"rib", "width", kNumber, {1.0, 360.0}, "degrees", "", "360.0", "reach round the section; 360 runs all the way round"},
    {"rib", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.0", "one crest lies this far behind the lip"},
    {"rib", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and height"},
    {"rib", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"rib", "onset", kNumber, kOnset, "whorls", "", "0.0", "where ribs begin to rise, the embryonic shell's end at the earliest"},
    {"rib", "end", kNumber, kEnd, "whorls", "", "40.0", "where they have ended, counted from the pole"},
    {"rib", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},
    {"nodule", "per_whorl", kNumber, {0.1, 1000.0}, "", "", kRequired, "number in a whorl"},
    {"nodule", "height", kNumber, kRelief, "mm", "", kRequired, "height at the lip; a negative one is a pit"},
    {"nodule", "length", kNumber, {0.02, 1.0}, "", "", "0.6", "length of the foot along growth / spacing"},
    {"nodule", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the row"},
    {"nodule", "width", kNumber, {0.5, 180.0}, "degrees", "", "24.0", "width of the foot round the section"},
    {"nodule", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.0", "one crest lies this far behind the lip"},
    {"nodule", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and height"},
    {"nodule", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"nodule", "onset", kNumber, kOnset, "whorls", "", "0.0", "where nodules begin to rise, the embryonic shell's end at the earliest"},
    {"nodule", "end", kNumber, kEnd, "whorls", "", "40.0", "where they have ended, counted from the pole"},
    {"nodule", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},

    {"stripe", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the stripe's middle"},
    {"stripe", "width", kNumber, {0.5, 180.0}, "degrees", "", kRequired, "width round the section"},
    {"stripe", "height", kNumber, kStanding, "mm", "", kRequired, "height of its crest over the surface at the lip"},
    {"stripe", "colour", kColour, kNothing, "", "", kRequired, "its colour"},
    {"stripe", "onset", kNumber, kOnset, "whorls", "", "0.0", "where it begins, the embryonic shell's end at the earliest"},
    {"stripe", "end", kNumber, kEnd, "whorls", "", "40.0", "where it ends, the lip at the latest"},
    {"stripe", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},

    {"lamella", "per_whorl", kNumber, {0.1, 1000.0}, "", "", kRequired, "number in a whorl"},
    {"lamella", "height", kNumber, kStanding, "mm", "", kRequired, "height over the surface at the lip"},
    {"lamella", "thickness", kNumber, kThickness, "mm", "", kRequired, "thickness at the foot at the lip; the edge has two fifths of it"},
    {"lamella", "at", kNumber, kAround, "degrees", "", "0.0", "direction of the middle"},
    {"lamella", "width", kNumber, {1.0, 360.0}, "degrees", "", "360.0", "reach round the section; 360 runs all the way round"},
    {"lamella", "lean", kNumber, {-60.0, 60.0}, "degrees", "", "0.0", "lean out of the growth front; + towards the lip"},
    {"lamella", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.0", "one stands this far behind the lip"},
    {"lamella", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and height"},
    {"lamella", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"lamella", "onset", kNumber, kOnset, "whorls", "", "0.0", "none stands before, nor on the embryonic shell"},
    {"lamella", "end", kNumber, kEnd, "whorls", "", "40.0", "none stands after"},
    {"lamella", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},
    {"lamella", "colour", kColour, kNothing, "", "", kNoDefault, "its colour; without it that of the outside"},

    {"spine", "per_whorl", kNumber, {0.1, 1000.0}, "", "", kRequired, "number in a whorl"},
    {"spine", "length", kNumber, kStanding, "mm", "", kRequired, "length along its axis at the lip"},
    {"spine", "breadth", kNumber, kStanding, "mm", "", kRequired, "diameter of the foot at the lip"},
    {"spine", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the row"},
    {"spine", "tip", kNumber, kShare, "", "", "0.08", "diameter of the tip / diameter of the foot"},
    {"spine", "bend", kNumber, {-120.0, 120.0}, "degrees", "", "0.0", "angle between foot and tip; + bends away from the lip"},
    {"spine", "lean", kNumber, {-60.0, 60.0}, "degrees", "", "0.0", "lean of the foot off the surface's normal; + towards the lip"},
    {"spine", "hollow", kNumber, {0.0, 0.9}, "", "", "0.0", "diameter of the bore / diameter of the spine; 0 is solid"},
    {"spine", "open", kNumber, {0.0, 160.0}, "degrees", "", "0.0", "angle over which a hollow spine is open along its front"},
    {"spine", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.0", "one stands this far behind the lip"},
    {"spine", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and size"},
    {"spine", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"spine", "onset", kNumber, kOnset, "whorls", "", "0.0", "none stands before, nor on the embryonic shell"},
    {"spine", "end", kNumber, kEnd, "whorls", "", "40.0", "none stands after"},
    {"spine", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},
    {"spine", "colour", kColour, kNothing, "", "", kNoDefault, "its colour; without it that of the outside"},

    {"attached", "shape", kWord, kNothing, "", "bead|cone|tube", kRequired, "a rounded knob, a pointed cone, an open tube"},
    {"attached", "per_whorl", kNumber, {0.1, 20000.0}, "", "", kRequired, "number in a whorl and row"},
    {"attached", "height", kNumber, kStanding, "mm", "", kRequired, "height over the surface at the lip"},
    {"attached", "breadth", kNumber, kStanding, "mm", "", kRequired, "diameter of the foot at the lip"},
    {"attached", "colour", kColour, kNothing, "", "", kRequired, "its colour"},
    {"attached", "at", kNumber, kAround, "degrees", "", kRequired, "direction of the middle row"},
    {"attached", "rows", kWhole, {1.0, 1000.0}, "", "", "1", "number of rows"},
    {"attached", "width", kNumber, {0.0, 360.0}, "degrees", "", "0.0", "breadth round the section over which rows are spread"},
    {"attached", "stagger", kNumber, kShare, "", "", "0.0", "shift of every other row / spacing"},
    {"attached", "lean", kNumber, {-60.0, 60.0}, "degrees", "", "0.0", "lean off the surface's normal; + towards the lip"},
    {"attached", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.0", "one stands this far behind the lip"},
    {"attached", "irregularity", kNumber, kShare, "", "", "0.0", "0 regular to 1, in place and size"},
    {"attached", "seed", kWhole, kSeed, "", "", "1", "of the irregularity"},
    {"attached", "onset", kNumber, kOnset, "whorls", "", "0.0", "none stands before, nor on the embryonic shell"},
    {"attached", "end", kNumber, kEnd, "whorls", "", "40.0", "none stands after"},
    {"attached", "growth", kNumber, {0.0, 2.0}, "", "", "1.0", "power of the whorl's size that its size goes with: 1 in proportion, 0 alike on every whorl"},

    {"encruster", "scene", kText, kLine, "", "", kRequired, "scene file of the other shell, relative to the folder of this one"},
    {"encruster", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", kRequired, "place along growth, counted back from the lip"},
    {"encruster", "at", kNumber, kAround, "degrees", "", kRequired, "place round the section"},
    {"encruster", "pose", kWord, kNothing, "", "upright|lying", "\"upright\"", "its axis off the surface, apex outwards, or along the surface"},
    {"encruster", "turn", kNumber, kAnyTurn, "degrees", "", "0.0", "turn about the surface's normal"},
    {"encruster", "sunk", kNumber, {0.0, 100.0}, "mm", "", "0.0", "how far it is let into the wall"},

    {"light", "azimuth", kNumber, kAnyTurn, "degrees", "", "135.0", "direction on the page, anticlockwise from the right"},
    {"light", "elevation", kNumber, {0.0, 90.0}, "degrees", "", "45.0", "angle out of the page, towards the reader"},
    {"light", "softness", kNumber, {0.0, 60.0}, "degrees", "", "12.0", "angular radius of the key light"},
    {"light", "fill", kNumber, {0.0, 2.0}, "", "", "0.35", "fill light / key light"},
    {"light", "stops", kNumber, {-20.0, 0.0}, "stops", "", "0.0", "exposure of key and fill against the lamps: each stop less halves them"},

    {"lamp", "behind_lip", kNumber, {0.0, 40.0}, "whorls", "", "0.12", "place on the centre line of the lumen, counted back from the lip"},
    {"lamp", "offset", kNumber, {0.0, 1000.0}, "mm", "", "0.0", "distance from the centre line"},
    {"lamp", "at", kNumber, kAround, "degrees", "", "0.0", "direction of that distance round the section"},
    {"lamp", "shape", kWord, kNothing, "", "ball|ring", "\"ball\"", "one glowing ball, or a ring of balls round that place"},
    {"lamp", "ring", kNumber, {0.001, 1000.0}, "mm", "", "(twice the radius)", "radius of the ring, which lies across the lumen"},
    {"lamp", "bulbs", kWhole, {3.0, 48.0}, "", "", "12", "balls on the ring"},
    {"lamp", "radius", kNumber, {0.001, 100.0}, "mm", "", kRequired, "radius of the glowing ball, or of each on the ring"},
    {"lamp", "strength", kNumber, {0.0, 10000.0}, "", "", "40.0", "radiance as a multiple of a matt white card facing the key light"},
    {"lamp", "temperature", kNumber, {1000.0, 20000.0}, "kelvin", "", "3200.0", "colour temperature"},

    {"radiograph", "energy", kNumber, {10.0, 150.0}, "keV", "", "20.0", "photon energy"},

    {"stereo", "angle", kNumber, {0.5, 20.0}, "degrees", "", "6.0", "between the two eyes' views"},
    {"stereo", "spacing", kNumber, {20.0, 65.0}, "mm", "", "60.0", "of matching points on paper"},

    {"contact_sheet", "W", kNumbers, kExpansion, "", "", kNoDefault, "whorl expansions, from left to right"},
    {"contact_sheet", "T", kNumbers, {0.0, 50.0}, "", "", kNoDefault, "translations, from top to bottom"},

    {"plate", "width", kNumber, {20.0, 1000.0}, "mm", "", "180.0", "width on paper"},
    {"plate", "resolution", kNumber, {72.0, 2400.0}, "pixels per inch", "", "600.0", "pixels per inch of paper"},
    {"plate", "background", kWord, kNothing, "", "white|black|clear", "\"white\"", "ground of the plate"},
    {"plate", "columns", kWhole, {1.0, 12.0}, "", "", "3", "panels side by side"},
    {"plate", "gap", kNumber, {0.0, 50.0}, "mm", "", "4.0", "space between panels"},
    {"plate", "letters", kWord, kNothing, "", "none|A|a|(a)", "\"A\"", "how panels are lettered"},
    {"plate", "bar", kBar, {0.001, 1000.0}, "mm", "", "\"auto\"", "length of the scale bar"},
    {"plate", "quality", kWord, kNothing, "", "draft|proof|print", "\"print\"", "how much noise may stay"},
    {"plate", "unobserved", kWord, kNothing, "", "plain|tint|hatch", "\"plain\"", "how parts are drawn that [[preserved]] leaves unobserved"},
    {"plate", "hatch_spacing", kNumber, {0.4, 10.0}, "mm", "", "1.2", "between hatching lines on paper"},

    {"panel", "view", kView, kNothing, "", "apertural|abapertural|right lateral|left lateral|apical|umbilical|axial section", kRequired, "from where the specimen is seen"},
    {"panel", "scale", kNumber, {0.1, 20.0}, "", "", "1.0", "enlargement over the common scale of the plate"},
    {"panel", "look", kWord, kNothing, "", "natural|whitened|radiograph", "\"natural\"", "as the specimen is, coated for relief, or seen through"},
    {"panel", "picture", kWord, kNothing, "", "single|stereo pair", "\"single\"", "one picture, or two for the two eyes"},
    {"panel", "shows", kWord, kNothing, "", "shell|mould|both", "\"shell\"", "the shell, its internal mould, or the mould within the shell cut open"},
    {"panel.view", "azimuth", kNumber, kAnyTurn, "degrees", "", kRequired, "degrees the eye walks to its right round the upright shell, from the apertural view"},
    {"panel.view", "elevation", kNumber, {-90.0, 90.0}, "degrees", "", kRequired, "degrees the eye rises towards the apex"},
};

}  // namespace

std::span<const KeyRow> key_table() { return kRows; }

}  // namespace whorl::specimen
