// SPDX-License-Identifier: Apache-2.0
// Specimens from plans, and the shapes that several tests share.
#include "support/shell_specimen.h"

namespace whorl::test {

specimen::Specimen specimen_of(const ShellPlan& plan) {
  specimen::Specimen s;
  s.source = plan.name;
  s.identity.name.value = plan.name;
  s.growth.whorls.value = plan.whorls;
  s.growth.start.value = plan.start;
  s.growth.W.value = plan.W;
  s.growth.D.value = plan.D;
  s.growth.T.value = plan.T;
  const auto own = [](const specimen::Stages& stages, std::optional<specimen::Stated<specimen::Stages>>& out) {
    if (!stages.empty()) out = specimen::Stated<specimen::Stages>{stages, {}, true};
  };
  own(plan.W_distance, s.growth.W_distance);
  own(plan.W_depth, s.growth.W_depth);
  own(plan.W_section, s.growth.W_section);
  s.section.S.value = plan.S;
  s.section.roll_deg.value = plan.roll_deg;
  for (const ShellPlan::Lobe& lobe : plan.lobes) {
    specimen::Lobe stated;
    stated.at_deg.value = lobe.at_deg;
    stated.reach.value = lobe.reach;
    stated.width_deg.value = lobe.width_deg;
    s.section.lobes.push_back(stated);
  }
  s.size.kind.value = plan.size_kind;
  s.size.mm.value = plan.size_mm;
  s.wall.thickness_mm.value = plan.wall_mm;
  s.wall.growth.value = plan.constant_wall ? specimen::WallGrowth::kConstant : specimen::WallGrowth::kProportional;
  s.wall.columella.value = plan.columella;
  s.lip.inclination_deg.value = plan.inclination_deg;
  s.lip.thickness_mm.value = plan.lip_mm > 0.0 ? plan.lip_mm : plan.wall_mm;
  for (const ShellPlan::Lamp& lamp : plan.lamps) {
    specimen::Lamp stated;
    stated.behind_lip.value = lamp.behind_lip;
    stated.radius_mm.value = lamp.radius_mm;
    stated.strength.value = 40.0;
    stated.temperature_k.value = 3200.0;
    s.lamps.push_back(stated);
  }
  return s;
}

namespace {

scene::Scene prepared(const ShellPlan& plan, const std::function<void(scene::Scene&)>& prepare) {
  scene::Scene scene = compile::compile_scene(specimen_of(plan));
  if (prepare) prepare(scene);
  return scene;
}

}  // namespace

Shell::Shell(const ShellPlan& shell_plan, const std::function<void(scene::Scene&)>& prepare)
    : plan(shell_plan), scene(prepared(shell_plan, prepare)), field(scene) {}

ShellPlan tall_plan() {
  ShellPlan p;
  p.name = "tall";
  p.whorls = 8.0;
  p.W = {{0.0, 1.35}};
  p.D = 0.05;
  p.T = 4.2;
  p.S = 1.1;
  p.roll_deg = 4.0;
  p.size_mm = 32.0;
  p.wall_mm = 0.35;
  p.columella = 0.18;
  p.inclination_deg = 10.0;
  p.lip_mm = 0.5;
  return p;
}

ShellPlan globose_plan() {
  ShellPlan p;
  p.name = "globose";
  p.whorls = 4.75;
  p.W = {{0.0, 1.9}};
  p.D = 0.2;
  p.T = 1.15;
  p.S = 1.05;
  p.size_kind = specimen::SizeKind::kShellWidth;
  p.size_mm = 22.0;
  p.inclination_deg = 14.0;
  p.lip_mm = 0.7;
  return p;
}

ShellPlan planispiral_plan() {
  ShellPlan p;
  p.name = "planispiral";
  p.whorls = 4.5;
  p.W = {{0.0, 2.2}};
  p.D = 0.1;
  p.T = 0.0;
  p.S = 0.85;
  p.size_kind = specimen::SizeKind::kShellWidth;
  p.size_mm = 64.0;
  p.wall_mm = 0.9;
  return p;
}

ShellPlan ornate_plan() {
  ShellPlan p;
  p.name = "ornate";
  p.whorls = 5.5;
  p.W = {{1.0, 1.8}, {3.0, 1.5}, {5.0, 1.65}};
  p.W_depth = {{1.0, 1.9}, {5.0, 1.6}};
  p.W_section = {{0.0, 1.6}};
  p.D = 0.1;
  p.T = 2.2;
  p.S = 1.2;
  p.roll_deg = 12.0;
  p.lobes = {{60.0, 0.15, 30.0}, {-20.0, -0.1, 25.0}};
  p.constant_wall = true;
  p.wall_mm = 0.3;
  p.columella = 0.15;
  p.inclination_deg = -20.0;
  p.lip_mm = 0.6;
  return p;
}

ShellPlan self_similar_plan() {
  ShellPlan p;
  p.name = "self-similar";
  p.whorls = 7.0;
  p.start = 0.5;
  p.W = {{0.0, 1.5}};
  p.D = 0.04;
  p.T = 2.4;
  p.S = 1.15;
  p.roll_deg = 6.0;
  p.columella = 0.15;
  return p;
}

}  // namespace whorl::test
