// SPDX-License-Identifier: Apache-2.0
// Growth counted along growth lines: places where the lip stood together have one count.
#include "field/growth_line.h"

#include "compile/compile.h"
#include "growth/extents.h"
#include "support/catch.h"
#include "support/shell_specimen.h"

using namespace whorl;

TEST_CASE("all places of a leaning lip, and of the lip of any earlier stage, have one count of whorls", "[field][provenance]") {
  test::ShellPlan plan = test::tall_plan();
  plan.inclination_deg = 20.0;
  plan.columella = 0.0;
  const test::Shell shell(plan);
  for (const double before : {0.0, 1.5}) {
    growth::Exterior stage = compile::exterior_of(shell.scene);
    // The shell as it was: the same law with its lip further back.
    const double theta = stage.law.theta_lip - kTwoPi * before;
    const growth::Station there = shell.scene.law.at(theta);
    stage.law.theta_lip = theta;
    stage.law.distance = there.distance;
    stage.law.depth = there.depth;
    stage.law.half_breadth = there.half_breadth;
    const specimen::Stages W = plan.W;
    stage.law.by_distance = stage.law.by_depth = stage.law.by_section = growth::Expansion(W, theta);
    double least = 1e9, most = -1e9;
    for (int i = 0; i < 72; ++i) {
      const double psi = kTwoPi * i / 72.0, at = growth::front_theta(stage, psi);
      CHECK(field::whorl_at(shell.field, test::in_tube(shell.scene.law, at, psi, 1.0), at) == Approx(theta / kTwoPi).margin(2e-4));
      least = std::min(least, at);
      most = std::max(most, at);
    }
    CHECK(most - least > 0.3);  // in growth angle the lip spans much more
  }
}

TEST_CASE("a depth on the columella is that of the whorl whose centre lies there", "[field][provenance]") {
  const test::Shell shell(test::tall_plan());
  for (const double whorl : {2.0, 4.3, 7.9})
    CHECK(field::whorl_at_depth(shell.scene, shell.scene.law.at(kTwoPi * whorl).depth) == Approx(whorl).margin(1e-9));
}
