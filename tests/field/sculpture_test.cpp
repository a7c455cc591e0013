// SPDX-License-Identifier: Apache-2.0
// Sculpture measured on the field: heights, numbers, direction and growth as stated.
#include "field/field.h"
#include "measure/support.h"

#include "support/catch.h"
#include "support/shell_oracle.h"
#include "support/shell_specimen.h"

#include <cmath>
#include <vector>

using namespace whorl;
using field::Part;

namespace {

// An open coil of circular section: every direction lies bare, and the outline's normal is the direction itself.
test::ShellPlan open_coil(double inclination_deg) {
  test::ShellPlan plan;
  plan.name = "open coil";
  plan.whorls = 4.0;
  plan.W = {{0.0, 2.0}};
  plan.D = 0.3;
  plan.T = 1.8;
  plan.size_kind = specimen::SizeKind::kApertureHeight;
  plan.size_mm = 20.0;  // half-breadth 10 mm
  plan.wall_mm = 0.8;
  plan.inclination_deg = inclination_deg;
  return plan;
}

// Where the outer surface stands in a direction, in half-breadths from the centre.
double surface_at(const test::Shell& shell, double theta, double psi) {
  double lo = 0.6, hi = 1.4;
  for (int i = 0; i < 60; ++i) {
    const double mid = 0.5 * (lo + hi);
    (shell.field.value({Part::kWhorl, theta}, test::in_tube(shell.scene.law, theta, psi, mid)) > 0.0 ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi);
}

// How far the surface there stands off the plain outline's surface in space, mm; by search on the law.
double height_at(const test::Shell& shell, double theta, double psi) {
  const double reach = surface_at(shell, theta, psi);
  const Vec3 p = test::in_tube(shell.scene.law, theta, psi, reach);
  const double distance = test::nearest_on_tube(shell.scene.law, PeriodicSpline(1.0), p, theta).distance;
  return reach < 1.0 ? -distance : distance;
}

// Growth angles of the crests in a direction, over a range, to 1e-4.
std::vector<double> crests(const test::Shell& shell, double psi, double from, double to) {
  std::vector<double> found;
  constexpr int kSteps = 4000;
  const double step = (to - from) / kSteps;
  double before = surface_at(shell, from, psi), here = surface_at(shell, from + step, psi);
  for (int i = 2; i <= kSteps; ++i) {
    const double after = surface_at(shell, from + i * step, psi);
    if (here > before && here >= after && here > 1.005)
      found.push_back(from + (i - 1) * step + 0.5 * step * (before - after) / (before - 2.0 * here + after));
    before = here;
    here = after;
  }
  return found;
}

growth::Relief ribs(const scene::Scene& scene, double per_whorl, double height) {
  growth::Relief r;
  r.height = height;
  r.spacing = kTwoPi / per_whorl;
  r.crest = scene.law.theta_lip;
  r.growth_reach = 0.35 * r.spacing;
  r.onset = scene.law.theta_start;
  r.end = scene.law.theta_lip + kTwoPi;
  return r;
}

}  // namespace

TEST_CASE("Cords, grooves, ribs and nodules stand as high on the solid as stated, within 1 %", "[field][sculpture]") {
  for (const double height : {0.01, 0.05, 0.15, -0.03}) {
    const test::Shell shell(open_coil(0.0), [&](scene::Scene& scene) {
      growth::Relief cord;
      cord.height = height;
      cord.psi = 0.6;
      cord.psi_reach = 0.3;
      cord.onset = scene.law.theta_start;
      cord.end = scene.law.theta_lip + kTwoPi;
      growth::Relief nodules = ribs(scene, 12.0, height);
      nodules.psi = -1.2;
      nodules.psi_reach = 0.4;
      growth::Relief axial = ribs(scene, 9.0, height);
      axial.psi = kPi - 0.3;
      axial.psi_reach = 0.7;
      scene.sculpture.reliefs = {cord, nodules, axial};
    });
    const double lip = shell.scene.law.theta_lip;
    const auto stands = [&](double theta, double psi) { return height_at(shell, theta, psi) / shell.scene.law.at(theta).half_breadth; };
    CAPTURE(height);
    for (const double whorl : {0.7, 1.2, 1.9}) {
      const double theta = lip - kTwoPi * whorl;
      CHECK(stands(theta, 0.6) == Approx(height).epsilon(0.01));
      CHECK(surface_at(shell, theta, 0.6 + 0.31) == Approx(1.0).margin(1e-6));
    }
    CHECK(stands(lip - 13.0 * kTwoPi / 12.0, -1.2) == Approx(height).epsilon(0.01));
    CHECK(surface_at(shell, lip - 13.5 * kTwoPi / 12.0, -1.2) == Approx(1.0).margin(1e-6));
    CHECK(stands(lip - 11.0 * kTwoPi / 9.0, kPi - 0.3) == Approx(height).epsilon(0.01));
  }
}

TEST_CASE("Ribs are as many a whorl as stated, evenly, and parallel to the lip at every stage", "[field][sculpture]") {
  for (const double inclination : {0.0, 20.0, -15.0}) {
    const test::Shell shell(open_coil(inclination), [](scene::Scene& scene) { scene.sculpture.reliefs = {ribs(scene, 17.0, 0.08)}; });
    const growth::CoilingLaw& law = shell.scene.law;
    const double from = law.theta_lip - 2.3 * kTwoPi;
    CAPTURE(inclination);
    for (const double psi : {0.0, 0.9, -0.9, kPi}) {
      const std::vector<double> found = crests(shell, psi, from, from + kTwoPi);
      CHECK(found.size() == 17);
      for (const double theta : found) {
        // The lip, moved back to this crest, passes here too: the growth front leads by the same angle.
        const growth::HalfPlanePoint p = law.to_half_plane(law.at(theta), {std::cos(psi), std::sin(psi)});
        const double lead = std::atan2(std::tan(radians(inclination)) * (law.at(theta).depth - p.z), p.rho);
        const double numbers = (law.theta_lip - (theta - lead)) / (kTwoPi / 17.0);
        CHECK(std::abs(numbers - std::round(numbers)) < 0.02);
      }
    }
  }
}

TEST_CASE("Self-similar sculpture on a self-similar shell scales by W a turn", "[field][sculpture]") {
  const test::Shell shell(open_coil(12.0), [](scene::Scene& scene) {
    growth::Relief cord;
    cord.height = 0.07;
    cord.psi = 0.2;
    cord.psi_reach = 0.3;
    cord.onset = scene.law.theta_start - 100.0;
    cord.end = scene.law.theta_lip + 100.0;
    growth::Relief axial = ribs(scene, 11.0, 0.05);
    axial.onset -= 100.0;
    axial.end += 100.0;
    scene.sculpture.reliefs = {cord, axial};
  });
  const growth::CoilingLaw& law = shell.scene.law;
  double worst = 0.0;
  for (int i = 0; i < 2000; ++i) {
    const double theta = law.theta_lip - 2.4 * kTwoPi + 0.5 * std::fmod(0.618 * i, 1.0), psi = std::fmod(2.399963 * i, kTwoPi);
    const double reach = 0.7 + 0.5 * std::fmod(0.7549 * i, 1.0);
    const Vec3 p = test::in_tube(law, theta, psi, reach);
    const double before = shell.field.value({Part::kWhorl, theta}, p), after = shell.field.value({Part::kWhorl, theta + kTwoPi}, 2.0 * p);
    worst = std::max(worst, std::abs(after - 2.0 * before) / (2.0 * law.at(theta).half_breadth));
  }
  CHECK(worst < 1e-6);  // check value C26: f(W x) = W f(x)
}

TEST_CASE("Sculpture grows with the stated power of the whorl's size", "[field][sculpture]") {
  for (const double power : {0.0, 0.5, 1.6}) {
    const test::Shell shell(open_coil(14.0), [&](scene::Scene& scene) {
      growth::Relief cord;
      cord.height = 0.04;
      cord.psi = 0.6;
      cord.psi_reach = 0.3;
      cord.onset = scene.law.theta_start;
      cord.end = scene.law.theta_lip + kTwoPi;
      cord.power = power;
      scene.sculpture.reliefs = {cord};
    });
    CAPTURE(power);
    // W = 2: at each earlier whorl 2^-power of 0.04 half-breadths at the lip.
    for (const double whorls : {0.6, 1.2, 1.9}) {
      const double theta = shell.scene.law.theta_lip - kTwoPi * whorls;
      CHECK(height_at(shell, theta, 0.6) == Approx(0.04 * shell.scene.law.half_breadth * std::pow(2.0, -power * whorls)).epsilon(0.01));
    }
  }
}

TEST_CASE("Stated sizes are measured over the sculpture", "[compile][sculpture]") {
  test::ShellPlan plan = open_coil(0.0);
  plan.size_kind = specimen::SizeKind::kShellWidth;
  plan.size_mm = 30.0;
  specimen::Specimen specimen = test::specimen_of(plan);
  specimen::Cord cord;
  cord.at_deg.value = 0.0;
  cord.width_deg.value = 30.0;
  cord.height_mm.value = 1.0;
  cord.end.value = 40.0;
  cord.growth.value = 1.0;
  specimen.sculpture.cords = {cord};
  const scene::Scene scene = compile::compile_scene(specimen);
  CHECK(scene.sculpture.reliefs[0].height * scene.law.half_breadth == Approx(1.0).epsilon(1e-4));
  const field::Field field(scene);
  const trace::EmbreeSolid solid(field, {1e-4 * scene.height_mm, false});
  CHECK(measure::width_across_axis(solid) == Approx(30.0).epsilon(0.002));
}
