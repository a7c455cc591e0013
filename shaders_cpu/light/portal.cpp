// SPDX-License-Identifier: Apache-2.0
// Spherical rectangles.
#include "shaders_cpu/light/portal.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {

PortalView::PortalView(const Portal& portal, const Vec3f& from) noexcept {
  const double half_x = portal.half_u.length(), half_y = portal.half_v.length();
  x_ = portal.half_u / half_x;
  y_ = portal.half_v / half_y;
  z_ = x_.cross(y_);
  const Vec3 d = portal.centre - Vec3(from);
  z0_ = z_.dot(d);
  if (z0_ > 0.0) {
    z_ = -z_;
    z0_ = -z0_;
  }
  x0_ = x_.dot(d) - half_x;
  x1_ = x_.dot(d) + half_x;
  y0_ = y_.dot(d) - half_y;
  y1_ = y_.dot(d) + half_y;
  // Normals of the planes through the viewer and each side, of which the component along z matters.
  const auto normal_z = [&](double a) { return a / std::sqrt(z0_ * z0_ + a * a); };
  const double n0 = -normal_z(y0_), n1 = normal_z(x1_), n2 = normal_z(y1_), n3 = -normal_z(x0_);
  const auto angle = [](double a, double b) { return std::acos(std::clamp(-a * b, -1.0, 1.0)); };
  const double g0 = angle(n0, n1), g1 = angle(n1, n2), g2 = angle(n2, n3), g3 = angle(n3, n0);
  b0_ = n0;
  b1_ = n2;
  k_ = kTwoPi - g2 - g3;
  solid_angle_ = z0_ < 0.0 ? g0 + g1 - k_ : 0.0;
}

Vec3f PortalView::sample(float u1, float u2) const noexcept {
  const double au = static_cast<double>(u1) * solid_angle_ + k_;
  const double fu = (std::cos(au) * b0_ - b1_) / std::sin(au);
  const double cu = std::clamp(std::copysign(1.0, fu) / std::sqrt(fu * fu + b0_ * b0_), -1.0, 1.0);
  const double xu = std::clamp(-(cu * z0_) / std::sqrt(std::max(1e-300, 1.0 - cu * cu)), x0_, x1_);
  const double d2 = xu * xu + z0_ * z0_;
  const double h0 = y0_ / std::sqrt(d2 + y0_ * y0_), h1 = y1_ / std::sqrt(d2 + y1_ * y1_);
  const double hv = h0 + static_cast<double>(u2) * (h1 - h0), hv2 = hv * hv;
  const double yv = hv2 < 1.0 - 1e-12 ? hv * std::sqrt(d2 / (1.0 - hv2)) : y1_;
  return Vec3f((xu * x_ + std::clamp(yv, y0_, y1_) * y_ + z0_ * z_).normalized());
}

bool PortalView::contains(const Vec3f& direction) const noexcept {
  const Vec3 d(direction);
  const double along = z_.dot(d);
  if (!(along < 0.0)) return false;
  const double s = z0_ / along, x = s * x_.dot(d), y = s * y_.dot(d);
  return x >= x0_ && x <= x1_ && y >= y0_ && y <= y1_;
}

}  // namespace whorl::shaders_cpu
