// SPDX-License-Identifier: Apache-2.0
// Faults that only the geometry shows.
#include "compile/compile.h"

#include "diagnostics/error.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/shell_specimen.h"

#include <filesystem>
#include <fstream>

using namespace whorl;

namespace {

// What compiling says, "" where it succeeds.
std::string complaint(const specimen::Specimen& specimen) {
  try {
    compile::compile_scene(specimen);
  } catch (const diagnostics::InvalidInput& error) {
    CHECK(error.code() == diagnostics::ExitCode::kInvalidInput);
    CHECK_FALSE(error.problems().empty());
    return error.what();
  }
  return "";
}
std::string complaint(const test::ShellPlan& plan) { return complaint(test::specimen_of(plan)); }

// Few whorls, and the size whose solving is quick.
test::ShellPlan short_plan() {
  test::ShellPlan plan = test::globose_plan();
  plan.whorls = 2.5;
  plan.size_kind = specimen::SizeKind::kApertureHeight;
  plan.size_mm = 10.0;
  plan.lip_mm = 0.0;
  plan.inclination_deg = 0.0;
  return plan;
}

bool says(const std::string& message, const std::string& words) { return message.find(words) != std::string::npos; }

}  // namespace

TEST_CASE("Whorls that cross the axis are refused unless a pillar as thick as the wall parts them", "[compile]") {
  test::ShellPlan plan = short_plan();
  plan.columella = 0.0;
  plan.D = 0.0;
  CHECK(complaint(plan).empty());
  plan.S = 1.5;
  plan.roll_deg = 20.0;
  CHECK(says(complaint(plan), "[section] roll and lobes"));
  CHECK(says(complaint(plan), "cross the axis"));
  plan.S = 1.0;
  plan.roll_deg = 0.0;
  plan.D = -0.3;
  CHECK(says(complaint(plan), "cross the axis"));
  CHECK(says(complaint(plan), "D = -0.3"));
  plan.columella = 0.01;
  CHECK(says(complaint(plan), "cross the axis"));
  plan.columella = 0.2;
  CHECK(complaint(plan).empty());
  plan.T = 0.0;
  plan.columella = 0.0;
  CHECK(says(complaint(plan), "larger D"));
}

TEST_CASE("A wall or lip that leaves no lumen is refused, one that leaves some is not", "[compile]") {
  test::ShellPlan plan = short_plan();
  const double half_breadth = compile::compile_scene(test::specimen_of(plan)).law.half_breadth;
  plan.wall_mm = 0.85 * half_breadth;
  CHECK(complaint(plan).empty());
  plan.wall_mm = 1.0 * half_breadth;
  CHECK(says(complaint(plan), "[wall] thickness"));
  CHECK(says(complaint(plan), "thicker than the tube"));
  plan.wall_mm = 0.4;
  plan.lip_mm = 1.0 * half_breadth;
  CHECK(says(complaint(plan), "[lip] thickness"));
  CHECK(says(complaint(plan), "thicker than the tube"));
}

TEST_CASE("Grooves that meet the section's centre are refused", "[compile]") {
  test::ShellPlan plan = short_plan();
  plan.lobes = {{0.0, -0.8, 60.0}};
  plan.wall_mm = 0.05;
  plan.lip_mm = 0.05;
  CHECK_FALSE(says(complaint(plan), "groove"));
  plan.lobes.push_back({5.0, -0.3, 60.0});
  CHECK(says(complaint(plan), "groove"));
}

TEST_CASE("All geometric faults of a kind are named, each at its own lamp", "[compile]") {
  test::ShellPlan plan = short_plan();
  plan.lamps = {{0.2, 40.0}, {0.2, 0.3}, {2.2, 0.01}};
  const std::string message = complaint(plan);
  CHECK(says(message, "radius = 40: the lamp does not fit"));
  CHECK(says(message, "behind_lip = 2.2: the lamp would lie before the tube begins"));
  CHECK_FALSE(says(message, "radius = 0.3"));
}

TEST_CASE("Scenes that only geometry finds wrong are refused with the message that they expect", "[compile][regressions]") {
  int replayed = 0;
  for (const auto& entry : std::filesystem::directory_iterator(std::string(WHORL_TEST_DIR) + "/regressions/geometry")) {
    if (entry.path().extension() != ".toml") continue;
    std::ifstream file(entry.path());
    std::string first;
    std::getline(file, first);
    const std::string mark = "# expect: ";
    CAPTURE(entry.path().filename().string(), first);
    REQUIRE(first.rfind(mark, 0) == 0);
    const specimen::Specimen specimen = specimen::read_scene_file(entry.path().string());
    const std::string message = complaint(specimen);
    CHECK(says(message, first.substr(mark.size())));
    // Each message begins with file, line and column of the value that is wrong.
    CHECK(message.rfind(specimen.source + ":", 0) == 0);
    CHECK_FALSE(says(message, ":0:"));
    ++replayed;
  }
  CHECK(replayed >= 8);
}

namespace {

// What compiling a scene says whose other tables are sound.
std::string complaint_of_scene(const std::string& tables) {
  return complaint(specimen::parse_scene("format = 1\n[specimen]\nname = \"Fracta mala\"\ncoiling = \"dextral\"\n[growth]\nwhorls = 4.0\n"
                                         "W = 1.6\nD = 0.05\nT = 2.0\n[size]\naperture_height = 10.0\n[wall]\nthickness = 0.4\n" + tables,
                                         "scene"));
}

}  // namespace

TEST_CASE("Elements that the whorl cannot carry are refused, with what to do", "[compile][attached]") {
  CHECK(complaint_of_scene("[[spine]]\nper_whorl = 8\nlength = 3\nbreadth = 0.6\nat = 60\n").empty());
  const std::string broad = complaint_of_scene("[[spine]]\nper_whorl = 8\nlength = 9\nbreadth = 6\nat = 60\n");
  CHECK(says(broad, "scene:17:11"));
  CHECK(says(broad, "[[spine]] breadth = 6 mm: the whorl curves away under so broad a foot"));
  CHECK(says(broad, "make the foot narrower"));
  const std::string many = complaint_of_scene(
      "[[attached]]\nshape = \"bead\"\nper_whorl = 20000\nrows = 1000\nwidth = 360\nheight = 0.01\nbreadth = 0.01\nat = 0\ncolour = \"#804020\"\n");
  CHECK(says(many, "[[attached]] per_whorl = 20000 in 1000 rows: 6.5e+07 elements in all; at most 4000000 are allowed"));
}

TEST_CASE("A lamp or a ring in the wall is refused with the room that there is", "[compile]") {
  CHECK(complaint_of_scene("[[lamp]]\nradius = 0.2\noffset = 2\nat = 0\n").empty());
  CHECK(complaint_of_scene("[[lamp]]\nradius = 0.2\nshape = \"ring\"\nring = 1\n").empty());
  const std::string lamp = complaint_of_scene("[[lamp]]\nradius = 0.2\noffset = 30\nat = 0\n");
  CHECK(says(lamp, "[[lamp]]: the lamp lies in the wall 0.12 whorls behind the lip"));
  CHECK(says(lamp, "give a smaller offset"));
  const std::string ring = complaint_of_scene("[[lamp]]\nradius = 0.2\nshape = \"ring\"\nring = 40\n");
  CHECK(says(ring, "[[lamp]]: the ring lies in the wall 0.12 whorls behind the lip"));
  CHECK(says(complaint_of_scene("[[lamp]]\nradius = 3.9\noffset = 2\nat = 180\n"), "room for a radius of "));
}
