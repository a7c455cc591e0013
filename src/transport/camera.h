// SPDX-License-Identifier: Apache-2.0
// The orthographic view: from pixels to rays, with the pixel filter.
#pragma once

#include "math/vec.h"
#include "trace/surfaces.h"

namespace whorl::transport {

/// The pixel filter: a round Gaussian in pixels, cut off where it has fallen to 0.4 % of its peak. Applied by drawing
/// sample places in proportion to it, so every sample has the same weight and no pixel can go negative.
inline constexpr double kFilterSigmaPx = 0.45;
inline constexpr double kFilterRadiusPx = 1.5;

/// Offset from the pixel's centre, in pixels, for uniform u1, u2 in [0, 1).
Vec2 filter_offset(float u1, float u2) noexcept;

/// Pixel coordinates: x to the right, y down, (0, 0) the upper left corner of the picture, centres at halves.
struct Camera {
  Frame page;                // in shell coordinates: x right on the page, y up, z towards the reader; either handedness
  int width_px = 0, height_px = 0;
  double mm_per_px = 0.0;
  Vec3 anchor_mm{0.0};       // a point of the shell's frame ..
  Vec2 anchor_px{0.0};       // .. and where on the picture it stands
  double front_mm = 0.0;     // distance of the front plane from the anchor, towards the reader; rays start there

  /// The ray through a place on the picture; its length is the depth below the front plane.
  trace::Ray ray(double x_px, double y_px) const noexcept;
  /// Where a point of the shell's frame stands on the picture.
  Vec2 project(const Vec3& point_mm) const noexcept;
};

/// Half-open ranges of pixels.
struct PixelRect {
  int x0 = 0, y0 = 0, x1 = 0, y1 = 0;
  bool contains(int x, int y) const noexcept { return x >= x0 && x < x1 && y >= y0 && y < y1; }
};

/// The pixels whose filter can reach into the box; none for an empty box.
PixelRect pixels_of(const Camera& camera, const Box3& box_mm) noexcept;

}  // namespace whorl::transport
