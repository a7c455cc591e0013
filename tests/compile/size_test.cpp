// SPDX-License-Identifier: Apache-2.0
// The stated size is met on the law.
#include "compile/compile.h"

#include "support/catch.h"
#include "support/shell_oracle.h"
#include "support/shell_specimen.h"

using namespace whorl;
using specimen::SizeKind;

namespace {

double searched(SizeKind kind, const growth::Exterior& shell) {
  switch (kind) {
    case SizeKind::kShellHeight: return test::searched_height(shell);
    case SizeKind::kShellWidth: return test::searched_width(shell);
    case SizeKind::kApertureHeight: return test::searched_mouth(shell).height;
    case SizeKind::kApertureWidth: return test::searched_mouth(shell).width;
  }
  return 0.0;
}

}  // namespace

TEST_CASE("The stated size is the law's own, of each kind", "[compile]") {
  test::ShellPlan crossing = test::self_similar_plan(), open = test::globose_plan();
  crossing.D = -0.2;
  crossing.columella = 0.4;
  crossing.inclination_deg = 20.0;
  open.D = 0.55;
  open.W = {{0.0, 3.0}};
  open.whorls = 2.3;
  test::ShellPlan tall = test::tall_plan(), ornate = test::ornate_plan();
  tall.whorls = crossing.whorls = ornate.whorls = 4.0;
  for (test::ShellPlan plan : {tall, test::planispiral_plan(), ornate, crossing, open})
    for (const SizeKind kind :
         {SizeKind::kShellHeight, SizeKind::kShellWidth, SizeKind::kApertureHeight, SizeKind::kApertureWidth}) {
      plan.size_kind = kind;
      plan.size_mm = 17.3;
      plan.wall_mm = 0.05;
      plan.lip_mm = 0.0;
      CAPTURE(plan.name, plan.D, static_cast<int>(kind));
      const scene::Scene scene = compile::compile_scene(test::specimen_of(plan));
      CHECK(searched(kind, compile::exterior_of(scene)) == Approx(17.3).epsilon(2e-5));
    }
}

TEST_CASE("A planispiral is as wide and its mouth as high as the closed forms say", "[compile]") {
  // T = 0, circular section, whorls that only touch (W = 1/D): outside R, D R inside, mouth from R/W to R and 2 r high
  // (shell-geometry 1.4).
  test::ShellPlan plan = test::planispiral_plan();
  plan.D = 0.4;
  plan.W = {{0.0, 2.5}};
  plan.S = 1.0;
  plan.size_kind = SizeKind::kApertureWidth;
  plan.size_mm = 12.0;
  const growth::CoilingLaw by_width = compile::compile_scene(test::specimen_of(plan)).law;
  const double R = by_width.distance + by_width.half_breadth;
  CHECK(R * (1.0 - 1.0 / 2.5) == Approx(12.0).epsilon(2e-5));
  plan.size_kind = SizeKind::kApertureHeight;
  CHECK(2.0 * compile::compile_scene(test::specimen_of(plan)).law.half_breadth == Approx(12.0).epsilon(2e-5));
  plan.size_kind = SizeKind::kShellHeight;
  CHECK(2.0 * compile::compile_scene(test::specimen_of(plan)).law.half_breadth == Approx(12.0).epsilon(2e-5));
}

TEST_CASE("A compiled shell's bounds hold all that is not air", "[compile]") {
  for (const test::ShellPlan& plan : {test::tall_plan(), test::globose_plan(), test::planispiral_plan(), test::ornate_plan()}) {
    const test::Shell shell(plan);
    const Box3& box = shell.scene.bounds;
    const Vec3 size = box.max - box.min;
    CAPTURE(plan.name);
    // The six faces and a shell of space around them are air.
    bool air = true;
    for (int i = 0; i < 60000; ++i) {
      const double u = std::fmod(i * 0.7548776662466927, 1.0), v = std::fmod(i * 0.5698402909980532, 1.0);
      const double out = 0.3 * std::fmod(i * 0.4147, 1.0);
      const int axis = i % 3;
      Vec3 p;
      p[axis] = i / 3 % 2 == 0 ? box.min[axis] - out * size[axis] : box.max[axis] + out * size[axis];
      p[(axis + 1) % 3] = box.min[(axis + 1) % 3] + (1.4 * u - 0.2) * size[(axis + 1) % 3];
      p[(axis + 2) % 3] = box.min[(axis + 2) % 3] + (1.4 * v - 0.2) * size[(axis + 2) % 3];
      air = air && shell.at(p) == field::State::kOutside;
    }
    CHECK(air);
  }
}
