// SPDX-License-Identifier: Apache-2.0
// From growth and section angle to a place and its directions.
#include "growth/surface_frame.h"

#include <cmath>

namespace whorl::growth {
namespace {

HalfPlanePoint plain_point(const Exterior& shell, double theta, double psi) {
  const double R = shell.reach.value(psi);
  return shell.law.to_half_plane(shell.law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
}

// Growth angle at which the front of this growth crosses the line of section angle psi.
double theta_of(const Exterior& shell, double growth, double psi) {
  double theta = growth;
  if (shell.tan_inclination == 0.0) return theta;
  for (int round = 0; round < 50; ++round) {
    const double next = growth + front_lead(shell.tan_inclination, shell.law.at(theta).depth, plain_point(shell, theta, psi));
    const double change = std::abs(next - theta);
    theta = next;
    if (change < 1e-12) break;
  }
  return theta;
}

Vec3 in_space(HalfPlanePoint p, double theta) { return {p.rho * std::cos(theta), p.rho * std::sin(theta), p.z}; }

Vec3 on_growth_line(const Exterior& shell, double growth, double psi) {
  const double theta = theta_of(shell, growth, psi);
  return in_space(plain_point(shell, theta, psi), theta);
}

}  // namespace

SurfaceFrame surface_frame(const Exterior& shell, double growth, double psi) {
  SurfaceFrame f;
  f.theta = theta_of(shell, growth, psi);
  const Station s = shell.law.at(f.theta);
  f.scale = s.half_breadth / shell.law.half_breadth;
  const SurfaceNormal n = surface_normal(shell.law, f.theta, shell.reach, psi);
  const double c = std::cos(f.theta), w = std::sin(f.theta);
  f.normal = {n.rho * c - n.along * w, n.rho * w + n.along * c, n.z};
  constexpr double kStep = 1e-4;
  const Vec3 line = on_growth_line(shell, growth, psi + kStep) - on_growth_line(shell, growth, psi - kStep);
  f.across = (line - f.normal * f.normal.dot(line)).normalized();
  f.forward = f.across.cross(f.normal);
  const Vec3 on = on_growth_line(shell, growth + kStep, psi) - on_growth_line(shell, growth - kStep, psi);
  if (f.forward.dot(on) < 0.0) f.forward = -f.forward;
  f.point = in_space(plain_point(shell, f.theta, psi), f.theta);
  if (!shell.sculpture.empty()) f.point += f.normal * (s.half_breadth * shell.sculpture.height(growth, psi, f.scale));
  return f;
}

}  // namespace whorl::growth
