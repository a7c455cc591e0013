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
