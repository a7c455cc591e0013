// SPDX-License-Identifier: Apache-2.0
// The lumen's centre line, and whether a lamp has room on it.
#include "compile/lamps.h"

#include <fmt/format.h>

#include <cmath>
#include <limits>
#include <optional>
#include <vector>

namespace whorl::compile {
namespace {

using growth::HalfPlanePoint;

const growth::Outline& hollow_at(const scene::Scene& scene, double theta) {
  const double i = std::round((theta - scene.first_station_theta) / scene::kStationSpacing);
  return scene.outlines[scene.stations[static_cast<std::size_t>(i)].hollow];
}

const growth::Outline& outer_at(const scene::Scene& scene, double theta) {
  const double i = std::round((theta - scene.first_station_theta) / scene::kStationSpacing);
  return scene.outlines[scene.stations[static_cast<std::size_t>(i)].outer];
}

bool inside(const scene::Scene& scene, double theta, const PeriodicSpline& reach, HalfPlanePoint p) {
  const growth::SectionPoint q = scene.law.to_section(scene.law.at(theta), p);
  return std::hypot(q.x, q.y) < reach.value(std::atan2(q.y, q.x));
}

// Whether a point of the half-plane at `theta` is outside all shell that is older than the passage there.
bool clear_of_earlier(const scene::Scene& scene, double theta, HalfPlanePoint p) {
  if (p.rho <= 0.0) return false;
  for (double earlier = theta - kTwoPi; earlier > scene.law.theta_start; earlier -= kTwoPi)
    if (inside(scene, earlier, outer_at(scene, earlier).reach, p)) return false;
  const scene::Chamber& chamber = scene.chamber;
  if (std::hypot(p.rho / chamber.radius, (p.z - chamber.centre_z) / chamber.half_height) < 1.0) return false;
  const scene::Pillar& pillar = scene.pillar;
  if (pillar.present && p.z > pillar.top_z && p.z < pillar.bottom_z) {
    const double turn = kPi * (p.z - pillar.top_z) / (pillar.bottom_z - pillar.top_z);
    if (p.rho * p.rho < pillar.squared_radius.value(turn)) return false;
  }
  return true;
}

bool in_lumen(const scene::Scene& scene, double theta, HalfPlanePoint p) {
  return inside(scene, theta, hollow_at(scene, theta).reach, p) && clear_of_earlier(scene, theta, p);
}

// Whether nothing solid is at a place of the tube or before its mouth.
bool in_air(const scene::Scene& scene, double theta, HalfPlanePoint p) {
  if (theta < scene.law.theta_start) return false;
  const double front = scene.law.theta_lip + growth::front_lead(scene.front.tan_inclination, scene.law.depth, p);
  return theta > front ? clear_of_earlier(scene, theta, p) : in_lumen(scene, theta, p);
}

// Distance of a place from the nearest wall, at most `most`: walls lean, so that the nearest may lie in another half-plane.
double clearance(const scene::Scene& scene, double theta, HalfPlanePoint centre, double most) {
  constexpr int kPlanes = 24, kGrid = 48;  // to either side
  const double farthest = std::asin(std::min(1.0, most / centre.rho)), step = most / kGrid;
  double nearest = most;
  for (int k = -kPlanes; k <= kPlanes; ++k) {
    const double turn = farthest * k / kPlanes, c = std::cos(turn), s = std::sin(turn);
    for (int j = -kGrid; j <= kGrid; ++j)
      for (int i = -kGrid; i <= kGrid; ++i) {
        const HalfPlanePoint p{centre.rho + i * step, centre.z + j * step};
        const double apart = std::sqrt(std::pow(p.rho * c - centre.rho, 2) + std::pow(p.rho * s, 2) + std::pow(j * step, 2));
        if (apart < nearest && !in_air(scene, theta + turn, p)) nearest = apart;
      }
  }
  return std::max(0.0, nearest - step - most / kPlanes * 0.5);
}

// Grid over the half-plane round a section.
struct Grid {
  static constexpr int kSteps = 160;
  double middle_rho, middle_z, extent;
  HalfPlanePoint point(int i, int j) const {
    return {middle_rho + extent * (2.0 * i / kSteps - 1.0), middle_z + extent * (2.0 * j / kSteps - 1.0)};
  }
  template <class Visit>
  void each(const Visit& visit) const {
    for (int j = 0; j <= kSteps; ++j)
      for (int i = 0; i <= kSteps; ++i) visit(point(i, j));
  }
};
Grid grid_at(const scene::Scene& scene, double theta) {
  const growth::Station s = scene.law.at(theta);
  return {s.distance, s.depth, 1.2 * s.half_breadth * std::max(1.0, scene.law.S)};
}

// The centroid of the free lumen's section.
std::optional<HalfPlanePoint> centre_line(const scene::Scene& scene, double theta) {
  double rho = 0.0, z = 0.0, count = 0.0;
  grid_at(scene, theta).each([&](HalfPlanePoint p) {
    if (!in_lumen(scene, theta, p)) return;
    rho += p.rho;
    z += p.z;
    count += 1.0;
  });
  if (count == 0.0) return std::nullopt;
  return HalfPlanePoint{rho / count, z / count};
}

// Distance of a place in the lumen from the nearest wall, to a grid step; 0 where it is in the wall.
double room_round(const scene::Scene& scene, double theta, HalfPlanePoint centre) {
  if (!in_lumen(scene, theta, centre)) return 0.0;
  double nearest = std::numeric_limits<double>::infinity();
  grid_at(scene, theta).each([&](HalfPlanePoint p) {
    const double apart = std::hypot(p.rho - centre.rho, p.z - centre.z);
    if (apart < nearest && !in_lumen(scene, theta, p)) nearest = apart;
  });
  return clearance(scene, theta, centre, nearest);
}

// Where a lamp's balls hang in the half-plane.
std::vector<HalfPlanePoint> places_of(const scene::Scene& scene, const specimen::Lamp& lamp, double theta, HalfPlanePoint centre) {
  const growth::Station s = scene.law.at(theta);
  const double at = radians(lamp.at_deg);
  const HalfPlanePoint middle = scene.law.to_half_plane(s, {0.0, 0.0}), towards = scene.law.to_half_plane(s, {std::cos(at), std::sin(at)});
  const double length = std::hypot(towards.rho - middle.rho, towards.z - middle.z);
  centre.rho += lamp.offset_mm * (towards.rho - middle.rho) / length;
  centre.z += lamp.offset_mm * (towards.z - middle.z) / length;
  if (lamp.shape.value == specimen::LampShape::kBall) return {centre};
  std::vector<HalfPlanePoint> places;
  for (int i = 0; i < lamp.bulbs; ++i) {
    const double turn = kTwoPi * i / lamp.bulbs;
    places.push_back({centre.rho + lamp.ring_mm * std::cos(turn), centre.z + lamp.ring_mm * std::sin(turn)});
  }
  return places;
}

}  // namespace

void build_lamps(scene::Scene& scene, const specimen::Specimen& specimen, Faults& faults) {
  for (const specimen::Lamp& lamp : specimen.lamps) {
    const double theta = scene.law.theta_lip - kTwoPi * lamp.behind_lip;
    if (theta < scene.law.theta_start) {
      faults.add(lamp.behind_lip.where,
                 fmt::format("[[lamp]] behind_lip = {:g}: the lamp would lie before the tube begins; must be from 0 to "
                             "{:.3g} whorls",
                             lamp.behind_lip.value, (scene.law.theta_lip - scene.law.theta_start) / kTwoPi));
      continue;
    }
    const std::optional<HalfPlanePoint> centre = centre_line(scene, theta);
    const std::vector<HalfPlanePoint> places = centre ? places_of(scene, lamp, theta, *centre) : std::vector<HalfPlanePoint>{};
    double room = centre ? std::numeric_limits<double>::infinity() : 0.0;
    for (const HalfPlanePoint& place : places) room = std::min(room, room_round(scene, theta, place));
    if (lamp.radius_mm > room) {
      const bool free = lamp.offset_mm > 0.0 || lamp.shape.value == specimen::LampShape::kRing;
      faults.add(lamp.radius_mm.where,
                 room > 0.0 || !free
                     ? fmt::format("[[lamp]] radius = {:g}: the lamp does not fit into the lumen {:g} whorls behind the lip, "
                                   "which has room for a radius of {:.3g} mm; give a smaller radius or a place nearer to the "
                                   "lip",
                                   lamp.radius_mm.value, lamp.behind_lip.value, room)
                     : fmt::format("[[lamp]]: {} lies in the wall {:g} whorls behind the lip; on the centre line a ball of radius {:.3g} "
                                   "mm has room there; give a smaller {}",
                                   lamp.shape.value == specimen::LampShape::kRing ? "the ring" : "the lamp", lamp.behind_lip.value,
                                   room_round(scene, theta, *centre),
                                   lamp.shape.value == specimen::LampShape::kRing ? "ring or offset" : "offset"));
      continue;
    }
    for (const HalfPlanePoint& place : places)
      scene.lamps.push_back({{place.rho * std::cos(theta), place.rho * std::sin(theta), place.z}, lamp.radius_mm, lamp.strength, lamp.temperature_k});
  }
}

}  // namespace whorl::compile
