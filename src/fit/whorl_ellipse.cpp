// SPDX-License-Identifier: Apache-2.0
// Supports and flanks of an ellipse; sutures by bracketing on its outline.
#include "fit/whorl_ellipse.h"

#include "math/bracketed_root.h"

#include <cmath>

namespace whorl::fit {

using growth::HalfPlanePoint;

WhorlEllipse::WhorlEllipse(const growth::CoilingLaw& law, double theta)
    : station_(law.at(theta)), a_(station_.half_breadth), b_(law.S * a_), c_(law.roll_cos), s_(law.roll_sin) {}

// The section's axes in the half-plane: x = (c, s), y = (s, -c) in (rho, z), see CoilingLaw::to_half_plane.
double WhorlEllipse::support(double n_rho, double n_z) const {
  const double along_x = a_ * (n_rho * c_ + n_z * s_), along_y = b_ * (n_rho * s_ - n_z * c_);
  return station_.distance * n_rho + station_.depth * n_z + std::hypot(along_x, along_y);
}

HalfPlanePoint WhorlEllipse::support_point(double n_rho, double n_z) const {
  return point(std::atan2(b_ * (n_rho * s_ - n_z * c_), a_ * (n_rho * c_ + n_z * s_)));
}

HalfPlanePoint WhorlEllipse::point(double psi) const {
  const double x = a_ * std::cos(psi), y = b_ * std::sin(psi);
  return {station_.distance + x * c_ + y * s_, station_.depth + x * s_ - y * c_};
}

double WhorlEllipse::angle_of(HalfPlanePoint p) const {
  const double u = p.rho - station_.distance, v = station_.depth - p.z;
  return std::atan2((u * s_ + v * c_) / b_, (u * c_ - v * s_) / a_);
}

double WhorlEllipse::level(HalfPlanePoint p) const {
  const double u = p.rho - station_.distance, v = station_.depth - p.z;
  return std::hypot((u * c_ - v * s_) / a_, (u * s_ + v * c_) / b_);
}

std::optional<double> WhorlEllipse::flank_at(double z) const {
  const double v = station_.depth - z;
  const double A = c_ * c_ / (a_ * a_) + s_ * s_ / (b_ * b_);
  const double B = c_ * s_ * (1.0 / (b_ * b_) - 1.0 / (a_ * a_));
  const double C = s_ * s_ / (a_ * a_) + c_ * c_ / (b_ * b_);
  const double inside = B * B * v * v - A * (C * v * v - 1.0);
  if (inside < 0.0) return std::nullopt;
  return station_.distance + (-B * v + std::sqrt(inside)) / A;
}

std::optional<HalfPlanePoint> suture_point(const WhorlEllipse& later, const WhorlEllipse& earlier) {
  constexpr int kSteps = 24;
  const double from = later.angle_of(later.support_point(1.0, 0.0));
  double to = later.angle_of(later.support_point(0.0, -1.0));
  if (to < from) to += kTwoPi;
  // By how much the later flank stands out from the earlier one at the same depth.
  const auto lead = [&](double psi) {
    const HalfPlanePoint p = later.point(psi);
    const std::optional<double> flank = earlier.flank_at(p.z);
    return p.rho - (flank ? *flank : 0.0);
  };
  double before = from, lead_before = lead(from);
  if (lead_before <= 0.0) return std::nullopt;
  for (int i = 1; i <= kSteps; ++i) {
    const double psi = from + (to - from) * i / kSteps, here = lead(psi);
    if (here <= 0.0) return later.point(bracketed_root(lead, before, psi, lead_before, here));
    before = psi;
    lead_before = here;
  }
  const HalfPlanePoint edge = later.point(to);
  if (edge.z <= earlier.top()) return std::nullopt;
  return edge;
}

HalfPlanePoint umbilical_seam(const WhorlEllipse& later, const WhorlEllipse& earlier) {
  constexpr int kSteps = 24;
  const double from = later.angle_of(later.support_point(0.0, 1.0));
  double to = later.angle_of(later.support_point(-1.0, 0.0));
  if (to > from) to -= kTwoPi;
  const auto clear = [&](double psi) { return earlier.level(later.point(psi)) - 1.0; };
  double before = from, clear_before = clear(from);
  for (int i = 1; i <= kSteps && clear_before > 0.0; ++i) {
    const double psi = from + (to - from) * i / kSteps, here = clear(psi);
    if (here <= 0.0) return later.point(bracketed_root(clear, before, psi, clear_before, here));
    before = psi;
    clear_before = here;
  }
  return later.point(clear_before > 0.0 ? to : from);
}

}  // namespace whorl::fit
