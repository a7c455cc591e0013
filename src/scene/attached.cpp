// SPDX-License-Identifier: Apache-2.0
// Boxes round attached solids, and the arc that a horn follows.
#include "scene/attached.h"

#include "scene/scene.h"

#include <algorithm>
#include <cmath>

namespace whorl::scene {

Box3 box_of(const Bead& bead) {
  Vec3 half(0.0);
  for (int k = 0; k < 3; ++k) {
    const Vec3 row(bead.rows[k]);
    // Semi-axis: along row, 1 / |row| long; below the equator shorter (below >= 1), or longer.
    const double grow = k == 2 ? std::max(1.0, 1.0 / static_cast<double>(bead.below)) : 1.0;
    const Vec3 axis = row * (grow / row.length2());
    for (int i = 0; i < 3; ++i) half[i] += axis[i] * axis[i];
  }
  for (int i = 0; i < 3; ++i) half[i] = std::sqrt(half[i]);
  return {Vec3(bead.centre) - half, Vec3(bead.centre) + half};
}

AxisPlace axis_at(const Horn& horn, double s) {
  if (s <= 0.0 || horn.bend == 0.0) return {horn.base + s * horn.axis, horn.axis, horn.front};
  const double turn = horn.bend * s / horn.length, radius = horn.length / horn.bend;
  const double c = std::cos(turn), n = std::sin(turn);
  return {horn.base + radius * n * horn.axis - radius * (1.0 - c) * horn.front, c * horn.axis - n * horn.front,
          n * horn.axis + c * horn.front};
}

double axis_start(const Horn& horn) {
  const double cosine = std::max(0.1, horn.axis.dot(horn.up)), sine = std::sqrt(std::max(0.0, 1.0 - cosine * cosine));
  return -(horn.sunk + horn.foot_radius * sine) / cosine;
}

Box3 box_of(const Horn& horn) {
  Box3 box;
  constexpr int kPieces = 12;
  const double widest = std::max(horn.foot_radius, horn.tip_radius);
  // Between two places the arc stands off its chord by at most the sagitta.
  const double sagitta = horn.length / kPieces * std::abs(horn.bend) / kPieces / 8.0;
  for (int i = -1; i <= kPieces; ++i) {
    const double s = i < 0 ? axis_start(horn) : horn.length * i / kPieces;
    const Vec3 p = axis_at(horn, s).point;
    const Vec3 room(widest + sagitta);
    box.extendBy(p - room);
    box.extendBy(p + room);
  }
  return box;
}

Box3 box_of(const Guest& guest) {
  const Box3& own = guest.shell->bounds;
  Box3 box;
  for (int i = 0; i < 8; ++i)
    box.extendBy(guest.origin + guest.frame.to_world({i & 1 ? own.max.x : own.min.x, i & 2 ? own.max.y : own.min.y, i & 4 ? own.max.z : own.min.z}));
  return box;
}

}  // namespace whorl::scene
