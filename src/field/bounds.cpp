// SPDX-License-Identifier: Apache-2.0
// Bounds of the signed lengths over a box, and of how steep they are in it.
#include "field/field.h"
#include "field/relief_fade.h"
#include "field/stations.h"
#include "math/falloff.h"

#include <algorithm>
#include <cmath>

namespace whorl::field {
namespace {

constexpr double kS2 = scene::kSupport * scene::kSupport;
constexpr double kFrontReach = 2.6;  // as in field.cpp

struct Polar {
  Interval rho, theta;
};

// Distance from the axis, and growth angle of the passage nearest to `theta`, over a box.
Polar polar(const Box3& box, double theta) {
  const double nx = std::clamp(0.0, box.min.x, box.max.x), ny = std::clamp(0.0, box.min.y, box.max.y);
  const double fx = std::max(std::abs(box.min.x), std::abs(box.max.x));
  const double fy = std::max(std::abs(box.min.y), std::abs(box.max.y));
  const Interval rho(std::hypot(nx, ny), std::hypot(fx, fy));
  if (rho.lo == 0.0) return {rho, {theta - kPi, theta + kPi}};
  const double centre = std::atan2(0.5 * (box.min.y + box.max.y), 0.5 * (box.min.x + box.max.x));
  double lo = 0.0, hi = 0.0;
  for (const double x : {box.min.x, box.max.x})
    for (const double y : {box.min.y, box.max.y}) {
      const double d = std::remainder(std::atan2(y, x) - centre, kTwoPi);
      lo = std::min(lo, d);
      hi = std::max(hi, d);
    }
  const double middle = theta + std::remainder(centre - theta, kTwoPi);
  return {rho, {middle + lo, middle + hi}};
}

struct SectionBox {
  Polar at;
  Interval d, h, r, x, y, q2;
  double psi_from = 0.0, psi_span = kTwoPi;
};

SectionBox section_box(const growth::CoilingLaw& law, const Box3& box, const Polar& at) {
  SectionBox s;
  s.at = at;
  const growth::Station a = law.at(s.at.theta.lo), b = law.at(s.at.theta.hi);
  s.d = {a.distance, b.distance};
  s.h = {a.depth, b.depth};
  s.r = {a.half_breadth, b.half_breadth};
  const Interval u = s.at.rho - s.d, v = s.h - Interval(box.min.z, box.max.z);
  s.x = over_positive(law.roll_cos * u - law.roll_sin * v, s.r);
  s.y = over_positive(law.roll_sin * u + law.roll_cos * v, law.S * s.r);
  s.q2 = square(s.x) + square(s.y);
  if (!(s.x.contains(0.0) && s.y.contains(0.0))) {
    const double middle = std::atan2(0.5 * (s.y.lo + s.y.hi), 0.5 * (s.x.lo + s.x.hi));
    double lo = 0.0, hi = 0.0;
    for (const double x : {s.x.lo, s.x.hi})
      for (const double y : {s.y.lo, s.y.hi}) {
        const double d = std::remainder(std::atan2(y, x) - middle, kTwoPi);
        lo = std::min(lo, d);
        hi = std::max(hi, d);
      }
    s.psi_from = middle + lo;
    s.psi_span = hi - lo;
  }
  return s;
}

// Bounds over the outlines that can be active in a range of growth.
struct OutlineBounds {
  Interval reach, normal_scale;
  double reach_slope = 0.0, scale_slope = 0.0;
};

OutlineBounds outline_bounds(const scene::Scene& scene, const SectionBox& s, bool hollow, bool slopes) {
  const std::ptrdiff_t from = stations_at(scene, s.at.theta.lo).first, to = stations_at(scene, s.at.theta.hi).first + 3;
  OutlineBounds result;
  std::uint32_t last = ~0u;
  for (std::ptrdiff_t i = from; i <= to; ++i) {
    const scene::Station& station = scene.stations[static_cast<std::size_t>(i)];
    const std::uint32_t index = hollow ? station.hollow : station.outer;
    if (index == last) continue;
    const growth::Outline& outline = scene.outlines[index];
    const Interval reach = outline.reach.bounds(s.psi_from, s.psi_span);
    const Interval scale = outline.normal_scale.bounds(s.psi_from, s.psi_span);
    result.reach = last == ~0u ? reach : hull(result.reach, reach);
    result.normal_scale = last == ~0u ? scale : hull(result.normal_scale, scale);
    if (slopes) {
      result.reach_slope = std::max(result.reach_slope, outline.reach.slope_bound());
      result.scale_slope = std::max(result.scale_slope, outline.normal_scale.slope_bound());
    }
    last = index;
  }
  return result;
}

// Range of t^2 over the box.
Interval t2_range(const scene::Scene& scene, const SectionBox& s, const OutlineBounds& o, bool hollow, const Box3& box) {
  const double per_radian = hollow ? scene.hollow_cap_per_radian : scene.cap_per_radian;
  const double cap_hi = per_radian * std::max(0.0, scene.law.theta_start - s.at.theta.lo);
  const double cap_lo = per_radian * std::max(0.0, scene.law.theta_start - s.at.theta.hi);
  Interval t2(std::min(kS2, s.q2.lo / (o.reach.hi * o.reach.hi) + cap_lo * cap_lo),
              std::min(kS2, s.q2.hi / (o.reach.lo * o.reach.lo) + cap_hi * cap_hi));
  if (scene.ellipsoids.empty()) return t2;
  Interval f(wyvill(t2.hi / kS2), wyvill(t2.lo / kS2));
  for (const scene::Ellipsoid& e : scene.ellipsoids) {
    if (e.hollow != hollow) continue;
    // The box in the primitive's unit coordinates: centre and half-extents of each row.
    const Vec3 centre = 0.5 * (box.min + box.max) - e.centre, half = 0.5 * (box.max - box.min);
    double nearest2 = 0.0;
    for (const Vec3& row : e.to_unit) {
      const double c = std::abs(row.dot(centre));
      const double w = std::abs(row.x) * half.x + std::abs(row.y) * half.y + std::abs(row.z) * half.z;
      const double d = std::max(0.0, c - w);
      nearest2 += d * d;
    }
    if (nearest2 >= 1.0) continue;
    (e.weight > 0.0 ? f.hi : f.lo) += e.weight * wyvill(nearest2);
  }
  return {kS2 * (1.0 - std::cbrt(f.hi)), kS2 * (1.0 - std::cbrt(f.lo))};
}

Interval length_range(const SectionBox& s, const OutlineBounds& o, Interval t2) {
  const Interval scale = 0.5 * (s.r * o.normal_scale);
  return Interval(1.0 - t2.hi, 1.0 - t2.lo) * scale;
}

// Growth along growth lines: the growth angle less the front's lead, whose extremes are at corners.
Interval growth_range(const scene::Scene& scene, Interval theta, Interval rho, const Box3& box) {
  if (scene.front.tan_inclination == 0.0) return theta;
  Interval lead(0.0);
  bool any = false;
  for (const double at_theta : {theta.lo, theta.hi})
    for (const double r : {rho.lo, rho.hi})
      for (const double z : {box.min.z, box.max.z}) {
        const double v = growth::front_lead(scene.front.tan_inclination, scene.law.at(at_theta).depth, {r, z});
        lead = any ? hull(lead, Interval(v)) : Interval(v);
        any = true;
      }
  return theta - lead;
}

Interval front_range(const scene::Scene& scene, const SectionBox& s, const Box3& box) {
  const scene::Front& f = scene.front;
  Interval lead(0.0);
  bool any = false;
  for (const double rho : {s.at.rho.lo, s.at.rho.hi})
    for (const double z : {box.min.z, box.max.z}) {
      const double v = growth::front_lead(f.tan_inclination, scene.law.depth, {rho, z});
      lead = any ? hull(lead, Interval(v)) : Interval(v);
      any = true;
    }
  const Interval angle = Interval(scene.law.theta_lip) + lead - s.at.theta;
  return f.cos_inclination * (angle * s.at.rho) + Interval(f.rim_radius);
}

}  // namespace

void Field::whorl_bounds(const Box3& box, double theta, Interval& outer, Interval& hollow) const noexcept {
  // Over a wide range of growth (round the axis) the section's size and place would be bounded apart: piece by piece.
  constexpr double kPiece = 0.35;
  const Polar at = polar(box, theta);
  const int pieces = std::max(1, static_cast<int>(std::ceil(at.theta.width() / kPiece)));
  for (int i = 0; i < pieces; ++i) {
    const double step = at.theta.width() / pieces, from = at.theta.lo + i * step;
    Interval o, h;
    piece_bounds(box, at.rho, {from, i + 1 == pieces ? at.theta.hi : from + step}, o, h);
    outer = i == 0 ? o : hull(outer, o);
    hollow = i == 0 ? h : hull(hollow, h);
  }
}

Interval Field::relief_bounds(const Box3& box, const Interval& theta, const Interval& rho, double psi_from, double psi_span,
                              const Interval& half_breadth, const Interval& plain, const Interval& unit) const noexcept {
  const Interval t2 = Interval(1.0) - over_positive(2.0 * plain, unit);
  const Interval fade = relief_fade(t2);
  if (fade.hi == 0.0) return Interval(0.0);
  const Interval growth = growth_range(scene_, theta, rho, box);
  const Interval h = half_breadth * scene_.sculpture.range(growth, psi_from, psi_span, (1.0 / scene_.law.half_breadth) * half_breadth);
  return fade * (h + over_positive(0.5 * square(h), unit));
}

void Field::piece_bounds(const Box3& box, Interval rho, Interval theta, Interval& outer,
                         Interval& hollow) const noexcept {
  const SectionBox s = section_box(scene_.law, box, {rho, theta});
  if (s.at.theta.lo > scene_.theta_end) {
    outer = hollow = -s.r;
    return;
  }
  const OutlineBounds o = outline_bounds(scene_, s, false, false), i = outline_bounds(scene_, s, true, false);
  outer = length_range(s, o, t2_range(scene_, s, o, false, box));
  if (!scene_.sculpture.empty())
    outer = outer + relief_bounds(box, s.at.theta, s.at.rho, s.psi_from, s.psi_span, s.r, outer, s.r * o.normal_scale);
  if (scene_.pillar.present) {
    const Interval pillar = bounds({Part::kPillar, 0.0}, box);
    // Where the pillar's length is negative a larger radius brings it nearer to zero, elsewhere a smaller one raises it.
    const double thin = scene::Pillar::kFillet * s.r.lo, wide = scene::Pillar::kFillet * s.r.hi;
    const Interval unit = s.r * o.normal_scale;
    outer = {flared(outer.lo, pillar.lo, pillar.lo < 0.0 ? thin : wide, scene_.pillar.fillet_at(box.max.z) * unit.lo),
             flared(outer.hi, pillar.hi, pillar.hi < 0.0 ? wide : thin, scene_.pillar.fillet_at(box.min.z) * unit.hi)};
  }
  hollow = length_range(s, i, t2_range(scene_, s, i, true, box));
  if (s.at.theta.hi > scene_.law.theta_lip - kFrontReach) {
    const Interval behind = front_range(scene_, s, box);
    const double rim = scene_.front.rim_radius;
    const bool all = s.at.theta.lo > scene_.law.theta_lip - kFrontReach;
    outer = {rounded_min(outer.lo, behind.lo, rim), all ? rounded_min(outer.hi, behind.hi, rim) : outer.hi};
    hollow = {all ? -rounded_min(-hollow.lo, behind.hi, rim) : hollow.lo, -rounded_min(-hollow.hi, behind.lo, rim)};
  }
  if (s.at.theta.hi > scene_.theta_end) {
    outer = hull(outer, -s.r);
    hollow = hull(hollow, -s.r);
  }
}

Interval Field::bounds(const Term& term, const Box3& box) const noexcept {
  const scene::Chamber& c = scene_.chamber;
  const double nx = std::clamp(0.0, box.min.x, box.max.x), ny = std::clamp(0.0, box.min.y, box.max.y);
  const double fx = std::max(std::abs(box.min.x), std::abs(box.max.x));
  const double fy = std::max(std::abs(box.min.y), std::abs(box.max.y));
  const Interval rho2(nx * nx + ny * ny, fx * fx + fy * fy);
  const auto ellipsoid = [&](double radius, double half_height) {
    const Interval z2 = square((1.0 / half_height) * Interval(box.min.z - c.centre_z, box.max.z - c.centre_z));
    return 0.5 * std::min(radius, half_height) * (Interval(1.0) - (1.0 / (radius * radius)) * rho2 - z2);
  };
  switch (term.part) {
    case Part::kChamber: return ellipsoid(c.radius, c.half_height);
    case Part::kChamberHollow: return ellipsoid(c.hollow_radius, c.hollow_half_height);
    case Part::kPillar: {
      const scene::Pillar& pillar = scene_.pillar;
      const double span = pillar.bottom_z - pillar.top_z;
      const double a = std::clamp((box.min.z - pillar.top_z) / span, 0.0, 1.0);
      const double b = std::clamp((box.max.z - pillar.top_z) / span, 0.0, 1.0);
      return over_positive(0.5 * (pillar.squared_radius.bounds(kPi * a, kPi * (b - a)) - rho2),
                           pillar.unit.bounds(kPi * a, kPi * (b - a)));
    }
    case Part::kChamberOpening: {
      // A box across the seam half a turn from `theta` holds places of two passages.
      const Polar all = polar(box, term.theta);
      Interval range;
      bool any = false;
      for (const double turn : {-kTwoPi, 0.0, kTwoPi}) {
        const Interval part(std::max(all.theta.lo + turn, term.theta - kPi), std::min(all.theta.hi + turn, term.theta + kPi));
        if (part.lo > part.hi) continue;
        const SectionBox s = section_box(scene_.law, box, {all.rho, part});
        const OutlineBounds i = outline_bounds(scene_, s, true, false);
        const Interval open = length_range(s, i, t2_range(scene_, s, i, true, box)) -
                              Interval(opening_penalty(s.at.theta.lo), opening_penalty(s.at.theta.hi));
        range = any ? hull(range, open) : open;
        any = true;
      }
      return range;
    }
    case Part::kWhorl:
    case Part::kWhorlHollow: {
      Interval outer, hollow;
      whorl_bounds(box, term.theta, outer, hollow);
      return term.part == Part::kWhorl ? outer : hollow;
    }
  }
  return {};
}

double Field::steepness(const Term& term, const Box3& box) const noexcept {
  const scene::Chamber& c = scene_.chamber;
  const double rho = std::hypot(std::max(std::abs(box.min.x), std::abs(box.max.x)),
                                std::max(std::abs(box.min.y), std::abs(box.max.y)));
  const auto ellipsoid = [&](double radius, double half_height) {
    const double z = std::max(std::abs(box.min.z - c.centre_z), std::abs(box.max.z - c.centre_z));
    return std::min(radius, half_height) * std::hypot(rho / (radius * radius), z / (half_height * half_height));
  };
  if (term.part == Part::kChamber) return ellipsoid(c.radius, c.half_height);
  if (term.part == Part::kChamberHollow) return ellipsoid(c.hollow_radius, c.hollow_half_height);
  if (term.part == Part::kPillar) {
    const scene::Pillar& pillar = scene_.pillar;
    const double span = pillar.bottom_z - pillar.top_z;
    const double from = kPi * std::clamp((box.min.z - pillar.top_z) / span, 0.0, 1.0);
    const double turn = kPi * std::clamp((box.max.z - pillar.top_z) / span, 0.0, 1.0) - from;
    const double unit = pillar.unit.bounds(from, turn).lo;
    const double along = 0.5 * pillar.squared_radius.slope_bound(from, turn) +
                         bounds(term, box).magnitude() * pillar.unit.slope_bound(from, turn);
    return std::hypot(rho, along * kPi / span) / unit;
  }
  // d/dq and d/dpsi of r (1 - t^2)/2 * normal_scale, carried into space: in the half-plane by the section's size, along
  // growth by the drift of section coordinates over the arc.
  const growth::CoilingLaw& law = scene_.law;
  const bool hollow = term.part != Part::kWhorl;
  const SectionBox s = section_box(law, box, polar(box, term.theta));
  const OutlineBounds o = outline_bounds(scene_, s, hollow, true);
  const Interval t2 = t2_range(scene_, s, o, hollow, box);
  const double t = std::sqrt(std::max(t2.hi, s.q2.hi / (o.reach.lo * o.reach.lo)));
  const double q_lo = std::sqrt(std::max(s.q2.lo, 1e-3)), q_hi = std::sqrt(s.q2.hi);
  const double squeeze = std::max(1.0, 1.0 / law.S);
  const double relative_slope = o.reach_slope / o.reach.lo;
  const double per_q = t / o.reach.lo * std::hypot(1.0, relative_slope) * o.normal_scale.hi +
                       0.5 * Interval(1.0 - t2.hi, 1.0 - t2.lo).magnitude() * o.scale_slope / q_lo;
  const double in_plane = per_q * squeeze;
  const double k = std::max({law.by_distance.rate(s.at.theta.lo), law.by_distance.rate(s.at.theta.hi),
                             law.by_depth.rate(s.at.theta.lo), law.by_depth.rate(s.at.theta.hi),
                             law.by_section.rate(s.at.theta.lo), law.by_section.rate(s.at.theta.hi)});
  const double drift = k * (squeeze * std::hypot(s.d.hi, s.h.hi) / s.r.lo + q_hi);
  const double cap = hollow ? scene_.hollow_cap_per_radian : scene_.cap_per_radian;
  const double before = std::max(0.0, law.theta_start - s.at.theta.lo);
  const double along = s.r.hi *
                       (per_q * drift + 0.5 * k * Interval(1.0 - t2.hi, 1.0 - t2.lo).magnitude() * o.normal_scale.hi +
                        cap * cap * before * o.normal_scale.hi) /
                       std::max(s.at.rho.lo, 1e-3 * s.r.lo);
  double steep = std::hypot(in_plane, along);
  if (term.part == Part::kChamberOpening)
    steep += 2.0 * start_half_breadth_ * std::max(0.0, s.at.theta.hi - law.theta_start - 0.5 * kPi) /
             std::max(s.at.rho.lo, 1e-3 * s.r.lo);
  if (scene_.pillar.present && term.part == Part::kWhorl) {
    const double radius = scene::Pillar::kFillet * s.r.hi;
    const double near = std::max(0.0, 1.0 + bounds({Part::kPillar, 0.0}, box).hi / radius);
    const double of_radius = k / std::max(s.at.rho.lo, 1e-3 * s.r.lo) +
                             1.5 / (scene_.pillar.fillet_end_z - scene_.pillar.fillet_from_z);
    const double of_unit = squeeze * o.scale_slope / q_lo * std::hypot(1.0, drift * s.r.hi / std::max(s.at.rho.lo, 1e-3 * s.r.lo));
    steep += near * near * (3.0 * o.normal_scale.hi * (steepness({Part::kPillar, 0.0}, box) + radius * of_radius) +
                            near * scene::Pillar::kFillet * of_unit);
  }
  if (!scene_.sculpture.empty() && term.part == Part::kWhorl) {
    const Interval growth = growth_range(scene_, s.at.theta, s.at.rho, box), scale = (1.0 / law.half_breadth) * s.r;
    const growth::Sculpture::Slopes slope = scene_.sculpture.slopes(growth, s.psi_from, s.psi_span, scale);
    const Interval h = s.r * scene_.sculpture.range(growth, s.psi_from, s.psi_span, scale);
    const Interval unit = s.r * o.normal_scale;
    const double rho_lo = std::max(s.at.rho.lo, 1e-3 * s.r.lo), tan = std::abs(scene_.front.tan_inclination);
    const double by_growth = (1.0 + tan * k * s.h.magnitude() / rho_lo + std::max(1.0, tan)) / rho_lo;
    const double by_psi = squeeze / (q_lo * s.r.lo) * std::hypot(1.0, drift * s.r.hi / rho_lo);
    const double of_h = s.r.hi * (slope.by_growth * by_growth + slope.by_psi * by_psi) + k * (h.magnitude() + s.r.hi * slope.by_log_scale) / rho_lo;
    const double added = h.magnitude() * (1.0 + 0.5 * h.magnitude() / unit.lo);
    steep += of_h * (1.0 + h.magnitude() / unit.lo) + 0.5 * square(h).hi / unit.lo * (k / rho_lo + o.scale_slope * by_psi / o.normal_scale.lo);
    if (t2.lo < kInnerFull || t2.hi > kOuterFull)
      steep += kSteepestFade * added * 2.0 / unit.lo *
               (std::hypot(in_plane, along) + 0.5 * Interval(1.0 - t2.hi, 1.0 - t2.lo).magnitude() *
                                                  (unit.hi * k / rho_lo + s.r.hi * o.scale_slope * by_psi));
  }
  if (s.at.theta.hi > law.theta_lip - kFrontReach) {
    const double turn = (Interval(law.theta_lip) - s.at.theta).magnitude() + 0.5 * kPi;
    steep = std::hypot(steep, 1.0 / scene_.front.cos_inclination + turn);
  }
  return steep;
}

}  // namespace whorl::field
