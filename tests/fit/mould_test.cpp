// SPDX-License-Identifier: Apache-2.0
// Internal moulds: a known shell, its lumen measured, the shell found again from that and the wall alone.
#include "fit/mould.h"

#include "compile/compile.h"
#include "fit/fit.h"
#include "fit/scene_text.h"
#include "growth/extents.h"
#include "math/sobol.h"
#include "measure/integrals.h"
#include "measure/measurements.h"
#include "measure/whorl_section.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/shell_specimen.h"
#include "trace/mould_solid.h"

#include <cmath>

using namespace whorl;
using specimen::Definition;
using specimen::GrowthStage;

namespace {

test::ShellPlan walled(double T) {
  test::ShellPlan plan;
  plan.name = "walled";
  plan.whorls = 5.0;
  plan.W = {{0.0, 1.9}};
  plan.D = 0.25;
  plan.T = T;
  plan.S = 1.25;
  plan.size_kind = specimen::SizeKind::kShellWidth;
  plan.size_mm = 30.0;
  plan.wall_mm = 0.9;
  return plan;
}

void add(specimen::MeasuredSpecimen& measured, Definition definition, double value, double behind) {
  specimen::Reading reading;
  reading.definition = definition;
  if (behind > 0.0) reading.stage = {GrowthStage::Kind::kBehindLip, behind};
  reading.value = value;
  reading.step = 0.01;
  reading.standard_error = 0.01 / std::sqrt(12.0);
  measured.readings.push_back(reading);
}

// Readings on the lumen of the solid, as calipers on its mould would give them.
specimen::MeasuredSpecimen measured_mould(const test::Shell& shell) {
  specimen::MeasuredSpecimen measured;
  measured.identity.name.value = "mould";
  measured.mould = true;
  measured.mould_wall = specimen::Stated<double>{shell.plan.wall_mm, {}, true};
  measured.held.whorls = shell.plan.whorls;
  measured.held.T = shell.plan.T == 0.0 ? std::optional(0.0) : std::nullopt;
  for (const double behind : {0.0, 0.5, 1.0}) {
    const double theta = shell.scene.law.theta_lip - kTwoPi * behind;
    const auto now = measure::lumen_section(shell.field, theta), half = measure::lumen_section(shell.field, theta - kPi);
    const auto before = measure::lumen_section(shell.field, theta - kTwoPi);
    add(measured, Definition::kDiameterSumOfRadii, now.rho_max + half.rho_max, behind);
    add(measured, Definition::kWhorlHeightMargin, now.rho_max - now.rho_min, behind);
    add(measured, Definition::kWhorlWidthAlongAxis, now.z_max - now.z_min, behind);
    if (behind == 0.0 && shell.plan.T > 0.0) {
      specimen::Reading angle;
      angle.definition = Definition::kPleuralAngleLastTwo;
      angle.value = 2.0 * degrees(measure::touching_angle(now, before));
      angle.step = 0.1;
      angle.standard_error = 0.03;
      measured.readings.push_back(angle);
    }
  }
  return measured;
}

}  // namespace

TEST_CASE("from the mould of a known shell and its wall the shell's outer size comes back, and its lumen measures what was read", "[fit][mould]") {
  for (const double T : {0.0, 1.6}) {
    CAPTURE(T);
    const test::Shell shell(walled(T));
    const specimen::MeasuredSpecimen measured = measured_mould(shell);
    const fit::Fit fit = fit::fit_specimen(measured);
    REQUIRE(fit.verdict == fit::Verdict::kFits);
    const specimen::Specimen written = specimen::parse_scene(fit::scene_text(fit, measured, "mould.toml"), "fitted");
    const scene::Scene scene = compile::compile_scene(written);
    const field::Field field(scene);
    const auto points = growth::surface_points(compile::exterior_of(scene), 720, 256);
    CHECK(growth::width_of(points) == Approx(30.0).epsilon(0.001));
    CHECK(growth::height_of(points) == Approx(shell.height()).epsilon(0.002));
    CHECK(written.growth.D == Approx(0.25).margin(0.002));
    CHECK(written.section.S == Approx(1.25).epsilon(0.002));
    CHECK(written.wall.thickness_mm == Approx(0.9));
    for (const double behind : {0.0, 0.7, 2.0}) {
      const double theta = scene.law.theta_lip - kTwoPi * behind;
      const auto found = measure::lumen_section(field, theta), known = measure::lumen_section(shell.field, theta);
      const double size = known.rho_max;
      CHECK(found.rho_max == Approx(known.rho_max).margin(0.001 * size));
      CHECK(found.rho_min == Approx(known.rho_min).margin(0.001 * size));
      CHECK(found.z_max - found.z_min == Approx(known.z_max - known.z_min).margin(0.001 * size));
    }
    // Nothing of the outside was seen.
    REQUIRE_FALSE(written.preserved.empty());
    for (const specimen::Preserved& stretch : written.preserved) CHECK(stretch.parts == specimen::PreservedParts::kInside);
  }
}

