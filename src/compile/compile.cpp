// SPDX-License-Identifier: Apache-2.0
// Solves the stated size and puts the compiled scene together.
#include "compile/compile.h"

#include "compile/attached.h"
#include "compile/axis.h"
#include "compile/edge_patterns.h"
#include "compile/encrusters.h"
#include "compile/lamps.h"
#include "compile/mouth.h"
#include "compile/sculpture.h"
#include "compile/tube.h"

#include <fmt/format.h>

namespace whorl::compile {
namespace {

constexpr int kTurnSteps = 720, kAround = 512;  // sampling of the outline where a size is solved: errors under 1e-5
constexpr int kSizeRounds = 4;                  // each leaves a share of the error that is the sculpture's of the size
constexpr double kLeastReach = 0.1;             // of the plain ellipse: deeper grooves would meet at the centre
constexpr double kSmallestWhorl = 1e-3;         // of the last one's half-breadth: smaller ones can't be drawn

double unit_size(specimen::SizeKind kind, const growth::Exterior& shell) {
  switch (kind) {
    case specimen::SizeKind::kShellHeight: return growth::height_of(growth::surface_points(shell, kTurnSteps, kAround));
    case specimen::SizeKind::kShellWidth: return growth::width_of(growth::surface_points(shell, kTurnSteps, kAround));
    case specimen::SizeKind::kApertureHeight: return growth::mouth(shell).height;
    case specimen::SizeKind::kApertureWidth: return growth::mouth(shell).width;
  }
  return 0.0;
}

// Whorls too small to be drawn are left to the embryonic cap.
bool raise_start(growth::CoilingLaw& law) {
  if (law.by_section.factor(law.theta_start) >= kSmallestWhorl) return false;
  double lo = law.theta_start, hi = law.theta_lip;
  for (int i = 0; i < 80; ++i) {
    const double mid = 0.5 * (lo + hi);
    (law.by_section.factor(mid) < kSmallestWhorl ? lo : hi) = mid;
  }
  law.theta_start = hi;
  return true;
}

Box3 bounds_of(const scene::Scene& scene, const growth::Exterior& shell) {
  Box3 box;
  for (const Vec3& p : growth::surface_points(shell, 180, 128)) box.extendBy(p);
  if (scene.pillar.present) {
    box.extendBy(Vec3(0.0, 0.0, scene.pillar.bottom_z));
    box.extendBy(Vec3(0.0, 0.0, scene.pillar.top_z));
  }
  for (const scene::Ellipsoid& e : scene.ellipsoids) {
    double reach = 0.0;  // the unit ball's image lies within the largest inverse row scale; rows are scaled unit vectors
    for (const Vec3& row : e.to_unit) reach = std::max(reach, 1.0 / row.length());
    box.extendBy(e.centre - Vec3(reach));
    box.extendBy(e.centre + Vec3(reach));
  }
  const double room = 2.0 * scene.front.rim_radius + scene.sculpture.extremes().hi * scene.law.half_breadth + 0.01 * (box.max - box.min).length();
  return {box.min - Vec3(room), box.max + Vec3(room)};
}

}  // namespace

growth::Exterior exterior_of(const scene::Scene& scene) {
  return {scene.law, scene.outlines[scene.stations.front().outer].reach, scene.front.tan_inclination, scene.sculpture};
}

scene::Scene compile_scene(const specimen::Specimen& specimen) {
  Faults faults;
  scene::Scene scene;
  const PeriodicSpline reach = growth::outer_reach(specimen.section.lobes);
  if (reach.bounds().lo < kLeastReach) {
    for (const specimen::Lobe& lobe : specimen.section.lobes)
      if (lobe.reach < 0.0)
        faults.add(lobe.reach.where,
                   fmt::format("[[section.lobe]] reach = {:g}: with the other lobes the groove leaves under {:g} of the "
                               "section's radius; give a shallower groove",
                               lobe.reach.value, kLeastReach));
    faults.raise(specimen.source);
  }

  growth::CoilingLaw law = growth::coiling_law(specimen.growth, specimen.section);
  scene.start_raised = raise_start(law);
  const double tan_inclination = std::tan(radians(specimen.lip.inclination_deg));
  growth::Exterior unit_shell{law, reach, tan_inclination, {}};
  double factor = specimen.size.mm / unit_size(specimen.size.kind, unit_shell);
  // Shells are measured over their sculpture, whose heights are stated in mm: the size is found in rounds.
  const bool over_sculpture =
      specimen.size.kind == specimen::SizeKind::kShellHeight || specimen.size.kind == specimen::SizeKind::kShellWidth;
  for (int round = 0; round < kSizeRounds && over_sculpture; ++round) {
    unit_shell.sculpture = sculpture_of(specimen, law, factor * law.half_breadth);
    if (unit_shell.sculpture.empty()) break;
    factor = specimen.size.mm / unit_size(specimen.size.kind, unit_shell);
  }
  scene.law = growth::scaled(law, factor);
  scene.front = {tan_inclination, std::cos(radians(specimen.lip.inclination_deg)), 0.5 * specimen.lip.thickness_mm};
  scene.wall = {specimen.wall.thickness_mm, specimen.lip.thickness_mm,
                specimen.wall.growth == specimen::WallGrowth::kProportional, tan_inclination};

  build_tube(scene, reach, specimen.wall.thickness_mm.where, specimen.lip.thickness_mm.where, faults);
  if (!faults.any()) build_sculpture(scene, specimen, faults);
  if (!faults.any()) build_axis(scene, specimen, reach, faults);
  if (!faults.any()) build_lamps(scene, specimen, faults);
  if (!faults.any()) build_edge_patterns(scene, specimen, reach, faults);
  faults.raise(specimen.source);
  const growth::Exterior shell = exterior_of(scene);
  build_attached(scene, specimen, shell, faults);
  build_encrusters(scene, specimen, shell, faults);
  faults.raise(specimen.source);

  scene.mouth = mouth_of(scene);
  scene.height_mm = growth::height_of(growth::surface_points(shell, 180, 128));
  scene.bounds = bounds_of(scene, shell);
  return scene;
}

}  // namespace whorl::compile
