// SPDX-License-Identifier: Apache-2.0
// Lamellae lie across growth, stripes along it.
#include "trace/ledge.h"

#include <algorithm>
#include <cmath>

namespace whorl::trace {
namespace {

constexpr double kEdge = 0.4;      // a lamella's thickness at its edge / at its foot
constexpr double kRounding = 0.5;  // radius of its rounded edge / half its thickness there

// Height of a ledge's crest, with v from 0 in the middle to 1 at the ends of its reach.
double crest_share(double v) noexcept { return std::sqrt(std::max(0.0, 1.0 - v * v)); }

double lamella(const scene::Ledge& l, const field::Field::OnTube& at) noexcept {
  const double v = l.reach > 0.0 ? std::remainder(at.psi - l.psi, kTwoPi) / l.reach : 0.0;
  const double height = l.height * crest_share(v);
  const double along = (at.growth - l.growth) * at.across;
  const double cos_lean = 1.0 / std::sqrt(1.0 + l.tan_lean * l.tan_lean);
  const double off = std::abs(along - at.elevation * l.tan_lean) * cos_lean;
  const double up = height > 0.0 ? std::clamp(at.elevation / height, 0.0, 1.0) : 1.0;
  const double half = l.half_thickness * (1.0 - (1.0 - kEdge) * up);
  return field::rounded_min(half - off, height - at.elevation, kRounding * kEdge * l.half_thickness);
}

double stripe(const scene::Ledge& l, double scale_there, const field::Field::OnTube& at) noexcept {
  const double height = l.height * (l.power == 1.0 ? at.scale / scale_there : std::pow(at.scale / scale_there, l.power));
  const double v = std::remainder(at.psi - l.psi, kTwoPi) / l.reach, e = std::max(0.0, at.elevation) / height;
  // An upright half ellipse; its lesser half-axis makes a length of it.
  return std::min(height, 0.5 * l.reach * at.rho) * (1.0 - std::hypot(v, e));
}

}  // namespace

double value_of(const scene::Ledge& l, const field::Field& field, const Vec3& p) noexcept {
  const scene::Scene& scene = field.scene();
  const field::Field::OnTube at = field.on_tube(p, l.growth);
  double value;
  double clip;  // mm within the piece's ends
  if (l.run == scene::Ledge::Run::kRoundSection) {
    value = lamella(l, at);
    const double middle = 0.5 * (l.from + l.to), half = 0.5 * (l.to - l.from);
    clip = (half - std::abs(std::remainder(at.psi - middle, kTwoPi))) * at.scale * scene.law.half_breadth * std::min(1.0, scene.law.S);
  } else {
    value = stripe(l, scene.law.at(l.growth).half_breadth / scene.law.half_breadth, at);
    clip = std::min(at.growth - l.from, l.to - at.growth) * at.across;
  }
  return std::min({value, at.elevation + l.sunk, clip});
}

Box3 box_of(const scene::Ledge& l, const field::Field& field) {
  const scene::Scene& scene = field.scene();
  const growth::Outline& outline = scene.outlines[scene.stations.front().outer];
  Box3 box;
  constexpr int kAlong = 8, kUp = 2;
  const double whorl = scene.law.at(l.to > l.from && l.run == scene::Ledge::Run::kAlongGrowth ? l.to : l.growth).half_breadth /
                       scene.law.at(l.growth).half_breadth;
  const double top = l.height * std::max(1.0, std::pow(whorl, l.power));
  const bool round_section = l.run == scene::Ledge::Run::kRoundSection;
  // Corners of a grid over the piece, from its foot to its top.
  const auto take = [&](double growth, double psi, double up) {
    double theta = growth;
    growth::HalfPlanePoint q{};
    for (int round = 0; round < 20; ++round) {
      const double R = outline.reach.value(psi);
      q = scene.law.to_half_plane(scene.law.at(theta), {R * std::cos(psi), R * std::sin(psi)});
      theta = growth + growth::front_lead(scene.front.tan_inclination, scene.law.at(theta).depth, q);
    }
    const growth::SurfaceNormal n = growth::surface_normal(scene.law, theta, outline.reach, psi);
    const double c = std::cos(theta), s = std::sin(theta);
    const Vec3 normal(n.rho * c - n.along * s, n.rho * s + n.along * c, n.z), foot(q.rho * c, q.rho * s, q.z);
    Vec3 rise = normal;
    if (round_section) {
      // Lamellae rise in the growth front, which may lean far off the normal.
      const double step = 1e-4 * scene.law.half_breadth;
      Vec3 across;
      for (int k = 0; k < 3; ++k) {
        Vec3 a = foot, b = foot;
        a[k] -= step;
        b[k] += step;
        across[k] = field.on_tube(b, theta).growth - field.on_tube(a, theta).growth;
      }
      across.normalize();
      const double lean = across.dot(normal);
      rise = (normal - lean * across) / std::max(0.1, 1.0 - lean * lean);
    }
    box.extendBy(foot + up * rise);
  };
  for (int k = 0; k <= kUp; ++k) {
    const double up = -l.sunk + (top + l.sunk) * k / kUp;
    for (int i = 0; i <= kAlong; ++i) {
      const double run = l.from + (l.to - l.from) * i / kAlong;
      if (round_section)
        take(l.growth, run, up);
      else
        for (const double across : {-1.0, -0.5, 0.0, 0.5, 1.0}) take(run, l.psi + across * l.reach, up);
    }
  }
  // What stands off the grid: the curve of the surface between its lines, thickness and lean, and that elevations are lengths to a few percent.
  const double lean = round_section ? l.half_thickness + std::abs(l.tan_lean) * (top + l.sunk) : 0.0;
  const Vec3 room(lean + 0.1 * top + 0.02 * (box.max - box.min).length());
  return {box.min - room, box.max + room};
}

}  // namespace whorl::trace
