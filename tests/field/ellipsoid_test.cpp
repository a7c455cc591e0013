// SPDX-License-Identifier: Apache-2.0
// Density primitives in space: they fuse with their own whorl, cut it, and leave every other alone.
#include "field/field.h"

#include "support/catch.h"
#include "support/shell_specimen.h"

using namespace whorl;
using field::Part;
using field::State;

namespace {

// A ball of density on the surface of the last whorl but one, at a section angle that no other whorl covers.
constexpr double kPsi = 0.3, kRadius = 0.6;  // of the half-breadth there
double theta_of(const scene::Scene& scene) { return scene.law.theta_lip - 1.2 * kTwoPi; }

scene::Ellipsoid ball(const scene::Scene& scene, double weight, bool hollow) {
  const double theta = theta_of(scene), r = kRadius * scene.law.at(theta).half_breadth;
  scene::Ellipsoid e{test::in_tube(scene.law, theta, kPsi, 1.0), {}, weight, theta, hollow};
  e.to_unit[0] = {1.0 / r, 0.0, 0.0};
  e.to_unit[1] = {0.0, 1.0 / r, 0.0};
  e.to_unit[2] = {0.0, 0.0, 1.0 / r};
  return e;
}

test::ShellPlan open_plan() {
  test::ShellPlan plan = test::globose_plan();
  plan.D = 0.4;  // whorls that keep apart, so that the surface lies free all round
  plan.W = {{0.0, 2.4}};
  plan.T = 1.5;
  plan.wall_mm = 0.5;
  return plan;
}

// Where the outline of the section ends along the section angle, in section coordinates.
double reach_found(const test::Shell& shell, double theta, double psi) {
  double lo = 0.5, hi = 1.43;
  for (int i = 0; i < 50; ++i) {
    const double mid = 0.5 * (lo + hi);
    (shell.field.value({Part::kWhorl, theta}, test::in_tube(shell.scene.law, theta, psi, mid)) > 0.0 ? lo : hi) = mid;
  }
  return lo;
}

}  // namespace

TEST_CASE("A primitive that adds raises the surface of its whorl by the sum of kernels, one that cuts lowers it", "[field]") {
  const test::Shell plain(open_plan());
  const double theta = theta_of(plain.scene);
  for (const double weight : {0.3, 0.05, -0.05}) {
    const test::Shell shell(open_plan(), [&](scene::Scene& s) { s.ellipsoids.push_back(ball(s, weight, false)); });
    CAPTURE(weight);
    const double reach = reach_found(shell, theta, kPsi);
    CHECK(reach_found(plain, theta, kPsi) == Approx(1.0).margin(1e-12));
    if (weight > 0.0) CHECK(reach > 1.01);
    if (weight < 0.0) CHECK(reach < 0.99);
    // There the sum of the station's kernel and of the ball's is the level (1 - 1/s^2)^3, s = 1.44 (design, section 2).
    const Vec3 p = test::in_tube(shell.scene.law, theta, kPsi, reach);
    const double u2 = (p - test::in_tube(shell.scene.law, theta, kPsi, 1.0)).length2() /
                      std::pow(kRadius * shell.scene.law.at(theta).half_breadth, 2);
    const double station = std::pow(1.0 - reach * reach / (1.44 * 1.44), 3), own = weight * std::pow(1.0 - u2, 3);
    CHECK(station + own == Approx(std::pow(1.0 - 1.0 / (1.44 * 1.44), 3)).epsilon(1e-10));
    // What was air just off the surface is solid now, or the other way round.
    const double off = weight > 0.0 ? 1.005 : 0.995;
    const Vec3 probe = test::in_tube(shell.scene.law, theta, kPsi, off);
    CHECK(plain.at(probe) == (weight > 0.0 ? State::kOutside : State::kSolid));
    CHECK(shell.at(probe) == (weight > 0.0 ? State::kSolid : State::kOutside));
    // Out of its reach nothing changes.
    CHECK(reach_found(shell, theta, kPsi + 2.5) == Approx(1.0).margin(1e-12));
    CHECK(reach_found(shell, theta - 1.3, kPsi) == Approx(1.0).margin(1e-12));
  }
}

TEST_CASE("A primitive of one whorl is not felt by the whorls before and after it", "[field]") {
  const test::Shell plain(open_plan());
  const test::Shell shell(open_plan(), [](scene::Scene& s) {
    s.ellipsoids.push_back(ball(s, 0.3, false));
    s.ellipsoids.push_back(ball(s, 0.3, true));
  });
  const double theta = theta_of(shell.scene);
  int felt = 0, elsewhere = 0;
  for (int i = 0; i < 3000; ++i) {
    const Vec3 p = test::in_tube(shell.scene.law, theta, kPsi, 1.0) +
                   0.4 * shell.scene.law.at(theta).half_breadth *
                       Vec3(std::sin(1.1 * i), std::sin(1.7 * i + 1.0), std::sin(2.3 * i + 2.0));
    double a_outer, a_hollow, b_outer, b_hollow;
    for (const double turn : {-kTwoPi, 0.0, kTwoPi}) {
      plain.field.whorl(p, theta + turn, a_outer, a_hollow);
      shell.field.whorl(p, theta + turn, b_outer, b_hollow);
      const bool differs = std::abs(a_outer - b_outer) > 1e-9 || std::abs(a_hollow - b_hollow) > 1e-9;
      (turn == 0.0 ? felt : elsewhere) += differs;
    }
  }
  CHECK(felt > 1000);
  CHECK(elsewhere == 0);
}

TEST_CASE("A primitive of the lumen hollows out the wall from within and leaves the outside as it was", "[field]") {
  const test::Shell plain(open_plan());
  const test::Shell shell(open_plan(), [](scene::Scene& s) { s.ellipsoids.push_back(ball(s, 0.02, true)); });
  const double theta = theta_of(shell.scene);
  const Vec3 in_wall = test::in_tube(shell.scene.law, theta, kPsi, 0.97);
  CHECK(reach_found(shell, theta, kPsi) == Approx(1.0).margin(1e-12));
  double plain_outer, plain_hollow, outer, hollow;
  plain.field.whorl(in_wall, theta, plain_outer, plain_hollow);
  shell.field.whorl(in_wall, theta, outer, hollow);
  CHECK(outer == Approx(plain_outer).margin(1e-12));
  CHECK(hollow > plain_hollow);
}
