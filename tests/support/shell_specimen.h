// SPDX-License-Identifier: Apache-2.0
// Shells for tests of the geometry: stated in a few numbers, compiled, and made ready for points and rays.
#pragma once

#include "compile/compile.h"
#include "field/field.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

#include <functional>
#include <string>
#include <vector>

namespace whorl::test {

/// What a test states of a shell; the rest stands at the scene file's defaults.
struct ShellPlan {
  std::string name;
  double whorls = 5.0, start = 0.75;
  specimen::Stages W{{0.0, 1.8}};
  double D = 0.05, T = 2.0;
  specimen::Stages W_distance, W_depth, W_section;  // empty: W
  double S = 1.0, roll_deg = 0.0;
  struct Lobe {
    double at_deg, reach, width_deg;
  };
  std::vector<Lobe> lobes;
  specimen::SizeKind size_kind = specimen::SizeKind::kShellHeight;
  double size_mm = 20.0;
  double wall_mm = 0.4;
  bool constant_wall = false;
  double columella = 0.0;
  double inclination_deg = 0.0;
  double lip_mm = 0.0;  // 0: as thick as the wall
  struct Lamp {
    double behind_lip, radius_mm;
  };
  std::vector<Lamp> lamps;
};

specimen::Specimen specimen_of(const ShellPlan& plan);

/// A compiled shell that keeps scene and field together. `prepare` may add to the scene before the field sees it.
struct Shell {
  explicit Shell(const ShellPlan& shell_plan, const std::function<void(scene::Scene&)>& prepare = {});
  Shell(const Shell&) = delete;
  Shell& operator=(const Shell&) = delete;

  ShellPlan plan;
  scene::Scene scene;
  field::Field field;

  double height() const { return scene.height_mm; }
  field::State at(const Vec3& p) const { return field.place_at(p).state; }
};

/// The three shapes that rays are tried on: tall with a columella, globose with an open umbilicus, planispiral with whorls
/// that clasp one another.
ShellPlan tall_plan();
ShellPlan globose_plan();
ShellPlan planispiral_plan();
/// Keel and groove, expansion by stages with depth and section of their own, constant wall, a leaning section and lip.
ShellPlan ornate_plan();
/// One expansion, strictly self-similar but for its two ends.
ShellPlan self_similar_plan();

/// Point of the half-plane at a growth angle, in space.
inline Vec3 in_space(double theta, growth::HalfPlanePoint p) {
  return {p.rho * std::cos(theta), p.rho * std::sin(theta), p.z};
}
/// Point of the tube at a growth angle, a section angle and a distance from the centre in section coordinates.
inline Vec3 in_tube(const growth::CoilingLaw& law, double theta, double psi, double reach) {
  return in_space(theta, law.to_half_plane(law.at(theta), {reach * std::cos(psi), reach * std::sin(psi)}));
}

}  // namespace whorl::test
