// SPDX-License-Identifier: Apache-2.0
// Lobes, surface normals and the wall taken off along them.
#include "growth/outline.h"

#include "math/falloff.h"

#include <algorithm>
#include <limits>

namespace whorl::growth {
namespace {

// Samples a turn: enough that the spline's error, 5.8 (spacing / lobe half-width)^4 / 384 of a lobe, stays under 6e-5 of it
// (lobes narrower than 3 degrees: up to 4e-3 of one of a single degree).
constexpr int kPlainSamples = 128;
constexpr int kMostSamples = 1024;

int samples_for(const std::vector<specimen::Lobe>& lobes) {
  int n = kPlainSamples;
  for (const specimen::Lobe& lobe : lobes)
    while (n < kMostSamples && 360.0 / n > 0.12 * lobe.width_deg) n *= 2;
  return n;
}

double psi_of(int i, int n) { return kTwoPi * i / n; }

}  // namespace

PeriodicSpline outer_reach(const std::vector<specimen::Lobe>& lobes) {
  if (lobes.empty()) return PeriodicSpline(1.0);
  const int n = samples_for(lobes);
  std::vector<double> samples(static_cast<std::size_t>(n), 1.0);
  for (const specimen::Lobe& lobe : lobes) {
    const double kappa = std::log(2.0) / (1.0 - std::cos(radians(0.5 * lobe.width_deg)));
    for (int i = 0; i < n; ++i)
      samples[static_cast<std::size_t>(i)] +=
          lobe.reach * std::exp(kappa * (std::cos(psi_of(i, n) - radians(lobe.at_deg)) - 1.0));
  }
  return PeriodicSpline(samples);
}

SurfaceNormal surface_normal(const CoilingLaw& law, double theta, const PeriodicSpline& reach, double psi) {
  const Station s = law.at(theta);
  double R, slope;
  reach.value_and_slope(psi, R, slope);
  const double c = std::cos(psi), n = std::sin(psi);
  // t = |q| / reach(arg q) at |q| = R: radial derivative 1/R, tangential -reach'/R^2.
  const double radial = 1.0 / R, tangential = -slope / (R * R);
  const double gx = radial * c - tangential * n, gy = radial * n + tangential * c;
  const double per_x = gx / s.half_breadth, per_y = gy / (law.S * s.half_breadth);
  const double g_rho = per_x * law.roll_cos + per_y * law.roll_sin;
  const double g_v = -per_x * law.roll_sin + per_y * law.roll_cos;
  const SectionPoint q{R * c, R * n};
  const SectionPoint dq = law.drift(theta, s, q);
  const double rho = std::max(law.to_half_plane(s, q).rho, 0.05 * s.half_breadth);
  const double g_along = (gx * dq.x + gy * dq.y) / rho;
  const double length = std::sqrt(g_rho * g_rho + g_v * g_v + g_along * g_along);
  return {g_rho / length, -g_v / length, g_along / length, length};
}

Outline with_normal_scale(const CoilingLaw& law, double theta, PeriodicSpline reach) {
  const int n = std::max(kPlainSamples, static_cast<int>(reach.sample_count()));
  std::vector<double> scale(static_cast<std::size_t>(n));
  const double half_breadth = law.at(theta).half_breadth;
  for (int i = 0; i < n; ++i)
    scale[static_cast<std::size_t>(i)] =
        1.0 / (half_breadth * surface_normal(law, theta, reach, psi_of(i, n)).gradient);
  return {std::move(reach), PeriodicSpline(scale)};
}

double front_lead(double tan_inclination, double depth_of_centre, HalfPlanePoint at) {
  return std::atan2(tan_inclination * (depth_of_centre - at.z), std::max(at.rho, 0.0));
}

double WallLaw::thickness(const CoilingLaw& law, double theta, HalfPlanePoint at) const {
  const Station s = law.at(theta);
  const double plain = proportional ? at_lip * s.half_breadth / law.half_breadth
                                    : std::min(at_lip, kMostOfTube * std::min(1.0, law.S) * s.half_breadth);
  const double behind = law.theta_lip - (theta - front_lead(tan_inclination, s.depth, at));
  return plain + (lip_thickness - plain) * smooth_step((kLipFades - behind) / (kLipFades - kLipWhole));
}

std::optional<PeriodicSpline> hollow_reach(const CoilingLaw& law, double theta, const PeriodicSpline& reach,
                                           const WallLaw& wall) {
  const int table = reach.is_constant() ? kPlainSamples : kMostSamples / 2;
  const int points = 4 * table;
  struct Polar {
    double psi, reach;
  };
  std::vector<Polar> curve(static_cast<std::size_t>(points));
  for (int i = 0; i < points; ++i) {
    const double psi = psi_of(i, points);
    // The inner point lies in another half-plane than the outer one it belongs to, since the surface's normal leans
    // along growth: find the outer point whose inner point falls on `theta`. The lean is slight; this converges fast.
    double outer_theta = theta;
    HalfPlanePoint inner{};
    for (int round = 0; round < 4; ++round) {
      const Station s = law.at(outer_theta);
      double R, slope;
      reach.value_and_slope(psi, R, slope);
      const HalfPlanePoint p = law.to_half_plane(s, {R * std::cos(psi), R * std::sin(psi)});
      const SurfaceNormal n = surface_normal(law, outer_theta, reach, psi);
      const double w = wall.thickness(law, outer_theta, p);
      const double across = p.rho - w * n.rho, along = -w * n.along;
      inner = {std::hypot(across, along), p.z - w * n.z};
      if (across <= 0.0) inner.rho = across;  // beyond the axis: only in tubes that cross it
      outer_theta = theta - (across > 0.0 ? std::atan2(along, across) : 0.0);
    }
    const SectionPoint q = law.to_section(law.at(theta), inner);
    const double towards = q.x * std::cos(psi) + q.y * std::sin(psi);
    if (towards <= kLeastLumen) return std::nullopt;  // the wall has met the one opposite
    curve[static_cast<std::size_t>(i)] = {std::atan2(q.y, q.x), std::hypot(q.x, q.y)};
  }
  // Where the wall is thicker than a keel is sharp, the offset curve crosses itself; the lumen is its innermost branch.
  std::vector<double> samples(static_cast<std::size_t>(table), std::numeric_limits<double>::infinity());
  for (int i = 0; i < points; ++i) {
    const Polar a = curve[static_cast<std::size_t>(i)];
    const Polar b = curve[static_cast<std::size_t>((i + 1) % points)];
    const double span = std::remainder(b.psi - a.psi, kTwoPi);
    const double from = std::min(a.psi, a.psi + span), to = std::max(a.psi, a.psi + span);
    const double step = kTwoPi / table;
    for (auto k = static_cast<long>(std::ceil(from / step - 1e-9)); static_cast<double>(k) * step <= to + 1e-9 * step; ++k) {
      const double f = span == 0.0 ? 0.0 : std::clamp((static_cast<double>(k) * step - a.psi) / span, 0.0, 1.0);
      double& sample = samples[static_cast<std::size_t>(((k % table) + table) % table)];
      sample = std::min(sample, a.reach + f * (b.reach - a.reach));
    }
  }
  for (const double sample : samples)
    if (!(sample > kLeastLumen && std::isfinite(sample))) return std::nullopt;
  return PeriodicSpline(samples);
}

}  // namespace whorl::growth
