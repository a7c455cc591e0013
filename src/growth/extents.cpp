// SPDX-License-Identifier: Apache-2.0
// Sampled extents of the outlines. Sampling errors are of second order in the spacing: under 2e-5 of the size.
#include "growth/extents.h"

#include <algorithm>
#include <limits>

namespace whorl::growth {
namespace {

Vec3 in_space(HalfPlanePoint p, double theta) { return {p.rho * std::cos(theta), p.rho * std::sin(theta), p.z}; }

HalfPlanePoint outline_point(const Exterior& shell, double theta, double psi) {
  const double R = shell.reach.value(psi);
  return shell.law.to_half_plane(shell.law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
}

// The outline with its sculpture: moved along its normal in the half-plane.
HalfPlanePoint raised_point(const Exterior& shell, double theta, double psi) {
  HalfPlanePoint p = outline_point(shell, theta, psi);
  if (shell.sculpture.empty()) return p;
  constexpr double kStep = 1e-4;
  const HalfPlanePoint a = outline_point(shell, theta, psi - kStep), b = outline_point(shell, theta, psi + kStep);
  const double along_rho = b.rho - a.rho, along_z = b.z - a.z, length = std::hypot(along_rho, along_z);
  const Station s = shell.law.at(theta);
  const double growth = theta - front_lead(shell.tan_inclination, s.depth, p);
  const double height = s.half_breadth * shell.sculpture.height(growth, psi, s.half_breadth / shell.law.half_breadth);
  // Section angles run from outwards to the apex, against the sense of (rho, z): the normal is to the left of their way.
  p.rho += -along_z / length * height;
  p.z += along_rho / length * height;
  return p;
}

bool inside_outline(const Exterior& shell, double theta, HalfPlanePoint p) {
  const SectionPoint q = shell.law.to_section(shell.law.at(theta), p);
  return std::hypot(q.x, q.y) < shell.reach.value(std::atan2(q.y, q.x));
}

// Corners of the convex hull, counter-clockwise, by the monotone chain (Andrew 1979, Inform. Process. Lett. 9(5)).
std::vector<Vec2> convex_hull(std::vector<Vec2> points) {
  std::sort(points.begin(), points.end(), [](const Vec2& a, const Vec2& b) { return a.x != b.x ? a.x < b.x : a.y < b.y; });
  std::vector<Vec2> hull;
  for (int pass = 0; pass < 2; ++pass) {
    const std::size_t base = hull.size();
    for (const Vec2& p : points) {
      while (hull.size() >= base + 2 && (hull.back() - hull[hull.size() - 2]).cross(p - hull.back()) <= 0.0) hull.pop_back();
      hull.push_back(p);
    }
    if (!hull.empty()) hull.pop_back();  // the other chain begins with it
    std::reverse(points.begin(), points.end());
  }
  return hull;
}

}  // namespace

ChamberShape embryonic_chamber(const CoilingLaw& law) {
  // Half a half-breadth beyond the first section's centre: closes the axis for every D and stays under the next whorl.
  constexpr double kPastCentre = 0.5;
  const Station s = law.at(law.theta_start);
  return {s.depth, s.distance + kPastCentre * s.half_breadth, law.S * s.half_breadth};
}

double front_theta(const Exterior& shell, double psi) {
  double theta = shell.law.theta_lip;
  for (int round = 0; round < 50; ++round) {
    const HalfPlanePoint p = outline_point(shell, theta, psi);
    const double next = shell.law.theta_lip + front_lead(shell.tan_inclination, shell.law.depth, p);
    if (std::abs(next - theta) < 1e-13) break;
    theta = next;
  }
  return theta;
}

Mouth mouth(const Exterior& shell) {
  constexpr int kSamples = 16384;
  constexpr int kTurns = 4;  // whorls older than this lie behind younger ones
  double z_lo = std::numeric_limits<double>::infinity(), z_hi = -z_lo, rho_lo = z_lo, rho_hi = -z_lo;
  const auto take = [&](HalfPlanePoint p) {
    z_lo = std::min(z_lo, p.z);
    z_hi = std::max(z_hi, p.z);
    rho_lo = std::min(rho_lo, p.rho);
    rho_hi = std::max(rho_hi, p.rho);
  };
  const auto covered = [&](double theta, HalfPlanePoint p, int own_turn) {
    for (int turn = 1; turn <= kTurns && theta - turn * kTwoPi > shell.law.theta_start; ++turn)
      if (turn != own_turn && inside_outline(shell, theta - turn * kTwoPi, p)) return true;
    return false;
  };
  for (int i = 0; i < kSamples; ++i) {
    const double psi = kTwoPi * i / kSamples;
    const double theta = front_theta(shell, psi);
    const HalfPlanePoint p = outline_point(shell, theta, psi);
    if (p.rho >= 0.0 && !covered(theta, p, 0)) take(p);
  }
  // Where earlier whorls stand in the mouth, their outline bounds it too.
  for (int turn = 1; turn <= kTurns && shell.law.theta_lip - turn * kTwoPi > shell.law.theta_start; ++turn)
    for (int i = 0; i < kSamples; ++i) {
      const double psi = kTwoPi * i / kSamples;
      double theta = shell.law.theta_lip;
      HalfPlanePoint p{};
      for (int round = 0; round < 20; ++round) {
        p = outline_point(shell, theta - turn * kTwoPi, psi);
        theta = shell.law.theta_lip + front_lead(shell.tan_inclination, shell.law.depth, p);
      }
      if (p.rho >= 0.0 && inside_outline(shell, theta, p) && !covered(theta, p, turn)) take(p);
    }
  return {z_hi - z_lo, rho_hi - rho_lo};
}

std::vector<Vec3> surface_points(const Exterior& shell, int turn_steps, int around) {
  std::vector<Vec3> points;
  const ChamberShape chamber = embryonic_chamber(shell.law);
  for (int i = 0; i <= around / 2; ++i)
    for (int j = 0; j < around; ++j) {
      const double polar = kTwoPi * i / around, azimuth = kTwoPi * j / around;
      points.push_back({chamber.radius * std::sin(polar) * std::cos(azimuth),
                        chamber.radius * std::sin(polar) * std::sin(azimuth),
                        chamber.centre_z - chamber.half_height * std::cos(polar)});
    }
  // Width and mouth are the last whorls'; earlier ones count for the apex only, and along growth their depth has its extremes
  // at the ends.
  constexpr double kFine = 1.5 * kTwoPi;
  constexpr int kCoarser = 6;
  const double start = shell.law.theta_start;
  for (int j = 0; j < around; ++j) {
    const double psi = kTwoPi * j / around, end = front_theta(shell, psi), fine_from = std::max(start, end - kFine);
    const auto walk = [&](double from, double to, int per_turn) {
      const int steps = std::max(1, static_cast<int>(std::ceil((to - from) / kTwoPi * per_turn)));
      for (int i = 0; i <= steps; ++i) {
        const double theta = from + (to - from) * i / steps;
        HalfPlanePoint p = raised_point(shell, theta, psi);
        p.rho = std::max(p.rho, 0.0);
        points.push_back(in_space(p, theta));
      }
    };
    if (fine_from > start) walk(start, fine_from, std::max(1, turn_steps / kCoarser));
    walk(fine_from, end, turn_steps);
  }
  return points;
}

double height_of(const std::vector<Vec3>& points) {
  double lo = std::numeric_limits<double>::infinity(), hi = -lo;
  for (const Vec3& p : points) {
    lo = std::min(lo, p.z);
    hi = std::max(hi, p.z);
  }
  return hi - lo;
}

double width_of(const std::vector<Vec3>& points) {
  // The greatest caliper width is the greatest distance of two points of the projection onto the plane across the axis:
  // two corners of its convex hull.
  double farthest = 0.0;
  for (const Vec3& p : points) farthest = std::max(farthest, std::hypot(p.x, p.y));
  std::vector<Vec2> outer;  // a point nearer to the axis than half of the farthest can't end the greatest width
  for (const Vec3& p : points)
    if (std::hypot(p.x, p.y) >= 0.5 * farthest) outer.emplace_back(p.x, p.y);
  const std::vector<Vec2> hull = convex_hull(std::move(outer));
  double width = 0.0;
  for (std::size_t i = 0; i < hull.size(); ++i)
    for (std::size_t j = i + 1; j < hull.size(); ++j) width = std::max(width, (hull[i] - hull[j]).length());
  return width;
}

}  // namespace whorl::growth
