// SPDX-License-Identifier: Apache-2.0
// Solids that stand on the shell and keep their own colour: unioned with it, never summed.
#pragma once

#include "math/vec.h"
#include "specimen/specimen.h"

#include <cstddef>
#include <cstdint>
#include <memory>
#include <optional>
#include <vector>

namespace whorl::scene {

/// A knob: the unit ball in the coordinates rows * (p - centre), rows being the semi-axes' directions over their lengths. The third
/// points away from the shell; below the equator that axis is shorter, `below` times as steep. A million of them count: one line of the cache each.
struct alignas(64) Bead {
  Vec3f centre;
  Vec3f rows[3];
  float below = 1.0f;
  float passage = 0.0f;  // growth angle
  std::uint32_t series = 0;
};

/// A cone or tube round a circular arc that starts at `base` along `axis` and turns towards -`front` (away from the lip).
struct Horn {
  Vec3 base, axis, front;             // axis and front: unit, perpendicular
  Vec3 up;                            // of the surface, unit: its foot is cut level with it
  double length = 0.0;                // of the arc
  double bend = 0.0;                  // angle between its ends; below 0 towards the front
  double foot_radius = 0.0, tip_radius = 0.0;
  double bore = 0.0;                  // radius of the bore / radius there; 0: solid
  double half_opening = 0.0;          // half of the angle over which a bore is open along its front
  double sunk = 0.0;                  // depth of the foot's cut under the surface, in the wall
  float passage = 0.0f;
  std::uint32_t series = 0;
};

/// A piece of a solid with the form of a ledge, in the coordinates of growth: across it lies growth (a lamella) or the section angle (a
/// stripe), upwards the distance from the plain surface. Pieces of one ledge overlap a little.
struct Ledge {
  enum class Run : std::uint8_t { kRoundSection, kAlongGrowth };
  Run run = Run::kRoundSection;
  double growth = 0.0, psi = 0.0;     // of the middle; growth along growth lines
  double reach = 0.0;                 // half-width: round the section, radians; 0: all round
  double height = 0.0, half_thickness = 0.0;  // mm at `growth`, growing with the whorl; half_thickness of lamellae only
  double power = 1.0;                 // of the whorl's size, with which the height goes along a stripe
  double tan_lean = 0.0;              // of lamellae, out of the growth front towards the lip
  double sunk = 0.0;                  // how far it reaches into the wall
  double from = 0.0, to = 0.0;        // of the piece, along its run: section angle or growth
  std::uint32_t series = 0;
};

/// What all of one table of the scene file have in common.
struct AttachedSeries {
  std::optional<specimen::Colour> colour;  // none: that of the outside
};

struct Scene;
/// Another shell on this one: a place of this shell's frame is origin + frame.to_world(place of its own). The frame is left-handed where
/// one coils the other way. Its outside has the colour of `series`, its inside of the next one.
struct Guest {
  std::shared_ptr<const Scene> shell;
  Frame frame;
  Vec3 origin{0.0};
  double passage = 0.0;
  std::uint32_t series = 0;
};

struct Attached {
  std::vector<Guest> guests;
  std::vector<AttachedSeries> series;
  std::vector<Bead> beads;
  std::vector<Horn> horns;
  std::vector<Ledge> ledges;

  bool empty() const { return beads.empty() && horns.empty() && ledges.empty() && guests.empty(); }
  std::size_t size() const { return beads.size() + horns.size() + ledges.size() + guests.size(); }
};

/// A box that holds all of it.
Box3 box_of(const Bead& bead);
Box3 box_of(const Horn& horn);
Box3 box_of(const Guest& guest);

/// Where the horn's axis begins, at the latest: the cut foot lies beyond it. At most 0.
double axis_start(const Horn& horn);

/// The horn's axis at a length from the foot (below 0: straight on into the wall).
struct AxisPlace {
  Vec3 point, axis, front;
};
AxisPlace axis_at(const Horn& horn, double s);

}  // namespace whorl::scene
