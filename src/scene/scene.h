// SPDX-License-Identifier: Apache-2.0
// The compiled scene: flat, immutable records linked by index. Only compile/ makes one, everything after reads it.
#pragma once

#include "growth/coiling_law.h"
#include "growth/outline.h"
#include "growth/sculpture.h"
#include "scene/attached.h"
#include "scene/edge_pattern.h"

#include <algorithm>
#include <cstdint>
#include <vector>

namespace whorl::scene {

/// Wyvill's kernel k(u) = (1 - u^2)^3 carries every density; a station's kernel reaches kSupport times the outline and
/// the solid is where the density exceeds kLevel, which puts the surface exactly on the outline.
inline constexpr double kSupport = 1.44;

/// A station of the tube: one density primitive of the outer (additive) and one of the lumen's (subtractive) chain.
/// Stations stand kStationSpacing of growth apart; cubic B-spline weights over four of them add up to one everywhere.
struct Station {
  std::uint32_t outer, hollow;  // indices of outlines
};
inline constexpr double kStationSpacing = kTwoPi / 48.0;

/// A density primitive in space, summed with the stations of its own whorl. `to_unit` maps the offset from the centre
/// (scaled by the support) into the unit ball; `weight` > 0 adds, < 0 cuts; `hollow` joins the lumen's chain instead.
struct Ellipsoid {
  Vec3 centre;
  Vec3 to_unit[3];  // rows
  double weight;
  double theta;     // growth angle of its place
  bool hollow;
};

/// The embryonic shell: a hollow ellipsoid of revolution on the axis that closes the apex; the first half whorl's lumen opens into it.
struct Chamber {
  double centre_z, radius, half_height;   // outer semi-axes
  double hollow_radius, hollow_half_height;
  bool open;                              // into the tube
};

/// The columella: a pillar on the axis. Its squared radius by depth is a spline over [top_z, bottom_z] laid on half a turn
/// (mirrored on the other half); it is negative beyond the pillar's tapering ends. `unit` is its radius before the ends
/// taper, laid out likewise: it turns squared lengths into lengths that grow with the shell.
struct Pillar {
  bool present = false;
  double top_z = 0.0, bottom_z = 0.0;
  PeriodicSpline squared_radius{-1.0}, unit{1.0};

  /// Radius of the fillet by which whorls join the pillar, in half-breadths: kFillet down to `fillet_from_z`, none from
  /// `fillet_end_z` on, where the pillar's tip stands free and the azimuth loses its meaning on the axis below it.
  static constexpr double kFillet = 0.25;
  double fillet_from_z = 0.0, fillet_end_z = 0.0;
  double fillet_at(double z) const {
    const double x = std::clamp((fillet_end_z - z) / (fillet_end_z - fillet_from_z), 0.0, 1.0);
    return kFillet * x * x * (3.0 - 2.0 * x);
  }
};

/// The growth front at the lip: a surface through the section's centre at theta_lip, inclined to the axis.
struct Front {
  double tan_inclination = 0.0, cos_inclination = 1.0;
  double rim_radius = 0.0;  // half of the lip's thickness; the rim stands this far beyond theta_lip
};

/// The mouth as a rectangle in space: centre, halves of its sides, and the way out.
struct Mouth {
  Vec3 centre{0.0}, half_u{1.0, 0.0, 0.0}, half_v{0.0, 0.0, 1.0}, outwards{0.0, 1.0, 0.0};
};

struct Lamp {
  Vec3 centre;
  double radius = 0.0, strength = 0.0, temperature_k = 6500.0;
};

struct Scene {
  growth::CoilingLaw law;
  std::vector<growth::Outline> outlines;
  std::vector<Station> stations;
  double first_station_theta = 0.0;
  std::vector<Ellipsoid> ellipsoids;
  growth::Sculpture sculpture;  // primitives in the coordinates of growth that join the outer chain
  double theta_begin = 0.0;  // the tube's rounded end: nothing of it before
  double theta_end = 0.0;    // nothing of it after
  double cap_per_radian = 0.0;         // arc / half-breadth a radian, in the rounded end of the tube
  double hollow_cap_per_radian = 0.0;  // the same for the lumen's end
  Chamber chamber{};
  Pillar pillar;
  Front front;
  growth::WallLaw wall;
  std::vector<Lamp> lamps;
  Mouth mouth;
  std::vector<EdgePattern> edge_patterns;  // in the order in which they were stated
  Attached attached;
  Box3 bounds;              // of the solid, with a little room
  double height_mm = 0.0;   // along the axis, from the growth law
  bool start_raised = false;  // whorls too small to draw were left to the embryonic cap
};

/// How far, in mm, surface cells may miss the true surface where lengths are measured: a share of the height that no caliper
/// reads. At the plain share a ray that meets the surface at over twelve degrees is true to 1e-5 of the height along itself; a
/// sculptured shell would need millions of cells for that.
inline double measuring_tolerance_mm(const Scene& scene) {
  constexpr double kPlain = 2e-6, kSculptured = 2e-5;
  return scene.height_mm * (scene.sculpture.empty() ? kPlain : kSculptured);
}

}  // namespace whorl::scene
