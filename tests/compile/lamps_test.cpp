// SPDX-License-Identifier: Apache-2.0
// A lamp that is accepted hangs free in the lumen.
#include "compile/compile.h"

#include "diagnostics/error.h"
#include "support/catch.h"
#include "support/shell_specimen.h"

#include <random>
#include <string>

using namespace whorl;

namespace {

// The room that is said to be there for a lamp that is far too large.
double room_for_lamp(test::ShellPlan plan, double behind_lip) {
  plan.lamps = {{behind_lip, 0.9 * plan.size_mm}};
  try {
    compile::compile_scene(test::specimen_of(plan));
  } catch (const diagnostics::InvalidInput& error) {
    const std::string message = error.what(), words = "room for a radius of ";
    const std::size_t at = message.find(words);
    return at == std::string::npos ? 0.0 : std::stod(message.substr(at + words.size()));
  }
  return 0.0;
}

}  // namespace

TEST_CASE("A lamp as large as the room that is named for it is accepted and touches no wall, in any direction", "[compile]") {
  // Fast growth makes the walls lean: the nearest is not in the half-plane of the lamp.
  test::ShellPlan trumpet = test::globose_plan(), open = test::globose_plan();
  trumpet.size_kind = open.size_kind = specimen::SizeKind::kApertureHeight;
  trumpet.size_mm = open.size_mm = 12.0;
  trumpet.W = {{0.0, 10.0}};
  trumpet.whorls = 1.5;
  trumpet.D = 0.3;
  trumpet.T = 3.0;
  open.W = {{0.0, 4.0}};
  open.whorls = 2.0;
  open.D = 0.0;
  struct Case {
    test::ShellPlan plan;
    double behind_lip;
  };
  std::mt19937 engine(8);
  std::normal_distribution<double> normal;
  for (const Case& c : {Case{test::tall_plan(), 3.0}, Case{open, 0.0}, Case{test::planispiral_plan(), 1.0},
                        Case{trumpet, 0.3}, Case{open, 0.2}}) {
    test::ShellPlan plan = c.plan;
    const double radius = 0.99 * room_for_lamp(plan, c.behind_lip);  // named to three digits
    CAPTURE(plan.name, plan.W[0].W, c.behind_lip, radius);
    CHECK(radius > 0.1);
    plan.lamps = {{c.behind_lip, radius}};
    const test::Shell shell(plan);
    REQUIRE(shell.scene.lamps.size() == 1);
    const scene::Lamp& lamp = shell.scene.lamps[0];
    CHECK(shell.at(lamp.centre) == field::State::kLumen);
    int solid = 0;
    for (int i = 0; i < 4000; ++i) {
      const Vec3 d = Vec3(normal(engine), normal(engine), normal(engine)).normalized();
      for (const double part : {0.3, 0.7, 0.9, 0.999})
        if (shell.at(lamp.centre + part * lamp.radius * d) == field::State::kSolid) ++solid;
    }
    CHECK(solid == 0);
    // It hangs at the stated growth angle, and says what was stated of it.
    const double theta = shell.scene.law.theta_lip - kTwoPi * c.behind_lip;
    CHECK(std::remainder(std::atan2(lamp.centre.y, lamp.centre.x) - theta, kTwoPi) == Approx(0.0).margin(1e-9));
    CHECK(lamp.radius == radius);
    CHECK(lamp.strength == 40.0);
    CHECK(lamp.temperature_k == 3200.0);
  }
}