TEST_CASE("the wall between mould and shell has its thickness across the section, along the surface's normal in space", "[fit][mould]") {
  // A circular section far from the axis that hardly grows: the shell's section is the circle that is larger by the wall.
  fit::Values mould{};
  fit::at(mould, fit::Parameter::kSize) = std::log(100.0);
  fit::at(mould, fit::Parameter::kWhorls) = 6.0;
  fit::at(mould, fit::Parameter::kW) = 0.01;
  fit::at(mould, fit::Parameter::kD) = 0.9;
  fit::Fixed fixed;
  fixed.mould = true;
  fixed.wall_mm = 0.5;
  const auto shell = fit::shell_round(mould, fixed);
  REQUIRE(shell);
  const auto inner = fit::form_of(mould, fixed), outer = fit::form_of(*shell, fixed);
  REQUIRE((inner && outer));
  CHECK(outer->law.half_breadth == Approx(inner->law.half_breadth + 0.5).margin(1e-4));
  CHECK(outer->law.distance == Approx(inner->law.distance).margin(1e-4));
  CHECK(outer->law.S == Approx(1.0).margin(1e-4));
  fixed.wall_mm = 20.0;  // reaches beyond the axis by more than a shell can
  fit::at(mould, fit::Parameter::kD) = 0.0;
  fit::at(mould, fit::Parameter::kSize) = std::log(10.0);
  CHECK_FALSE(fit::shell_round(mould, fixed));
}

TEST_CASE("the mould's volume, met by rays as a solid, is the lumen's volume as it is measured", "[fit][mould]") {
  const test::Shell shell(walled(1.6));
  const trace::EmbreeSolid solid(shell.field, {2e-5 * shell.height(), false});
  const measure::Integrals known = measure::integrate(solid, {1 << 17, 1});
  const trace::MouldSolid mould(solid);
  // Parallel rays on a grid: each finds where the mould begins, and from behind where it ends; stretches between are asked of one
  // after another, so that only `closest` and its normals are used.
  const Box3& box = shell.scene.bounds;
  constexpr int kGrid = 160;
  const double dx = (box.max.x - box.min.x) / kGrid, dy = (box.max.y - box.min.y) / kGrid;
  double volume = 0.0;
  int facing = 0, met = 0;
  for (int i = 0; i < kGrid; ++i)
    for (int j = 0; j < kGrid; ++j) {
      const double x = box.min.x + (i + 0.5) * dx, y = box.min.y + (j + 0.5) * dy;
      double z = box.min.z - 1.0;
      for (int k = 0; k < 40; ++k) {
        trace::Hit in, out;
        trace::Ray down{Vec3f(Vec3(x, y, z)), Vec3f(0, 0, 1)};
        if (!mould.closest(down, in)) break;
        ++met;
        facing += in.normal.z < 0.0f && in.part == trace::Part::kMould;
        // The end of this stretch: the lumen's state changes there; found by steps and halving on the field.
        double lo = static_cast<double>(in.position.z) + 1e-4, hi = lo;
        while (shell.at({x, y, hi}) == field::State::kLumen && hi < box.max.z) hi += 0.02;
        lo = std::max(lo, hi - 0.02);
        for (int h = 0; h < 20; ++h) {
          const double mid = 0.5 * (lo + hi);
          (shell.at({x, y, mid}) == field::State::kLumen ? lo : hi) = mid;
        }
        volume += (lo - static_cast<double>(in.position.z)) * dx * dy;
        z = hi + 1e-3;
      }
    }
  CHECK(met > 5000);
  CHECK(facing >= met - met / 500);
  CHECK(volume == Approx(known.lumen_volume.value).epsilon(0.01));
}

TEST_CASE("the mould within the shell cut open shows shell behind the cut and mould before it", "[fit][mould]") {
  const test::Shell shell(walled(1.6));
  const trace::EmbreeSolid solid(shell.field, {2e-5 * shell.height(), false});
  const Vec3 to_reader(1.0, 0.0, 0.0);
  const trace::UnitedSolid all(solid, nullptr);
  const trace::MouldSolid both(all, to_reader), alone(solid);
  int mould = 0, cut = 0, wrong = 0;
  const Box3& box = shell.scene.bounds;
  for (int i = 0; i < 80; ++i)
    for (int j = 0; j < 80; ++j) {
      const double y = box.min.y + (box.max.y - box.min.y) * (i + 0.5) / 80.0, z = box.min.z + (box.max.z - box.min.z) * (j + 0.5) / 80.0;
      const trace::Ray ray{Vec3f(Vec3(100.0, y, z)), Vec3f(-to_reader)};
      trace::Hit hit, of_mould;
      if (!both.closest(ray, hit)) continue;
      CHECK(both.occluded(ray));
      const bool first = alone.closest(ray, of_mould) && of_mould.t <= hit.t;
      if (hit.part == trace::Part::kMould) ++mould, wrong += !first;
      else wrong += hit.position.x > 1e-3f;
      cut += hit.part == trace::Part::kCutFace;
    }
  CHECK(mould > 500);
  CHECK(cut > 50);
  CHECK(wrong == 0);
}
