// SPDX-License-Identifier: Apache-2.0
// Rays through the wall.
#include "measure/wall.h"

#include "growth/outline.h"

#include <algorithm>
#include <cmath>
#include <optional>

namespace whorl::measure {
namespace {

using field::State;

growth::HalfPlanePoint outline_point(const scene::Scene& scene, double theta, double psi) {
  const double R = scene.outlines[scene.stations.front().outer].reach.value(psi);
  return scene.law.to_half_plane(scene.law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
}

// Thickness of the wall at a place of the tube's outside, or nothing where that place is not on the shell's outside or
// where something else than the lumen lies behind.
std::optional<double> thickness_at(const trace::EmbreeSolid& solid, double theta, double psi) {
  const field::Field& field = solid.field();
  const scene::Scene& scene = field.scene();
  const growth::HalfPlanePoint p = outline_point(scene, theta, psi);
  if (p.rho <= 0.0) return std::nullopt;
  const Vec3 at(p.rho * std::cos(theta), p.rho * std::sin(theta), p.z);
  const Vec3 inwards = field.gradient({field::Part::kWhorl, theta}, at).normalized();
  const double outside = 0.1 * scene.law.at(theta).half_breadth;
  const Vec3 start = at - outside * inwards;
  if (field.place_at(start).state != State::kOutside) return std::nullopt;
  trace::Ray ray{Vec3f(start), Vec3f(inwards)};
  ray.t_max = static_cast<float>(outside + 2.0 * scene.law.at(theta).half_breadth);
  std::vector<trace::Crossing> crossings;
  solid.crossings(ray, State::kOutside, crossings);
  if (crossings.size() < 2 || crossings[0].after != State::kSolid || crossings[1].after != State::kLumen ||
      std::abs(static_cast<double>(crossings[0].t) - outside) > 0.2 * outside)
    return std::nullopt;
  return static_cast<double>(crossings[1].t - crossings[0].t);
}

}  // namespace

WallThickness wall_thickness(const trace::EmbreeSolid& solid) {
  const scene::Scene& scene = solid.field().scene();
  WallThickness result{0.0, 0.0, 1e300, 0.0};
  constexpr int kAround = 96;
  std::vector<double> at_lip;
  const double rim = 3.0 * scene.front.rim_radius / scene.law.distance;
  for (int i = 0; i < kAround; ++i) {
    const double psi = kTwoPi * i / kAround;
    const double theta = scene.law.theta_lip - rim +
                         growth::front_lead(scene.front.tan_inclination, scene.law.depth,
                                            outline_point(scene, scene.law.theta_lip, psi));
    if (const auto t = thickness_at(solid, theta, psi)) at_lip.push_back(*t);
  }
  if (!at_lip.empty()) {
    std::sort(at_lip.begin(), at_lip.end());
    result.at_lip = at_lip[at_lip.size() / 2];
    result.at_lip_spread = at_lip[at_lip.size() * 3 / 4] - at_lip[at_lip.size() / 4];
  }
  const double step = kTwoPi / 24.0;
  for (double theta = scene.law.theta_start + kPi; theta < scene.law.theta_lip - rim; theta += step)
    for (int i = 0; i < kAround; i += 4)
      if (const auto t = thickness_at(solid, theta, kTwoPi * i / kAround); t && *t < result.least) {
        result.least = *t;
        result.least_whorl = theta / kTwoPi;
      }
  if (result.least > 1e299) result.least = result.at_lip;
  return result;
}

}  // namespace whorl::measure
