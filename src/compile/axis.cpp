// SPDX-License-Identifier: Apache-2.0
// The embryonic shell and the columella.
#include "compile/axis.h"

#include "growth/extents.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::compile {
namespace {

// How far the section reaches beyond the axis, in half-breadths, and how far towards the base it does so.
struct Crossing {
  double beyond = 0.0, lowest = 0.0;
};

Crossing crossing_at(const growth::CoilingLaw& law, double theta, const PeriodicSpline& reach) {
  constexpr int kSamples = 720;
  const growth::Station s = law.at(theta);
  Crossing crossing{0.0, -1e300};
  for (int i = 0; i < kSamples; ++i) {
    const double psi = kTwoPi * i / kSamples, R = reach.value(psi);
    const growth::HalfPlanePoint p = law.to_half_plane(s, {R * std::cos(psi), R * std::sin(psi)});
    if (p.rho < 0.0) {
      crossing.beyond = std::max(crossing.beyond, -p.rho / s.half_breadth);
      crossing.lowest = std::max(crossing.lowest, p.z);
    }
  }
  return crossing;
}

// Growth angle at which the section's centre lies at depth z; depth grows with growth.
double theta_at_depth(const growth::CoilingLaw& law, double z) {
  double lo = law.theta_start - 4.0 * kPi, hi = law.theta_lip + kTwoPi;
  for (int i = 0; i < 80; ++i) {
    const double mid = 0.5 * (lo + hi);
    (law.at(mid).depth < z ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi);
}

void build_pillar(scene::Scene& scene, double columella, const Crossing& at_lip) {
  const growth::CoilingLaw& law = scene.law;
  const scene::Chamber& chamber = scene.chamber;
  scene::Pillar& pillar = scene.pillar;
  pillar.present = true;
  const double r = law.half_breadth;
  // Tip inside the embryonic shell; at the base it ends in a dome beside the last section's inner side.
  constexpr double kBelowCentre = 0.2, kDome = 2.2;
  const double tip = chamber.centre_z + 0.3 * chamber.half_height;
  const double full_from = chamber.centre_z + 0.9 * chamber.half_height;
  double end = law.depth + kBelowCentre * law.S * r;
  if (at_lip.beyond > 0.0) end = std::max(end, at_lip.lowest + 0.1 * r);

  const double taper_from = end - kDome * columella * r;
  pillar.fillet_from_z = std::min(law.at(law.theta_lip - kPi).depth, taper_from - 0.5 * r);
  pillar.fillet_end_z = taper_from;

  constexpr int kHalf = 1024;  // samples over the pillar's length
  const double margin = 0.05 * (end - tip);
  pillar.top_z = tip - margin;
  pillar.bottom_z = end + margin;
  const double least_unit = columella * law.at(law.theta_start).half_breadth;
  std::vector<double> samples(2 * kHalf), units(2 * kHalf);
  for (int i = 0; i <= kHalf; ++i) {
    const double z = pillar.top_z + (pillar.bottom_z - pillar.top_z) * i / kHalf;
    const double radius = columella * law.at(theta_at_depth(law, z)).half_breadth;
    const double up = std::max(0.0, (full_from - z) / (full_from - tip));
    const double down = std::max(0.0, (z - taper_from) / (end - taper_from));
    const double q = radius * radius * (1.0 - up * up) * (1.0 - down * down);
    const auto place = static_cast<std::size_t>(i), mirrored = static_cast<std::size_t>((2 * kHalf - i) % (2 * kHalf));
    samples[place] = samples[mirrored] = q;
    units[place] = units[mirrored] = std::max(radius, least_unit);
  }
  pillar.squared_radius = PeriodicSpline(samples);
  pillar.unit = PeriodicSpline(units);
}

}  // namespace

void build_axis(scene::Scene& scene, const specimen::Specimen& specimen, const PeriodicSpline& reach, Faults& faults) {
  const growth::CoilingLaw& law = scene.law;
  const growth::ChamberShape shape = growth::embryonic_chamber(law);
  const double wall = scene.wall.thickness(law, law.theta_start, {shape.radius, shape.centre_z});

  Crossing worst, at_lip = crossing_at(law, law.theta_lip, reach);
  constexpr int kStages = 32;
  for (int i = 0; i <= kStages; ++i) {
    const Crossing c =
        crossing_at(law, law.theta_start + (law.theta_lip - law.theta_start) * i / kStages, reach);
    if (c.beyond > worst.beyond) worst = c;
  }
  const bool crosses = worst.beyond > 1e-9;
  scene.chamber = {shape.centre_z,      shape.radius,
                   shape.half_height,   std::max(shape.radius - wall, 0.1 * shape.radius),
                   std::max(shape.half_height - wall, 0.1 * shape.half_height), !crosses};

  const double columella = specimen.wall.columella;
  const double least = scene.wall.at_lip / law.half_breadth;
  if (crosses && columella < least) {
    const bool by_D = specimen.growth.D < 0.0;
    diagnostics::Position where = specimen.growth.D.where;
    if (!by_D) where = specimen.section.lobes.empty() ? specimen.section.roll_deg.where : specimen.section.lobes.front().reach.where;
    faults.add(where,
               fmt::format("{}: the whorls cross the axis by {:.3g} half-breadths; {}",
                           by_D ? fmt::format("[growth] D = {:g}", specimen.growth.D.value)
                                : std::string("[section] roll and lobes"),
                           worst.beyond,
                           law.depth > 0.0
                               ? fmt::format("give [wall] columella at least {:.3f}, a pillar as thick as the wall, "
                                             "or a larger D",
                                             std::ceil(least * 1000.0) / 1000.0)
                               : std::string("with T = 0 no columella can part them: give a larger D")));
    return;
  }
  if (columella > 0.0 && law.depth > 0.0) build_pillar(scene, columella, at_lip);
}

}  // namespace whorl::compile
