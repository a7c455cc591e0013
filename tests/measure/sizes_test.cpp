// SPDX-License-Identifier: Apache-2.0
// What the scene states is what the solid measures.
#include "support/catch.h"

#include "measure/measurements.h"
#include "measure/mouth.h"
#include "measure/support.h"
#include "support/shell_specimen.h"

#include <string>

using namespace whorl;
using specimen::SizeKind;

namespace {

// A few lines only: these tests look at lengths.
measure::Measurements measured(const test::Shell& shell) {
  const trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
  return measure::measure_shell(solid, specimen::Mineral::kAragonite, {1 << 13, 1});
}

double of_kind(const test::Shell& shell, SizeKind kind) {
  if (kind == SizeKind::kApertureHeight) return measure::mouth_extent(shell.field).height;
  if (kind == SizeKind::kApertureWidth) return measure::mouth_extent(shell.field).width;
  const trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
  if (kind == SizeKind::kShellWidth) return measure::width_across_axis(solid);
  return measure::support(solid, {0, 0, 1}, 128) + measure::support(solid, {0, 0, -1}, 128);
}

}  // namespace

TEST_CASE("every stated size measures back on the solid within 0.2 %", "[measure]") {
  const auto plan = GENERATE(test::tall_plan(), test::globose_plan(), test::planispiral_plan(), test::ornate_plan());
  for (const SizeKind kind :
       {SizeKind::kShellHeight, SizeKind::kShellWidth, SizeKind::kApertureHeight, SizeKind::kApertureWidth}) {
    test::ShellPlan stated = plan;
    stated.size_kind = kind;
    stated.size_mm = kind == SizeKind::kShellHeight || kind == SizeKind::kShellWidth ? 24.0 : 9.0;
    CAPTURE(stated.name, static_cast<int>(kind));
    const test::Shell shell(stated);
    CHECK(of_kind(shell, kind) == Approx(stated.size_mm).epsilon(0.002));
  }
}

TEST_CASE("Raup's parameters measure back as stated", "[measure]") {
  test::ShellPlan plan = test::globose_plan();
  plan.W = {{0.0, 1.9}};
  plan.D = 0.2;
  plan.T = 1.15;
  plan.S = 1.05;
  plan.roll_deg = 0.0;
  plan.lobes.clear();
  plan.columella = 0.0;
  const measure::Measurements m = measured(test::Shell(plan));
  CHECK(m.raup_W.value == Approx(1.9).epsilon(0.001));
  CHECK(m.raup_D.value == Approx(0.2).margin(0.001));
  CHECK(m.raup_T.value == Approx(1.15).epsilon(0.001));
  CHECK(m.raup_S.value == Approx(1.05).epsilon(0.001));
  CHECK(m.whorls.value == Approx(plan.whorls));
}

TEST_CASE("the lip is as thick as stated, and the tube nowhere thinner than its wall", "[measure]") {
  test::ShellPlan plan = test::tall_plan();
  plan.wall_mm = 0.3;
  plan.lip_mm = 0.55;
  const test::Shell shell(plan);
  const measure::Measurements m = measured(shell);
  CHECK(m.wall_thickness_lip.value == Approx(0.55).epsilon(0.01));
  // A proportional wall is thinnest where the tube is smallest: at the first place that is measured, half a whorl in.
  const double first = shell.scene.law.at(shell.scene.law.theta_start + kPi).half_breadth;
  CHECK(m.wall_thickness_min.value >= 0.3 * first / shell.scene.law.half_breadth * 0.99);

  plan.constant_wall = true;
  plan.wall_mm = 0.1;
  CHECK(measured(test::Shell(plan)).wall_thickness_min.value >= 0.1 * 0.99);
}

TEST_CASE("the mass is the wall's volume times the mineral's published density", "[measure]") {
  // 2.93 g/cm3: SSHADE database, mineral record Aragonite; 2.7102: Handbook of Mineralogy, sheet Calcite (C28e, C28a).
  CHECK(specimen::mineral_density(specimen::Mineral::kAragonite) == Approx(2.93).margin(0.02));
  CHECK(specimen::mineral_density(specimen::Mineral::kCalcite) == Approx(2.7102).margin(0.0005));
  const measure::Measurements m = measured(test::Shell(test::tall_plan()));
  CHECK(m.mass_g.value == Approx(m.wall_volume.value * 1e-3 * 2.93));
}
