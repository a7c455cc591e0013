// SPDX-License-Identifier: Apache-2.0
// Rays of the orthographic view.
#include "transport/camera.h"

#include <algorithm>
#include <cmath>

namespace whorl::transport {

Vec2 filter_offset(float u1, float u2) noexcept {
  // Radius of a two-dimensional Gaussian by inversion; `kept` is its mass within the cut.
  static const double kept = 1.0 - std::exp(-0.5 * (kFilterRadiusPx / kFilterSigmaPx) * (kFilterRadiusPx / kFilterSigmaPx));
  const double radius = kFilterSigmaPx * std::sqrt(-2.0 * std::log1p(-kept * static_cast<double>(u1)));
  const double angle = kTwoPi * static_cast<double>(u2);
  return {radius * std::cos(angle), radius * std::sin(angle)};
}

trace::Ray Camera::ray(double x_px, double y_px) const noexcept {
  const Vec3 start = anchor_mm + page.x * ((x_px - anchor_px.x) * mm_per_px) -
                     page.y * ((y_px - anchor_px.y) * mm_per_px) + page.z * front_mm;
  trace::Ray ray;
  ray.origin = Vec3f(start);
  ray.direction = Vec3f(-page.z);
  return ray;
}

Vec2 Camera::project(const Vec3& point_mm) const noexcept {
  const Vec3 v = page.to_frame(point_mm - anchor_mm);
  return {anchor_px.x + v.x / mm_per_px, anchor_px.y - v.y / mm_per_px};
}

PixelRect pixels_of(const Camera& camera, const Box3& box_mm) noexcept {
  if (box_mm.isEmpty()) return {};
  Vec2 low(camera.width_px, camera.height_px), high(0.0);
  for (int corner = 0; corner < 8; ++corner) {
    const Vec2 p = camera.project({corner & 1 ? box_mm.max.x : box_mm.min.x, corner & 2 ? box_mm.max.y : box_mm.min.y,
                                   corner & 4 ? box_mm.max.z : box_mm.min.z});
    for (int a = 0; a < 2; ++a) {
      low[a] = std::min(low[a], p[a]);
      high[a] = std::max(high[a], p[a]);
    }
  }
  // A filter reaches its radius beyond a centre; one pixel more for rounding.
  constexpr double kReach = kFilterRadiusPx + 1.0;
  const auto pixel = [](double v, int limit) { return static_cast<int>(std::clamp(v, 0.0, static_cast<double>(limit))); };
  return {pixel(std::floor(low.x - kReach), camera.width_px), pixel(std::floor(low.y - kReach), camera.height_px),
          pixel(std::ceil(high.x + kReach), camera.width_px), pixel(std::ceil(high.y + kReach), camera.height_px)};
}

}  // namespace whorl::transport
