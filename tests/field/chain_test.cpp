// SPDX-License-Identifier: Apache-2.0
// The chain of stations is the stated outline, at every section angle.
#include "field/field.h"

#include "support/catch.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using field::Part;

namespace {

class Draws {
 public:
  explicit Draws(unsigned seed) : engine_(seed) {}
  double between(double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine_); }

 private:
  std::mt19937 engine_;
};

constexpr double kBeforeTheFront = 2.7;  // radians behind the lip: the growth front changes nothing there

// The density of one chain and its length, by the words of the design: kernel (1 - u^2)^3 of support s = 1.44, stations a
// 48th of a turn apart under a cubic B-spline's partition of unity, |q| = s sqrt(1 - f^(1/3)).
double chain_by_definition(const scene::Scene& scene, double theta, growth::HalfPlanePoint p, bool hollow) {
  const growth::Station s = scene.law.at(theta);
  const growth::SectionPoint q = scene.law.to_section(s, p);
  double density = 0.0, scale = 0.0;
  for (std::size_t i = 0; i < scene.stations.size(); ++i) {
    const double x = std::abs(theta - scene.first_station_theta - static_cast<double>(i) * kTwoPi / 48.0) / (kTwoPi / 48.0);
    if (x >= 2.0) continue;
    const double weight = x < 1.0 ? 2.0 / 3.0 - x * x + 0.5 * x * x * x : std::pow(2.0 - x, 3) / 6.0;
    const growth::Outline& outline = scene.outlines[hollow ? scene.stations[i].hollow : scene.stations[i].outer];
    const double u = std::hypot(q.x, q.y) / (1.44 * outline.reach.value(std::atan2(q.y, q.x)));
    if (u < 1.0) density += weight * std::pow(1.0 - u * u, 3);
    scale += weight * outline.normal_scale.value(std::atan2(q.y, q.x));
  }
  const double t = 1.44 * std::sqrt(1.0 - std::cbrt(density));
  return 0.5 * s.half_breadth * (1.0 - t * t) * scale;
}

}  // namespace

TEST_CASE("The chain of stations vanishes on the stated outline, at every section angle", "[field]") {
  test::ShellPlan ornate = test::ornate_plan();
  ornate.columella = 0.0;
  ornate.D = 0.2;
  for (const test::ShellPlan& plan : {test::globose_plan(), test::planispiral_plan(), ornate}) {
    const test::Shell shell(plan);
    const growth::CoilingLaw& law = shell.scene.law;
    // The spline through 1 plus all lobes is the stated outline.
    const PeriodicSpline reach = growth::outer_reach(test::specimen_of(plan).section.lobes);
    CAPTURE(plan.name);
    Draws draw(4);
    double worst = 0.0;
    for (int i = 0; i < 20000; ++i) {
      const double theta = draw.between(law.theta_start, law.theta_lip - kBeforeTheFront), psi = draw.between(-kPi, kPi);
      const Vec3 p = test::in_tube(law, theta, psi, reach.value(psi));
      worst = std::max(worst, std::abs(shell.field.value({Part::kWhorl, theta}, p)));
    }
    CHECK(worst < 1e-12 * shell.height());
  }
}

TEST_CASE("Where outlines repeat, the lumen's chain vanishes on the lumen's outline", "[field]") {
  const test::Shell shell(test::globose_plan());
  const growth::CoilingLaw& law = shell.scene.law;
  const PeriodicSpline& hollow = shell.scene.outlines[shell.scene.stations[20].hollow].reach;
  Draws draw(5);
  double worst = 0.0;
  for (int i = 0; i < 20000; ++i) {
    const double theta = draw.between(law.theta_start, law.theta_lip - kBeforeTheFront), psi = draw.between(-kPi, kPi);
    const Vec3 p = test::in_tube(law, theta, psi, hollow.value(psi));
    worst = std::max(worst, std::abs(shell.field.value({Part::kWhorlHollow, theta}, p)));
  }
  CHECK(worst < 1e-10 * shell.height());
}

TEST_CASE("Both chains are the inverted sum of kernels that the design states, also where outlines change", "[field]") {
  test::ShellPlan plan = test::ornate_plan();
  plan.columella = 0.0;
  plan.D = 0.2;
  const test::Shell shell(plan);
  const growth::CoilingLaw& law = shell.scene.law;
  Draws draw(6);
  double worst = 0.0;
  for (int i = 0; i < 4000; ++i) {
    const double theta = draw.between(law.theta_start, law.theta_lip - kBeforeTheFront), psi = draw.between(-kPi, kPi);
    const growth::HalfPlanePoint at = law.to_half_plane(law.at(theta), {draw.between(0.0, 1.6) * std::cos(psi),
                                                                        draw.between(0.0, 1.6) * std::sin(psi)});
    if (at.rho <= 0.0) continue;
    const Vec3 p = test::in_space(theta, at);
    for (const bool hollow : {false, true}) {
      const double value = shell.field.value({hollow ? Part::kWhorlHollow : Part::kWhorl, theta}, p);
      worst = std::max(worst, std::abs(value - chain_by_definition(shell.scene, theta, at, hollow)));
    }
  }
  CHECK(worst < 1e-9 * shell.height());
}

TEST_CASE("Near its zero a function of the tube is the distance from the surface, in millimetres", "[field]") {
  test::ShellPlan steep = test::globose_plan();
  steep.T = 4.0;
  steep.D = 0.35;
  steep.S = 1.8;
  steep.roll_deg = 15.0;
  for (const test::ShellPlan& plan : {test::globose_plan(), steep, test::planispiral_plan()}) {
    const test::Shell shell(plan);
    const growth::CoilingLaw& law = shell.scene.law;
    CAPTURE(plan.name, plan.T);
    Draws draw(7);
    double worst = 0.0;
    for (int i = 0; i < 3000; ++i) {
      const double theta = draw.between(law.theta_start + kTwoPi, law.theta_lip - kBeforeTheFront), psi = draw.between(-kPi, kPi);
      const Vec3 p = test::in_tube(law, theta, psi, 1.0);
      const Vec3 gradient = shell.field.gradient({Part::kWhorl, theta}, p);
      worst = std::max(worst, std::abs(gradient.length() - 1.0));
    }
    CHECK(worst < 1e-3);
  }
}

TEST_CASE("A place of the tube has the growth angle and the section angle at which it was put", "[field]") {
  const test::Shell shell(test::ornate_plan());
  Draws draw(8);
  for (int i = 0; i < 2000; ++i) {
    const double theta = draw.between(shell.scene.theta_begin, shell.scene.theta_end), psi = draw.between(-kPi, kPi);
    const Vec3 p = test::in_tube(shell.scene.law, theta, psi, draw.between(0.2, 0.9));
    if (shell.scene.law.to_half_plane(shell.scene.law.at(theta), {std::cos(psi), std::sin(psi)}).rho < 0.1) continue;
    double growth_angle, around;
    shell.field.coordinates(p, theta + draw.between(-3.0, 3.0), growth_angle, around);
    CHECK(growth_angle == Approx(theta).margin(1e-9));
    CHECK(std::remainder(around - psi, kTwoPi) == Approx(0.0).margin(1e-7));
  }
}
