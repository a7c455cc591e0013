// SPDX-License-Identifier: Apache-2.0
// Volumes, areas and angles of the solid against the closed forms for self-similar tubes.
#include "support/catch.h"

#include "measure/integrals.h"
#include "measure/measurements.h"
#include "measure/whorl_section.h"
#include "support/shell_specimen.h"

#include <cmath>

using namespace whorl;

namespace {

// Five turns of tube with a wall and a lip too thin to matter, outer margin R = 1 mm at the lip. What the embryonic cap
// adds is under 2^-15 of the volume and 2^-10 of the area where W = 2.
constexpr double kTurns = 5.0;

test::ShellPlan thin_tube(double W, double D, double T) {
  test::ShellPlan plan;
  plan.name = "thin tube";
  plan.whorls = kTurns + 0.75;
  plan.start = 0.75;
  plan.W = {{0.0, W}};
  plan.D = D;
  plan.T = T;
  plan.S = 1.0;
  plan.wall_mm = 0.004;
  plan.lip_mm = 0.004;
  plan.size_kind = specimen::SizeKind::kApertureWidth;
  return plan;
}

// Scaled so that the outer margin of the section at the lip is 1 mm from the axis.
test::Shell shell_with_unit_margin(test::ShellPlan plan) {
  plan.size_mm = 0.5;
  const test::Shell trial(plan);
  plan.size_mm = 0.5 / (trial.scene.law.distance + trial.scene.law.half_breadth);
  return test::Shell(plan);
}

measure::Integrals integrals_of(const test::Shell& shell) {
  const trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
  return measure::integrate(solid, {1 << 18, 7});
}

}  // namespace

TEST_CASE("the volume of an open coil is that of the swept tube", "[measure]") {
  // Closed form: shell-geometry 4.6 (Pappus for a similar-growing section; Moseley 1838), row C22d's shell to the pole,
  // .7558445 R^3, less what lies before the tube's beginning.
  const test::Shell shell = shell_with_unit_margin(thin_tube(2.0, 0.3, 1.5));
  const measure::Integrals m = integrals_of(shell);
  const double expected = 0.7558445 * (1.0 - std::pow(2.0, -3.0 * kTurns));
  CHECK(m.outer_volume.value == Approx(expected).epsilon(0.005));
  CHECK(m.outer_volume.error < 0.001 * expected);
}

TEST_CASE("the lateral area of an open coil is that of the swept tube", "[measure]") {
  // Closed form: shell-geometry 4.7, row C22e: 6.44805 R^2 for three turns, which is 1 - W^-6 of the area to the pole.
  const test::Shell shell = shell_with_unit_margin(thin_tube(2.0, 0.3, 1.5));
  const measure::Integrals m = integrals_of(shell);
  const double expected = 6.44805 / (1.0 - std::pow(2.0, -6.0)) * (1.0 - std::pow(2.0, -2.0 * kTurns));
  CHECK(m.outer_area.value == Approx(expected).epsilon(0.01));
}

TEST_CASE("where whorls overlap the occupied volume is smaller by the overlap", "[measure]") {
  // Closed form: shell-geometry 4.6, rows C22a and C22b: V_occ = [A R_A (1 - W^-3n) - M (1 - W^-3(n-1))] / 3k.
  const double W = 2.0, D = 0.3, k = std::log(W) / kTwoPi;
  const double area = kPi * 0.35 * 0.35, centroid = 0.65, moment = 0.02027976;
  const double expected = (area * centroid * (1.0 - std::pow(W, -3.0 * kTurns)) -
                           moment * (1.0 - std::pow(W, -3.0 * (kTurns - 1.0)))) / (3.0 * k);
  const test::Shell shell = shell_with_unit_margin(thin_tube(W, D, 0.0));
  CHECK(integrals_of(shell).outer_volume.value == Approx(expected).epsilon(0.005));
}

TEST_CASE("solid and lumen make up the outer volume", "[measure]") {
  const measure::Integrals m = integrals_of(test::Shell(test::globose_plan()));
  CHECK(m.lumen_volume.value + m.wall_volume.value == Approx(m.outer_volume.value).epsilon(1e-6));
}

TEST_CASE("the enveloping cone has the closed form's angle", "[measure]") {
  // Shell-geometry 4.4, rows C23a to C23d: semi-angles, circular section, any W.
  struct Row {
    double T, D, semi_angle;
  };
  const Row row = GENERATE(Row{1.5, 0.3, 51.0687}, Row{6.0, 0.1, 17.1925}, Row{0.5, 0.0, 126.8699}, Row{0.0, 0.3, 122.5790});
  for (const double W : {1.3, 2.0}) {
    CAPTURE(row.T, row.D, W);
    const test::Shell shell = shell_with_unit_margin(thin_tube(W, row.D, row.T));
    const double theta = shell.scene.law.theta_lip - radians(60.0);
    const auto last = measure::whorl_section(shell.field, theta);
    const auto before = measure::whorl_section(shell.field, theta - kTwoPi);
    CHECK(degrees(measure::touching_angle(last, before)) == Approx(row.semi_angle).margin(0.2));
  }
}
