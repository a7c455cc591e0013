// SPDX-License-Identifier: Apache-2.0
// Radial root finding in a half-plane, and the line that touches two outlines.
#include "measure/whorl_section.h"

#include <algorithm>
#include <cmath>

namespace whorl::measure {

double WhorlSection::support(double n_rho, double n_z) const {
  const auto along = [&](std::size_t i) { return n_rho * points[i].rho + n_z * points[i].z; };
  std::size_t best = 0;
  for (std::size_t i = 1; i < points.size(); ++i)
    if (along(i) > along(best)) best = i;
  // The summit of the parabola through the best point and its neighbours.
  const std::size_t n = points.size();
  const double a = along((best + n - 1) % n), b = along(best), c = along((best + 1) % n);
  const double bend = a - 2.0 * b + c;
  return bend < 0.0 ? b - (c - a) * (c - a) / (8.0 * bend) : b;
}

namespace {

// Of the function that is positive inside the outline.
WhorlSection section_of(const field::Field& field, double theta, double (field::Field::*inside)(const Vec3&, double) const noexcept) {
  constexpr int kDirections = 1440;
  const growth::Station s = field.scene().law.at(theta);
  const double c = std::cos(theta), n = std::sin(theta);
  const auto value = [&](growth::HalfPlanePoint p) {
    return (field.*inside)(Vec3(p.rho * c, p.rho * n, p.z), theta);
  };
  WhorlSection section;
  // Somewhere inside: the highest value on a coarse grid over the tube's reach.
  constexpr int kGrid = 40;
  const double reach = 1.5 * s.half_breadth * std::max(1.0, field.scene().law.S);
  double highest = 0.0;
  for (int j = 0; j <= kGrid; ++j)
    for (int i = 0; i <= kGrid; ++i) {
      const growth::HalfPlanePoint p{s.distance + reach * (2.0 * i / kGrid - 1.0), s.depth + reach * (2.0 * j / kGrid - 1.0)};
      const double v = p.rho > 0.0 ? value(p) : 0.0;
      if (v > highest) {
        highest = v;
        section.inside = p;
      }
    }
  if (highest <= 0.0) return section;
  section.rho_min = section.z_min = 1e300;
  section.rho_max = section.z_max = -1e300;
  for (int i = 0; i < kDirections; ++i) {
    const double a = kTwoPi * i / kDirections, dr = std::cos(a), dz = std::sin(a);
    const auto at = [&](double t) { return growth::HalfPlanePoint{section.inside.rho + t * dr, section.inside.z + t * dz}; };
    const double farthest = dr < 0.0 ? std::min(4.0 * reach, section.inside.rho / -dr) : 4.0 * reach;
    double lo = 0.0, hi = farthest;
    for (double t = 0.0; t < farthest; t += 0.02 * reach)
      if (value(at(t)) <= 0.0) {
        hi = t;
        break;
      } else {
        lo = t;
      }
    for (int k = 0; k < 50; ++k) {
      const double mid = 0.5 * (lo + hi);
      (value(at(mid)) > 0.0 ? lo : hi) = mid;
    }
    const growth::HalfPlanePoint p = at(0.5 * (lo + hi));
    section.points.push_back(p);
    section.rho_min = std::min(section.rho_min, p.rho);
  }
  section.rho_max = section.support(1.0, 0.0);
  section.rho_min = -section.support(-1.0, 0.0);
  section.z_max = section.support(0.0, 1.0);
  section.z_min = -section.support(0.0, -1.0);
  return section;
}

}  // namespace

WhorlSection whorl_section(const field::Field& field, double theta) { return section_of(field, theta, &field::Field::tube); }
WhorlSection lumen_section(const field::Field& field, double theta) { return section_of(field, theta, &field::Field::lumen); }

double touching_angle(const WhorlSection& last, const WhorlSection& before) {
  // Outward normal (cos beta, -sin beta) in (rho, z), beta from outwards through the apex: where both reach equally far, a
  // line touches both, and it leans by beta from the axis.
  const auto lead = [&](double beta) {
    return last.support(std::cos(beta), -std::sin(beta)) - before.support(std::cos(beta), -std::sin(beta));
  };
  double lo = 0.0, hi = kPi;
  for (int i = 0; i < 60; ++i) {
    const double mid = 0.5 * (lo + hi);
    (lead(mid) > 0.0 ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi);
}

}  // namespace whorl::measure
