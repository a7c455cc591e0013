// SPDX-License-Identifier: Apache-2.0
// Stations along the growth of the tube; stations whose outlines agree share them.
#include "compile/tube.h"

#include <fmt/format.h>

#include <array>
#include <cmath>

namespace whorl::compile {
namespace {

using growth::Outline;

// What an outline depends on, in units of the half-breadth: stations with the same key have the same outlines.
using Key = std::array<double, 6>;

Key key_at(const scene::Scene& scene, double theta) {
  const growth::CoilingLaw& law = scene.law;
  const growth::Station s = law.at(theta);
  const double wall = scene.wall.thickness(law, theta, {s.distance, s.depth});
  return {s.distance / s.half_breadth, s.depth / s.half_breadth, law.by_distance.rate(theta),
          law.by_depth.rate(theta),    law.by_section.rate(theta), wall / s.half_breadth};
}

bool same(const Key& a, const Key& b) {
  constexpr double kRounding = 1e-11;
  for (std::size_t i = 0; i < a.size(); ++i)
    if (std::abs(a[i] - b[i]) > kRounding * (1.0 + std::abs(a[i]))) return false;
  return true;
}

bool same(const Outline& a, const Outline& b) {
  constexpr double kRounding = 1e-9;
  return a.reach.close_to(b.reach, kRounding) && a.normal_scale.close_to(b.normal_scale, kRounding);
}

}  // namespace

void build_tube(scene::Scene& scene, const PeriodicSpline& reach, diagnostics::Position wall_at,
                diagnostics::Position lip_at, Faults& faults) {
  const growth::CoilingLaw& law = scene.law;
  const growth::Station start = law.at(law.theta_start);
  // A rounded end as long as the section is broad; at least a radian's worth where the tube hugs the axis.
  scene.cap_per_radian = std::max(1.0, start.distance / start.half_breadth);
  scene.theta_begin = law.theta_start - scene::kSupport / scene.cap_per_radian;
  constexpr double kPastLip = 0.95 * kPi;  // the chains run on past the lip; the growth front cuts them
  scene.theta_end = law.theta_lip + kPastLip;
  scene.first_station_theta = scene.theta_begin - 3.0 * scene::kStationSpacing;
  const auto count = static_cast<std::size_t>(
      std::ceil((scene.theta_end - scene.first_station_theta) / scene::kStationSpacing) + 4);
  const double wall_may_vary = law.theta_lip - growth::WallLaw::kLipFades - 0.5 * kPi - scene::kStationSpacing;

  Key last_key{};
  std::uint32_t last_outer = 0, last_hollow = 0;
  for (std::size_t i = 0; i < count; ++i) {
    const double theta = scene.first_station_theta + static_cast<double>(i) * scene::kStationSpacing;
    const Key key = key_at(scene, theta);
    if (i > 0 && theta < wall_may_vary && same(key, last_key)) {
      scene.stations.push_back({last_outer, last_hollow});
      continue;
    }
    last_key = key;
    const auto hollow_curve = growth::hollow_reach(law, theta, reach, scene.wall);
    if (!hollow_curve) {
      const bool lip = theta > law.theta_lip - growth::WallLaw::kLipFades &&
                       scene.wall.lip_thickness > scene.wall.at_lip;
      const growth::Station s = law.at(theta);
      faults.add(lip ? lip_at : wall_at,
                 fmt::format("[{}] thickness = {:g} mm: thicker than the tube, which leaves no lumen at whorl {:.2f} "
                             "(the section there is {:.3g} mm broad and {:.3g} mm high); give a thinner {}",
                             lip ? "lip" : "wall", lip ? scene.wall.lip_thickness : scene.wall.at_lip, theta / kTwoPi,
                             2.0 * s.half_breadth, 2.0 * law.S * s.half_breadth, lip ? "lip" : "wall"));
      return;
    }
    Outline outer = growth::with_normal_scale(law, theta, reach);
    Outline hollow = growth::with_normal_scale(law, theta, *hollow_curve);
    const auto index_of = [&](Outline& outline, std::uint32_t last) {
      if (i > 0 && same(outline, scene.outlines[last])) return last;
      scene.outlines.push_back(std::move(outline));
      return static_cast<std::uint32_t>(scene.outlines.size() - 1);
    };
    last_outer = index_of(outer, last_outer);
    last_hollow = index_of(hollow, last_hollow);
    scene.stations.push_back({last_outer, last_hollow});
  }
  const Interval inner = scene.outlines[scene.stations[static_cast<std::size_t>(3)].hollow].reach.bounds();
  scene.hollow_cap_per_radian = scene.cap_per_radian / (0.5 * (inner.lo + inner.hi));
}

}  // namespace whorl::compile
