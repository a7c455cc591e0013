// SPDX-License-Identifier: Apache-2.0
// Fits a rectangle to the edge of the lumen.
#include "compile/mouth.h"

#include <algorithm>
#include <cmath>

namespace whorl::compile {

scene::Mouth mouth_of(const scene::Scene& scene) {
  constexpr int kPoints = 128, kTurns = 45;
  const growth::CoilingLaw& law = scene.law;
  // The station at the lip: growth fronts lead it by little, over which the lumen's outline hardly changes.
  const auto station = static_cast<std::size_t>(std::clamp(std::round((law.theta_lip - scene.first_station_theta) / scene::kStationSpacing),
                                                           0.0, static_cast<double>(scene.stations.size() - 1)));
  const PeriodicSpline& reach = scene.outlines[scene.stations[station].hollow].reach;
  std::vector<Vec3> edge;
  Vec3 centre(0.0);
  for (int i = 0; i < kPoints; ++i) {
    const double psi = kTwoPi * i / kPoints, R = reach.value(psi);
    double theta = law.theta_lip;
    growth::HalfPlanePoint q{};
    for (int round = 0; round < 20; ++round) {
      q = law.to_half_plane(law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
      theta = law.theta_lip + growth::front_lead(scene.front.tan_inclination, law.depth, q);
    }
    edge.emplace_back(q.rho * std::cos(theta), q.rho * std::sin(theta), q.z);
    centre += edge.back() / kPoints;
  }
  Vec3 area(0.0);  // Newell's normal
  for (int i = 0; i < kPoints; ++i) area += (edge[static_cast<std::size_t>(i)] - centre).cross(edge[static_cast<std::size_t>((i + 1) % kPoints)] - centre);
  scene::Mouth mouth;
  mouth.outwards = area.normalized();
  const Vec3 forward(-std::sin(law.theta_lip), std::cos(law.theta_lip), 0.0);
  if (mouth.outwards.dot(forward) < 0.0) mouth.outwards = -mouth.outwards;
  const Frame plane = frame_around(mouth.outwards);
  double least = 1e300;
  for (int turn = 0; turn < kTurns; ++turn) {
    const double a = 0.5 * kPi * turn / kTurns;
    const Vec3 u = std::cos(a) * plane.x + std::sin(a) * plane.y, v = mouth.outwards.cross(u);
    Vec2 lo(1e300), hi(-1e300);
    for (const Vec3& p : edge) {
      const Vec2 at(u.dot(p - centre), v.dot(p - centre));
      lo = {std::min(lo.x, at.x), std::min(lo.y, at.y)};
      hi = {std::max(hi.x, at.x), std::max(hi.y, at.y)};
    }
    const Vec2 size = hi - lo;
    if (size.x * size.y >= least) continue;
    least = size.x * size.y;
    mouth.centre = centre + 0.5 * (lo.x + hi.x) * u + 0.5 * (lo.y + hi.y) * v;
    mouth.half_u = 0.5 * size.x * u;
    mouth.half_v = 0.5 * size.y * v;
  }
  return mouth;
}

}  // namespace whorl::compile
