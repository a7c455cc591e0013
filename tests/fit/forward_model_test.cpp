// SPDX-License-Identifier: Apache-2.0
// What the forward model predicts is what the solid measures.
#include "support/catch.h"

#include "fit/extents.h"
#include "fit/predict.h"
#include "fit/whorl_ellipse.h"
#include "growth/extents.h"
#include "measure/measurements.h"
#include "measure/mouth.h"
#include "measure/support.h"
#include "measure/whorl_section.h"
#include "support/shell_oracle.h"
#include "support/shell_specimen.h"

using namespace whorl;
using specimen::Definition;
using specimen::GrowthStage;

namespace {

test::ShellPlan plain(test::ShellPlan plan) {
  plan.lobes.clear();
  plan.columella = 0.0;
  return plan;
}

// Four shapes: tall, globose with an open umbilicus, planispiral with overlap, and one whose parts expand differently.
std::vector<test::ShellPlan> shapes() {
  test::ShellPlan changing = plain(test::globose_plan());
  changing.name = "changing";
  changing.W = {{0.75, 2.0}, {changing.whorls, 1.7}};
  changing.W_distance = {{0.0, 1.85}};
  changing.inclination_deg = 8.0;
  return {plain(test::tall_plan()), plain(test::globose_plan()), plain(test::planispiral_plan()), changing};
}

fit::Form form_of(const test::Shell& shell) {
  return {shell.scene.law, shell.scene.front.tan_inclination, shell.plan.wall_mm, shell.plan.lip_mm};
}

}  // namespace

TEST_CASE("every prediction of the forward model agrees with the solid within 0.1 %", "[fit]") {
  for (const test::ShellPlan& plan : shapes()) {
    CAPTURE(plan.name);
    const test::Shell shell(plan);
    const fit::Form form = form_of(shell);
    const trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
    const auto agrees = [&](Definition definition, double on_solid, GrowthStage stage = {}) {
      CAPTURE(specimen::written_definition(definition), on_solid);
      CHECK(fit::predict(form, definition, stage) == Approx(on_solid).epsilon(0.001));
    };
    const double height = measure::support(solid, {0, 0, 1}, 192) + measure::support(solid, {0, 0, -1}, 192);
    agrees(Definition::kShellHeightAxial, height);
    agrees(Definition::kShellWidthAcross, measure::width_across_axis(solid));
    const measure::MouthExtent mouth = measure::mouth_extent(shell.field);
    agrees(Definition::kApertureHeightAxial, mouth.height);
    agrees(Definition::kApertureWidthAcross, mouth.width);
    // Differences of heights: within 0.1 % of the height.
    const auto differs_as = [&](Definition definition, double on_solid) {
      CAPTURE(specimen::written_definition(definition), on_solid);
      CHECK(fit::predict(form, definition, {}) == Approx(on_solid).margin(0.001 * height));
    };
    differs_as(Definition::kSpireHeightLessAperture, height - mouth.height);
    double suture;
    if (measure::suture_depth(solid, suture)) {
      const double last = measure::support(solid, {0, 0, 1}, 192) - suture;
      agrees(Definition::kLastWhorlHeightFlank, last);
      differs_as(Definition::kSpireHeightLessLastWhorl, height - last);
    } else {
      CHECK(std::isnan(fit::predict(form, Definition::kLastWhorlHeightFlank, {})));
    }
    for (const double behind : {0.0, 0.4}) {
      const GrowthStage stage{GrowthStage::Kind::kBehindLip, behind};
      const double theta = shell.scene.law.theta_lip - kTwoPi * behind;
      const auto now = measure::whorl_section(shell.field, theta), half = measure::whorl_section(shell.field, theta - kPi),
                 before = measure::whorl_section(shell.field, theta - kTwoPi);
      agrees(Definition::kDiameterSumOfRadii, now.rho_max + half.rho_max, stage);
      agrees(Definition::kWhorlHeightMargin, now.rho_max - now.rho_min, stage);
      agrees(Definition::kWhorlWidthAlongAxis, now.z_max - now.z_min, stage);
      agrees(Definition::kUmbilicusMargins, now.rho_min + half.rho_min, stage);
      agrees(Definition::kAperturalHeightVenters, now.rho_max - before.rho_max, stage);
      if (behind == 0.0) agrees(Definition::kPleuralAngleLastTwo, 2.0 * degrees(measure::touching_angle(now, before)));
    }
  }
}

