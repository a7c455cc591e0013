// SPDX-License-Identifier: Apache-2.0
// What light meets: the contract between things that can be hit and the path tracer.
#pragma once

#include "math/vec.h"

#include <cstdint>
#include <limits>

namespace whorl::trace {

/// Lengths in millimetres, in the frame of the (dextral) solid: axis of coiling = z, pole at the origin.
struct Ray {
  Vec3f origin;
  Vec3f direction;  // unit
  float t_min = 0.0f;
  float t_max = std::numeric_limits<float>::infinity();
};

/// What a place on the picture shows. The numbers are those of the `part` layer (scene-file contract).
enum class Part : std::uint8_t { kNothing = 0, kExterior = 1, kInterior = 2, kCutFace = 3, kOrnament = 4, kLamp = 5, kMould = 6 };

struct Hit {
  float t = 0.0f;
  Vec3f position;           // on the surface
  Vec3f normal;             // unit, out of the shell, towards the air
  Part part = Part::kNothing;
  bool parietal = false;    // outside of earlier shell or of the columella, met within a later lumen
  float safe_offset = 0.0f; // a new ray must start this far along the normal to be clear of this surface, mm
  std::uint32_t series = 0; // of kOrnament: index of scene::Attached::series
  double passage = 0.0;     // growth angle, within half a turn, of the tube's passage whose surface this is
};

/// A place in the coordinates of growth.
struct GrowthPlace {
  float turn = 0.0f;        // whorls from the pole
  float around_deg = 0.0f;  // section angle: 0 away from the axis, 90 towards the apex
};

/// An opaque solid. Every function may be called from any thread at once.
/// Rays start in air. A ray that finds the solid at its very start has hit it there.
class Surfaces {
 public:
  virtual ~Surfaces() = default;
  /// The first hit in [t_min, t_max]; false and `hit` untouched where there is none.
  virtual bool closest(const Ray& ray, Hit& hit) const noexcept = 0;
  /// Whether anything is hit in [t_min, t_max].
  virtual bool occluded(const Ray& ray) const noexcept = 0;
  /// Where in growth a hit of this solid lies. Apart from `closest`, since most rays never ask and it costs as much.
  virtual GrowthPlace growth_place(const Hit& hit) const noexcept = 0;
};

}  // namespace whorl::trace
