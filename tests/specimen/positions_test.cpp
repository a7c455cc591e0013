// SPDX-License-Identifier: Apache-2.0
// Values and faults know their line and column.
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

using namespace whorl::specimen;
using whorl::diagnostics::Position;
using whorl::support::complaint_about;
using whorl::support::problems_of;

namespace {

const char* const kScene =
    "format = 1\n"                              // 1
    "[specimen]\n"                              // 2
    "name = \"Käferchen\"   # two bytes\n"      // 3
    "coiling = \"sinistral\"\n"                 // 4
    "\n"                                        // 5
    "[growth]\n"                                // 6
    "whorls = 6\n"                              // 7
    "  W = [ [1, 1.6],\n"                       // 8
    "        [4, 1.4] ]\n"                      // 9
    "D=0.1\n"                                   // 10
    "T\t=\t2.0\n"                               // 11
    "[size]\n"                                  // 12
    "aperture_width = 8.5\n"                    // 13
    "[wall]\n"                                  // 14
    "thickness = 0.3\r\n"                       // 15
    "[[lamp]]\n"                                // 16
    "radius = 0.2\n"                            // 17
    "[[lamp]]\n"                                // 18
    "  radius = 0.25\n"                         // 19
    "[[panel]]\n"                               // 20
    "view = { azimuth = 1, elevation = 2 }\n";  // 21

bool at(const Position& where, std::uint32_t line, std::uint32_t column) {
  return where.line == line && where.column == column;
}

}  // namespace

TEST_CASE("Every value knows the line and column where it stands, columns counted in characters", "[specimen]") {
  const Specimen s = parse_scene(kScene, "scene");
  CHECK(at(s.identity.name.where, 3, 8));
  CHECK(s.identity.name.given);
  CHECK(at(s.identity.coiling.where, 4, 11));
  CHECK(at(s.growth.whorls.where, 7, 10));
  CHECK(at(s.growth.W.where, 8, 7));
  CHECK(at(s.growth.D.where, 10, 3));
  CHECK(at(s.growth.T.where, 11, 5));
  CHECK(at(s.size.kind.where, 13, 18));
  CHECK(at(s.size.mm.where, 13, 18));
  CHECK(at(s.wall.thickness_mm.where, 15, 13));
  CHECK(at(s.lamps.at(0).radius_mm.where, 17, 10));
  CHECK(at(s.lamps.at(1).radius_mm.where, 19, 12));
  CHECK(at(s.plate.panels.at(0).view.where, 21, 8));
}

TEST_CASE("A fault is placed at the value, the unknown key, the table that lacks a key, or line 1", "[specimen]") {
  const auto problems = problems_of(
      "[specimen]\n"
      "name = \"é\\t\"\n"
      "colour = \"é\"; \n");
  REQUIRE(problems.size() == 1);
  CHECK(at(problems[0].where, 3, 13));  // no TOML: the semicolon behind é

  CHECK(
      complaint_about("format = 1\n"
                      "[specimen]\n"
                      "name = \"x\"\n"
                      "[growth]\n"
                      "whorls = 50\n"
                      "W = [[1, 2],\n"
                      "     [2, 0]]\n"
                      "D = 0\n"
                      "T = 0\n"
                      "  tilt = 3\n"
                      "[size]\n") ==
      "1:1: [wall] thickness is missing: state a number from 0.001 to 100 mm\n"
      "2:1: [specimen] coiling is missing: state one of the words \"dextral\", \"sinistral\"\n"
      "5:10: [growth] whorls = 50: must be from 0.5 to 40 whorls\n"
      "7:6: [growth] W: stage 2 has the expansion 0; must be more than 1, up to 1000000\n"
      "10:3: unknown key \"tilt\" in [growth]; the nearest known one here is \"start\" (known: whorls, W, D, T, start, "
      "W_distance, W_depth, W_section)\n"
      "11:1: [size] is missing its measurement: state exactly one of shell_height, shell_width, aperture_height, "
      "aperture_width, a number from 0.1 to 5000 mm\n");
}

TEST_CASE("What is printed of a fault is file, line, column and message", "[specimen]") {
  try {
    parse_scene(whorl::support::SceneText().set("wall", "thickness", "-0.3").text(), "shells/tall.toml");
    FAIL("accepted");
  } catch (const whorl::diagnostics::InvalidInput& error) {
    const std::string text = error.what();
    CHECK(text.rfind("shells/tall.toml:", 0) == 0);
    CHECK(text.find(":13: [wall] thickness = -0.3: must be from 0.001 to 100 mm") != std::string::npos);
    CHECK(error.source() == "shells/tall.toml");
  }
}