TEST_CASE("the forward model's extents are those of a plain search on the outlines", "[fit]") {
  auto plans = shapes();
  test::ShellPlan leaning = plain(test::tall_plan());  // a lip that leans far, and whorls that reach past the axis
  leaning.name = "leaning";
  leaning.inclination_deg = 25.0;
  leaning.D = 0.0;
  plans.push_back(leaning);
  for (const test::ShellPlan& plan : plans) {
    CAPTURE(plan.name);
    const growth::CoilingLaw law = growth::coiling_law(test::specimen_of(plan).growth, test::specimen_of(plan).section);
    const fit::Form form{law, std::tan(radians(plan.inclination_deg)), 0.0, 0.0};
    const growth::Exterior exterior{law, PeriodicSpline(1.0), form.tan_inclination};
    CHECK(fit::shell_height(form, law.theta_lip) == Approx(test::searched_height(exterior)).epsilon(1e-5));
    CHECK(fit::shell_width(form, law.theta_lip) == Approx(test::searched_width(exterior)).epsilon(1e-5));
    const test::MouthExtents searched = test::searched_mouth(exterior);
    const auto mouth = fit::mouth_extents(form, law.theta_lip, true);
    REQUIRE(mouth);
    CHECK(mouth->height == Approx(searched.height).epsilon(1e-4));
    CHECK(mouth->width == Approx(searched.width).epsilon(1e-4));
    CHECK(mouth->longest >= std::max(mouth->height, mouth->width) * (1.0 - 1e-9));
  }
}

TEST_CASE("conch ratios of a planispiral shell follow the closed forms", "[fit]") {
  // check_values C16a to C16i: W, D -> ah/dm, wh/dm, uw/dm for T = 0.
  struct Row {
    double W, D, ah, wh, uw;
  };
  const Row row = GENERATE(Row{2.0, 0.3, 0.292893, 0.410051, 0.3}, Row{2.25, 0.4, 0.333333, 0.36, 0.4},
                           Row{3.0, 0.05, 0.422650, 0.602276, 0.05});
  test::ShellPlan plan;
  plan.W = {{0.0, row.W}};
  plan.D = row.D;
  plan.T = 0.0;
  const auto stated = test::specimen_of(plan);
  const fit::Form form{growth::coiling_law(stated.growth, stated.section), 0.0, 0.0, 0.0};
  const double dm = fit::predict(form, Definition::kDiameterSumOfRadii, {});
  CHECK(fit::predict(form, Definition::kAperturalHeightVenters, {}) / dm == Approx(row.ah).margin(1e-6));
  CHECK(fit::predict(form, Definition::kWhorlHeightMargin, {}) / dm == Approx(row.wh).margin(1e-6));
  CHECK(fit::predict(form, Definition::kUmbilicusMargins, {}) / dm == Approx(row.uw).margin(1e-6));
}

TEST_CASE("the enveloping cone of circular sections has the closed form's angle", "[fit]") {
  // check_values C23a to C23d: semi-angles for any W.
  struct Row {
    double T, D, semi_angle;
  };
  const Row row = GENERATE(Row{1.5, 0.3, 51.0687}, Row{6.0, 0.1, 17.1925}, Row{0.5, 0.0, 126.8699}, Row{0.0, 0.3, 122.5790});
  test::ShellPlan plan;
  plan.W = {{0.0, 1.7}};
  plan.D = row.D;
  plan.T = row.T;
  const auto stated = test::specimen_of(plan);
  const fit::Form form{growth::coiling_law(stated.growth, stated.section), 0.0, 0.0, 0.0};
  CHECK(0.5 * fit::predict(form, Definition::kPleuralAngleLastTwo, {}) == Approx(row.semi_angle).margin(1e-4));
}

TEST_CASE("sutural angle, spire angle and expansion obey the relation of a regular spire", "[fit]") {
  // W = (sin(sigma) / sin(sigma + A))^2, check_values C15a and C15b: in side view a suture's crossings lie at apex
  // distances L and L / sqrt(W).
  for (const double W : {1.15, 1.28, 1.6}) {
    test::ShellPlan plan;
    plan.whorls = 9.0;
    plan.W = {{0.0, W}};
    plan.D = 0.02;
    plan.T = 6.0;
    plan.S = 1.6;
    const auto stated = test::specimen_of(plan);
    const fit::Form form{growth::coiling_law(stated.growth, stated.section), 0.0, 0.0, 0.0};
    const double sigma = radians(fit::predict(form, Definition::kSuturalAngleChord, {}));
    const double A = radians(fit::predict(form, Definition::kSpireAngleSutures, {}));
    const double ratio = std::sin(sigma) / std::sin(sigma + A);
    CHECK(ratio * ratio == Approx(W).epsilon(1e-9));
  }
}
