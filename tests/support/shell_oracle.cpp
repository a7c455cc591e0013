// SPDX-License-Identifier: Apache-2.0
// Searches by grids that close in on the best place.
#include "support/shell_oracle.h"

#include "support/shell_specimen.h"

#include <algorithm>
#include <functional>
#include <limits>
#include <vector>

namespace whorl::test {
namespace {

struct Rectangle {
  double x0, x1, y0, y1;
};

struct Best {
  double x = 0.0, y = 0.0, value = -std::numeric_limits<double>::infinity();
};

// Greatest value over a rectangle: a grid, then ever smaller grids around the best node.
Best maximum(const std::function<double(double, double)>& f, Rectangle r, int across, int up) {
  Best best;
  const Rectangle whole = r;
  for (int round = 0; round < 12; ++round) {
    const double dx = (r.x1 - r.x0) / across, dy = up > 0 ? (r.y1 - r.y0) / up : 0.0;
    for (int j = 0; j <= up; ++j)
      for (int i = 0; i <= across; ++i) {
        const double x = r.x0 + i * dx, y = r.y0 + j * dy, v = f(x, y);
        if (v > best.value) best = {x, y, v};
      }
    r = {std::max(whole.x0, best.x - 1.5 * dx), std::min(whole.x1, best.x + 1.5 * dx),
         std::max(whole.y0, best.y - 1.5 * dy), std::min(whole.y1, best.y + 1.5 * dy)};
    across = 12;
    if (up > 0) up = 12;
  }
  return best;
}

// Where the growth front through the lip stands at a place of the half-plane.
double front_at(const growth::Exterior& shell, growth::HalfPlanePoint p) {
  return shell.law.theta_lip + std::atan2(shell.tan_inclination * (shell.law.depth - p.z), std::max(p.rho, 0.0));
}

growth::HalfPlanePoint outline(const growth::Exterior& shell, double theta, double psi) {
  const double R = shell.reach.value(psi);
  return shell.law.to_half_plane(shell.law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
}

// The last growth angle of the line of section angle psi: halving between places behind and before the front.
double last_theta(const growth::Exterior& shell, double psi) {
  if (shell.tan_inclination == 0.0) return shell.law.theta_lip;
  double lo = shell.law.theta_lip - 0.5 * kPi, hi = shell.law.theta_lip + 0.5 * kPi;
  for (int i = 0; i < 40; ++i) {
    const double mid = 0.5 * (lo + hi);
    (mid < front_at(shell, outline(shell, mid, psi)) ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi);
}

// Greatest of a function of growth angle and place over the tube's outside, from `from` on to the front.
struct OnTube {
  double theta, psi, value;
};
OnTube greatest(const growth::Exterior& shell, double from, const std::function<double(const Vec3&)>& f) {
  const auto value = [&](double part, double psi) {
    const double theta = from + part * (last_theta(shell, psi) - from);
    growth::HalfPlanePoint p = outline(shell, theta, psi);
    p.rho = std::max(p.rho, 0.0);
    return f(in_space(theta, p));
  };
  const Best best = maximum(value, {0.0, 1.0, -kPi, kPi}, 96, 36);
  return {from + best.x * (last_theta(shell, best.y) - from), best.y, best.value};
}

}  // namespace

double searched_height(const growth::Exterior& shell) {
  const growth::Station start = shell.law.at(shell.law.theta_start);
  const double chamber = shell.law.S * start.half_breadth;  // the embryonic cap, as high as the first section
  const double bottom = greatest(shell, shell.law.theta_start, [](const Vec3& p) { return p.z; }).value;
  const double top = greatest(shell, shell.law.theta_start, [](const Vec3& p) { return -p.z; }).value;
  return std::max(bottom, start.depth + chamber) + std::max(top, chamber - start.depth);
}

double searched_width(const growth::Exterior& shell) {
  // Two turns hold all that can end the width. Each end in turn is put as far from the other as it goes.
  const double from = std::max(shell.law.theta_start, shell.law.theta_lip - 2.0 * kTwoPi);
  double width = 0.0;
  for (int side = 0; side < 4; ++side) {
    const double a = kTwoPi * side / 4;
    Vec3 end = 100.0 * shell.law.distance * Vec3(std::cos(a), std::sin(a), 0.0);
    for (int round = 0; round < 6; ++round) {
      const OnTube far = greatest(shell, from, [&](const Vec3& p) { return std::hypot(p.x - end.x, p.y - end.y); });
      growth::HalfPlanePoint p = outline(shell, far.theta, far.psi);
      p.rho = std::max(p.rho, 0.0);
      end = in_space(far.theta, p);
      if (round > 0) width = std::max(width, far.value);
    }
  }
  return width;
}

MouthExtents searched_mouth(const growth::Exterior& shell) {
  // The mouth's extremes lie on the last outline, where no earlier whorl covers it, or where such a stretch ends.
  const auto at = [&](double psi) { return outline(shell, last_theta(shell, psi), psi); };
  const auto open = [&](double psi) {
    const growth::HalfPlanePoint p = at(psi);
    if (p.rho < 0.0) return false;
    for (double earlier = last_theta(shell, psi) - kTwoPi; earlier > shell.law.theta_start; earlier -= kTwoPi) {
      const growth::SectionPoint q = shell.law.to_section(shell.law.at(earlier), p);
      if (std::hypot(q.x, q.y) < shell.reach.value(std::atan2(q.y, q.x))) return false;
    }
    return true;
  };
  constexpr int kGrid = 2000;
  std::vector<double> ends;
  for (int i = 0; i < kGrid; ++i) {
    double a = kTwoPi * i / kGrid, b = kTwoPi * (i + 1) / kGrid;
    const bool first = open(a);
    if (first == open(b)) continue;
    for (int k = 0; k < 40; ++k) {
      const double mid = 0.5 * (a + b);
      (open(mid) == first ? a : b) = mid;
    }
    ends.push_back(first ? a : b);
  }
  const auto extreme = [&](double along_rho, double along_z) {
    const auto value = [&](double psi, double) {
      const growth::HalfPlanePoint p = at(psi);
      return along_rho * p.rho + along_z * p.z;
    };
    const double nothing = -std::numeric_limits<double>::infinity();
    double best = maximum([&](double psi, double) { return open(psi) ? value(psi, 0.0) : nothing; }, {0.0, kTwoPi, 0.0, 0.0},
                          kGrid, 0).value;
    for (const double psi : ends) best = std::max(best, value(psi, 0.0));
    return best;
  };
  return {extreme(0.0, 1.0) + extreme(0.0, -1.0), extreme(1.0, 0.0) + extreme(-1.0, 0.0)};
}

Foot nearest_on_tube(const growth::CoilingLaw& law, const PeriodicSpline& reach, const Vec3& p, double theta) {
  const auto nearness = [&](double t, double psi) { return -(in_tube(law, t, psi, reach.value(psi)) - p).length(); };
  const Best near = maximum(nearness, {theta - 1.2, theta + 1.2, -kPi, kPi}, 60, 140);
  const Best best = maximum(nearness, {near.x - 0.1, near.x + 0.1, near.y - 0.1, near.y + 0.1}, 20, 20);  // past +-180 too
  return {best.x, best.y, -best.value};
}

}  // namespace whorl::test
