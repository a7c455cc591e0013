// SPDX-License-Identifier: Apache-2.0
// The lumen keeps the wall's thickness from the outer surface, measured in space.
#include "compile/compile.h"

#include "support/catch.h"
#include "support/shell_oracle.h"
#include "support/shell_specimen.h"

using namespace whorl;

namespace {

struct WallError {
  double too_thin = 0.0, too_thick = 0.0;  // parts of the stated thickness
};

// Over stations from `from` on: distance of the lumen's outline from the nearest place of the outer surface, against the
// thickness stated for that place.
WallError wall_error(const scene::Scene& scene, double from, double to, int steps) {
  const growth::CoilingLaw& law = scene.law;
  WallError error;
  for (int k = 0; k <= steps; ++k) {
    const double wanted = from + (to - from) * k / steps;
    const auto i = static_cast<std::size_t>(std::lround((wanted - scene.first_station_theta) / scene::kStationSpacing));
    const double theta = scene.first_station_theta + static_cast<double>(i) * scene::kStationSpacing;
    const PeriodicSpline& hollow = scene.outlines[scene.stations[i].hollow].reach;
    const PeriodicSpline& outer = scene.outlines[scene.stations[i].outer].reach;
    for (int j = 0; j < 30; ++j) {
      const double psi = kTwoPi * (j + 0.31 * k) / 30.0;
      const Vec3 p = test::in_tube(law, theta, psi, hollow.value(psi));
      const test::Foot foot = test::nearest_on_tube(law, outer, p, theta);
      const Vec3 at = test::in_tube(law, foot.theta, foot.psi, outer.value(foot.psi));
      const double stated = scene.wall.thickness(law, foot.theta, {std::hypot(at.x, at.y), at.z});
      error.too_thin = std::max(error.too_thin, 1.0 - foot.distance / stated);
      error.too_thick = std::max(error.too_thick, foot.distance / stated - 1.0);
    }
  }
  return error;
}

scene::Scene compiled(const test::ShellPlan& plan) { return compile::compile_scene(test::specimen_of(plan)); }

// Sized by what is quickly solved.
test::ShellPlan base_plan() {
  test::ShellPlan plan = test::globose_plan();
  plan.size_kind = specimen::SizeKind::kApertureHeight;
  plan.size_mm = 10.0;
  return plan;
}

}  // namespace

TEST_CASE("The lumen's outline is the wall's thickness away from the outer surface, in space", "[compile]") {
  test::ShellPlan round = base_plan();
  round.S = 1.0;
  round.wall_mm = 0.6;
  round.lip_mm = 0.6;
  test::ShellPlan elliptic = round, flat = round, rolled = round, steep = round, wide = round;
  elliptic.S = 2.2;
  flat.S = 0.5;
  rolled.S = 1.6;
  rolled.roll_deg = 35.0;
  steep.T = 5.0;
  steep.D = 0.3;
  steep.S = 1.5;
  wide.W = {{0.0, 8.0}};
  wide.whorls = 2.0;
  wide.inclination_deg = 0.0;
  for (const test::ShellPlan& plan : {round, elliptic, flat, rolled, steep, wide}) {
    CAPTURE(plan.S, plan.T, plan.roll_deg, plan.W[0].W);
    const scene::Scene scene = compiled(plan);
    const WallError error = wall_error(scene, scene.law.theta_lip - 6.0, scene.law.theta_lip, 3);
    CHECK(error.too_thin < 1e-4);
    CHECK(error.too_thick < 1e-4);
  }
}

TEST_CASE("Under keels and grooves the wall is nowhere thinner than stated, and as thick away from them", "[compile]") {
  test::ShellPlan plan = base_plan();
  plan.lobes = {{80.0, 0.25, 30.0}, {-30.0, -0.15, 40.0}};
  plan.roll_deg = 10.0;
  const scene::Scene scene = compiled(plan);
  const WallError error = wall_error(scene, scene.law.theta_lip - 5.0, scene.law.theta_lip - 1.0, 3);
  CHECK(error.too_thin < 1e-3);
}

TEST_CASE("A thicker lip is as thick as stated at the rim and over the last fifteen degrees", "[compile]") {
  test::ShellPlan plan = base_plan();
  plan.lip_mm = 1.2;
  for (const double inclination : {0.0, 25.0}) {
    plan.inclination_deg = inclination;
    const scene::Scene scene = compiled(plan);
    const growth::CoilingLaw& law = scene.law;
    const growth::Station s = law.at(law.theta_lip);
    for (const double behind : {0.0, 7.0, 15.0})
      CHECK(scene.wall.thickness(law, law.theta_lip - radians(behind), {s.distance, law.at(law.theta_lip - radians(behind)).depth}) ==
            Approx(1.2));
    CHECK(scene.wall.thickness(law, law.theta_lip - radians(45.0), {s.distance, law.at(law.theta_lip - radians(45.0)).depth}) ==
          Approx(0.4 * law.at(law.theta_lip - radians(45.0)).half_breadth / law.half_breadth));
    const WallError error = wall_error(scene, law.theta_lip - 0.9, law.theta_lip, 5);
    CHECK(error.too_thin < 2e-3);
    CHECK(error.too_thick < 2e-3);
  }
}

TEST_CASE("A proportional wall thins with the tube and a constant one does not", "[compile]") {
  test::ShellPlan plan = base_plan();
  plan.wall_mm = 0.15;
  plan.lip_mm = 0.15;
  for (const bool constant : {false, true}) {
    plan.constant_wall = constant;
    const scene::Scene scene = compiled(plan);
    const growth::CoilingLaw& law = scene.law;
    for (const double back : {1.0, 2.0, 2.6}) {
      const double theta = law.theta_lip - kTwoPi * back;
      const auto i = static_cast<std::size_t>(std::lround((theta - scene.first_station_theta) / scene::kStationSpacing));
      const double at = scene.first_station_theta + static_cast<double>(i) * scene::kStationSpacing;
      const Vec3 p = test::in_tube(law, at, 0.4, scene.outlines[scene.stations[i].hollow].reach.value(0.4));
      const test::Foot foot = test::nearest_on_tube(law, scene.outlines[scene.stations[i].outer].reach, p, at);
      CAPTURE(constant, back);
      CHECK(foot.distance == Approx(constant ? 0.15 : 0.15 * std::pow(1.9, (foot.theta - law.theta_lip) / kTwoPi)).epsilon(1e-4));
    }
  }
}

TEST_CASE("A constant wall leaves a lumen even in the earliest whorls", "[compile]") {
  test::ShellPlan plan = base_plan();
  plan.constant_wall = true;
  plan.wall_mm = 0.7;
  plan.lip_mm = 0.7;
  const scene::Scene scene = compiled(plan);
  // At most four tenths of the lesser half-extent of the tube there (WallLaw).
  const double theta = scene.law.theta_start;
  const growth::Station s = scene.law.at(theta);
  CHECK(scene.wall.thickness(scene.law, theta, {s.distance, s.depth}) == Approx(0.4 * s.half_breadth * std::min(1.0, plan.S)));
  for (const scene::Station& station : scene.stations) CHECK(scene.outlines[station.hollow].reach.bounds().lo > 0.05);
}
