// SPDX-License-Identifier: Apache-2.0
// Places in the coordinates of the horn's axis: along the arc, and across it.
#include "trace/horn.h"

#include <algorithm>
#include <cmath>

namespace whorl::trace {
namespace {

// Along the axis from the foot, towards the front and to the side of it. Beyond the arc's ends its axis runs on straight.
struct OnAxis {
  double along, front, side;
};

OnAxis on_axis(const scene::Horn& h, const Vec3& p) noexcept {
  const Vec3 from = p - h.base;
  const double u = h.axis.dot(from), v = h.front.dot(from), side = h.axis.cross(h.front).dot(from);
  if (h.bend == 0.0) return {u, v, side};
  // The arc's centre lies behind the foot (before it, where the bend is towards the front).
  const double radius = h.length / h.bend, bend = std::abs(h.bend);
  double turn = radius > 0.0 ? std::atan2(u, v + radius) : std::atan2(u, -(v + radius));
  if (turn < 0.0 && -turn > kPi - 0.5 * bend) turn += kTwoPi;  // the tip is nearer, the other way round
  if (turn <= 0.0) return {u, v, side};
  if (turn > bend) {
    const scene::AxisPlace end = scene::axis_at(h, h.length);
    const Vec3 past = p - end.point;
    return {h.length + end.axis.dot(past), end.front.dot(past), side};
  }
  const double apart = std::hypot(u, v + radius) - std::abs(radius);
  return {turn * std::abs(radius), radius > 0.0 ? apart : -apart, side};
}

double taper(const scene::Horn& h) noexcept { return (h.foot_radius - h.tip_radius) / h.length; }

}  // namespace

double value_of(const scene::Horn& h, const Vec3& p) noexcept {
  const OnAxis at = on_axis(h, p);
  const double across = std::hypot(at.front, at.side);
  const double along = std::clamp(at.along, 0.0, h.length);
  const double radius = h.foot_radius - taper(h) * along;
  const double over_surface = h.up.dot(p - h.base), past_foot = over_surface + h.sunk;
  if (h.bore <= 0.0) {
    // Rounded tip: a ball of the tip's radius.
    const double past_tip = std::max(0.0, at.along - h.length);
    return std::min(radius - std::hypot(across, past_tip), past_foot);
  }
  // Bore and opening end at the shell.
  double value = std::min({radius - across, std::max(across - h.bore * radius, -over_surface), h.length - at.along, past_foot});
  if (h.half_opening > 0.0) {
    const double in_opening = at.front * std::sin(h.half_opening) - std::abs(at.side) * std::cos(h.half_opening);
    value = std::min(value, std::max(-in_opening, -over_surface));
  }
  return value;
}

double clear_of_horn(const scene::Horn& h, double value) noexcept {
  // Within a foot radius of the axis the arc shortens lengths along it by up to a half (the sharpest bend), so that the taper counts
  // twice there.
  const double steep = 2.0 * std::abs(taper(h));
  return std::abs(value) / std::sqrt(1.0 + steep * steep);
}

}  // namespace whorl::trace
