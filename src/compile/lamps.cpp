// SPDX-License-Identifier: Apache-2.0
// The lumen's centre line, and whether a lamp has room on it.
#include "compile/lamps.h"

#include <fmt/format.h>

#include <cmath>
#include <limits>

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

struct Room {
  HalfPlanePoint centre{};
  double clearance = 0.0;
};

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

// The centroid of the free lumen's section and its distance from the nearest wall, both to a grid step.
Room room_at(const scene::Scene& scene, double theta) {
  constexpr int kGrid = 160;
  const growth::Station s = scene.law.at(theta);
  const double half_z = 1.2 * scene.law.S * s.half_breadth, half_rho = 1.2 * s.half_breadth;
  const double extent = std::max(half_z, half_rho);
  const auto point = [&](int i, int j) {
    return HalfPlanePoint{s.distance + extent * (2.0 * i / kGrid - 1.0), s.depth + extent * (2.0 * j / kGrid - 1.0)};
  };
  double rho = 0.0, z = 0.0, count = 0.0;
  std::vector<bool> free(static_cast<std::size_t>((kGrid + 1) * (kGrid + 1)));
  for (int j = 0; j <= kGrid; ++j)
    for (int i = 0; i <= kGrid; ++i) {
      const HalfPlanePoint p = point(i, j);
      if (!in_lumen(scene, theta, p)) continue;
      free[static_cast<std::size_t>(j * (kGrid + 1) + i)] = true;
      rho += p.rho;
      z += p.z;
      count += 1.0;
    }
  if (count == 0.0) return {};
  Room room{{rho / count, z / count}, std::numeric_limits<double>::infinity()};
  for (int j = 0; j <= kGrid; ++j)
    for (int i = 0; i <= kGrid; ++i)
      if (!free[static_cast<std::size_t>(j * (kGrid + 1) + i)]) {
        const HalfPlanePoint p = point(i, j);
        room.clearance = std::min(room.clearance, std::hypot(p.rho - room.centre.rho, p.z - room.centre.z));
      }
  room.clearance = clearance(scene, theta, room.centre, room.clearance);
  return room;
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
    const Room room = room_at(scene, theta);
    if (lamp.radius_mm > room.clearance) {
      faults.add(lamp.radius_mm.where,
                 fmt::format("[[lamp]] radius = {:g}: the lamp does not fit into the lumen {:g} whorls behind the lip, "
                             "which has room for a radius of {:.3g} mm; give a smaller radius or a place nearer to the "
                             "lip",
                             lamp.radius_mm.value, lamp.behind_lip.value, room.clearance));
      continue;
    }
    scene.lamps.push_back({{room.centre.rho * std::cos(theta), room.centre.rho * std::sin(theta), room.centre.z},
                           lamp.radius_mm,
                           lamp.strength,
                           lamp.temperature_k});
  }
}

}  // namespace whorl::compile
