// SPDX-License-Identifier: Apache-2.0
// Signed lengths at a point: the tube's chains of stations, the growth front, the embryonic shell, the columella.
#include "field/field.h"

#include "field/relief_fade.h"
#include "field/stations.h"
#include "math/falloff.h"

#include <algorithm>
#include <cmath>

namespace whorl::field {
namespace {

constexpr double kS2 = scene::kSupport * scene::kSupport;
// Farther behind the lip than this the growth front, which leads by a quarter turn at most, changes no sign.
constexpr double kFrontReach = 2.6;

// A primitive in space reaches a quarter turn along its whorl in full, and fades out before half a turn.
double window(double distance_in_growth) {
  constexpr double kFull = 0.5 * kPi, kNone = 0.96 * kPi;
  return smooth_step((kNone - std::abs(distance_in_growth)) / (kNone - kFull));
}

}  // namespace

struct Field::InSection {
  double theta, rho, z;
  growth::Station s;
  double q2, psi;
};

Field::Field(const scene::Scene& scene)
    : scene_(scene), start_half_breadth_(scene.law.at(scene.law.theta_start).half_breadth) {
  for (const scene::Station& s : scene.stations)
    greatest_reach_ = std::max(greatest_reach_, scene.outlines[s.outer].reach.bounds().hi);
}

Field::InSection Field::in_section(const Vec3& p, double theta) const noexcept {
  InSection at;
  at.theta = theta + std::remainder(std::atan2(p.y, p.x) - theta, kTwoPi);
  at.rho = std::sqrt(p.x * p.x + p.y * p.y);
  at.z = p.z;
  at.s = scene_.law.at(at.theta);
  const growth::SectionPoint q = scene_.law.to_section(at.s, {at.rho, at.z});
  at.q2 = q.x * q.x + q.y * q.y;
  at.psi = std::atan2(q.y, q.x);
  return at;
}

// The sum of the chain's densities, turned into a length by inverting the kernel: with t the distance from the centre
// line in outlines, density (1 - t^2/s^2)^3 gives t^2 = s^2 (1 - density^(1/3)).
double Field::chain(const InSection& at, const Vec3& p, bool hollow, double& unit) const noexcept {
  const StationWeights w = stations_at(scene_, at.theta);
  const scene::Station* station = &scene_.stations[static_cast<std::size_t>(w.first)];
  const auto outline_of = [&](int i) { return hollow ? station[i].hollow : station[i].outer; };
  const double ahead_of_start = std::max(0.0, scene_.law.theta_start - at.theta);
  const double cap = ahead_of_start * (hollow ? scene_.hollow_cap_per_radian : scene_.cap_per_radian);

  const std::uint32_t first = outline_of(0);
  double t2, normal_scale, density = 0.0;
  const bool alike = first == outline_of(1) && first == outline_of(2) && first == outline_of(3);
  if (alike) {
    const growth::Outline& outline = scene_.outlines[first];
    const double reach = outline.reach.value(at.psi);
    t2 = std::min(kS2, at.q2 / (reach * reach) + cap * cap);
    normal_scale = outline.normal_scale.value(at.psi);
    unit = at.s.half_breadth * normal_scale;
    if (scene_.ellipsoids.empty()) return 0.5 * at.s.half_breadth * (1.0 - t2) * normal_scale;
    density = wyvill(t2 / kS2);
  } else {
    normal_scale = 0.0;
    for (int i = 0; i < 4; ++i) {
      const growth::Outline& outline = scene_.outlines[outline_of(i)];
      const double reach = outline.reach.value(at.psi);
      density += w.weight[i] * wyvill((at.q2 / (reach * reach) + cap * cap) / kS2);
      normal_scale += w.weight[i] * outline.normal_scale.value(at.psi);
    }
    unit = at.s.half_breadth * normal_scale;
  }
  for (const scene::Ellipsoid& e : scene_.ellipsoids) {
    if (e.hollow != hollow) continue;
    const Vec3 offset = p - e.centre;
    const Vec3 u(e.to_unit[0].dot(offset), e.to_unit[1].dot(offset), e.to_unit[2].dot(offset));
    const double u2 = u.length2();
    if (u2 < 1.0) density += e.weight * wyvill(u2) * window(e.theta - at.theta);
  }
  t2 = kS2 * (1.0 - std::cbrt(density));
  return 0.5 * at.s.half_breadth * (1.0 - t2) * normal_scale;
}

// What sculpture adds to the plain signed length. A length of L = unit (1 - t^2) / 2 has its surface raised by h where
// h + h^2 / (2 unit) is added. Far from the surface, where directions lose their meaning or the support ends, it fades.
double Field::relief(const InSection& at, double plain, double unit) const noexcept {
  const double fade = relief_fade(1.0 - 2.0 * plain / unit);
  if (fade == 0.0) return 0.0;
  const double lead = growth::front_lead(scene_.front.tan_inclination, at.s.depth, {at.rho, at.z});
  const double h = at.s.half_breadth * scene_.sculpture.height(at.theta - lead, at.psi, at.s.half_breadth / scene_.law.half_breadth);
  return fade * (h + 0.5 * h * h / unit);
}

double Field::front(const InSection& at) const noexcept {
  const scene::Front& f = scene_.front;
  const double lead = growth::front_lead(f.tan_inclination, scene_.law.depth, {at.rho, at.z});
  return (scene_.law.theta_lip + lead - at.theta) * at.rho * f.cos_inclination + f.rim_radius;
}

void Field::whorl(const Vec3& p, double theta, double& outer, double& hollow) const noexcept {
  const InSection at = in_section(p, theta);
  if (at.theta > scene_.theta_end) {
    outer = hollow = -at.s.half_breadth;
    return;
  }
  double unit, hollow_unit;
  outer = chain(at, p, false, unit);
  if (!scene_.sculpture.empty()) outer += relief(at, outer, unit);
  // The flare goes with the outline's own unit: away from the tube the length levels off at half of that below zero, and
  // a flare of one size would lift it above, all along the pillar.
  if (scene_.pillar.present)
    outer = flared(outer, pillar(p), scene::Pillar::kFillet * at.s.half_breadth, scene_.pillar.fillet_at(p.z) * unit);
  hollow = chain(at, p, true, hollow_unit);
  if (at.theta > scene_.law.theta_lip - kFrontReach) {
    const double behind = front(at);
    outer = rounded_min(outer, behind, scene_.front.rim_radius);
    hollow = -rounded_min(-hollow, behind, scene_.front.rim_radius);
  }
}

double Field::pillar(const Vec3& p) const noexcept {
  const scene::Pillar& pillar = scene_.pillar;
  const double part = std::clamp((p.z - pillar.top_z) / (pillar.bottom_z - pillar.top_z), 0.0, 1.0);
  return (pillar.squared_radius.value(kPi * part) - p.x * p.x - p.y * p.y) / (2.0 * pillar.unit.value(kPi * part));
}

double Field::tube(const Vec3& p, double theta) const noexcept {
  double unit;
  return chain(in_section(p, theta), p, false, unit);
}

double Field::lumen(const Vec3& p, double theta) const noexcept {
  double unit;
  return chain(in_section(p, theta), p, true, unit);
}

double Field::opening_penalty(double theta) const noexcept {
  const double past = std::max(0.0, theta - scene_.law.theta_start - 0.5 * kPi);
  return start_half_breadth_ * past * past;
}

double Field::opening_theta() const noexcept {
  constexpr double kLast = 0.5 * kPi + 2.0;  // there the penalty is four half-breadths: more than any lumen is deep
  return 0.5 * (scene_.theta_begin + scene_.law.theta_start + kLast);
}

double Field::value(const Term& term, const Vec3& p) const noexcept {
  const scene::Chamber& c = scene_.chamber;
  const auto ellipsoid = [&](double radius, double half_height) {
    const double z = (p.z - c.centre_z) / half_height;
    return 0.5 * std::min(radius, half_height) * (1.0 - (p.x * p.x + p.y * p.y) / (radius * radius) - z * z);
  };
  switch (term.part) {
    case Part::kChamber: return ellipsoid(c.radius, c.half_height);
    case Part::kChamberHollow: return ellipsoid(c.hollow_radius, c.hollow_half_height);
    case Part::kChamberOpening: {
      const InSection at = in_section(p, term.theta);
      double unit;
      return chain(at, p, true, unit) - opening_penalty(at.theta);
    }
    case Part::kPillar: return pillar(p);
    case Part::kWhorl:
    case Part::kWhorlHollow: {
      double outer, hollow;
      whorl(p, term.theta, outer, hollow);
      return term.part == Part::kWhorl ? outer : hollow;
    }
  }
  return 0.0;
}

Vec3 Field::gradient(const Term& term, const Vec3& p) const noexcept {
  const bool tube = term.part == Part::kWhorl || term.part == Part::kWhorlHollow;
  const double h = 1e-4 * (tube ? scene_.law.at(term.theta).half_breadth : start_half_breadth_);
  Vec3 g;
  for (int i = 0; i < 3; ++i) {
    Vec3 a = p, b = p;
    a[i] -= h;
    b[i] += h;
    g[i] = (value(term, b) - value(term, a)) / (2.0 * h);
  }
  return g;
}

void Field::passages(double phi, double& first, double& last) const noexcept {
  first = phi + kTwoPi * std::ceil((scene_.theta_begin - phi) / kTwoPi);
  last = phi + kTwoPi * std::floor((scene_.theta_end - phi) / kTwoPi);
}

// Beyond the support of every outline the length levels off at under -0.5 half-breadths, and a flare adds at most a quarter.
bool Field::out_of_reach(double theta, const Vec3& p) const noexcept {
  if (!scene_.ellipsoids.empty()) return false;
  const growth::SectionPoint q = scene_.law.to_section(scene_.law.at(theta), {std::sqrt(p.x * p.x + p.y * p.y), p.z});
  return q.x * q.x + q.y * q.y > kS2 * greatest_reach_ * greatest_reach_;
}

Place Field::place_at(const Vec3& p) const noexcept {
  double first, last;
  passages(std::atan2(p.y, p.x), first, last);
  if (value({Part::kChamber, 0.0}, p) > 0.0) {
    const Term owner{Part::kChamber, scene_.law.theta_start};
    const bool hollow = value({Part::kChamberHollow, 0.0}, p) > 0.0 ||
                        (scene_.chamber.open && value({Part::kChamberOpening, opening_theta()}, p) > 0.0);
    return {hollow ? State::kLumen : State::kSolid, owner};
  }
  if (scene_.pillar.present && value({Part::kPillar, 0.0}, p) > 0.0) return {State::kSolid, {Part::kPillar, 0.0}};
  for (double theta = first; theta <= last + 1e-9; theta += kTwoPi) {
    if (out_of_reach(theta, p)) continue;
    double outer, hollow;
    whorl(p, theta, outer, hollow);
    if (outer > 0.0) return {hollow > 0.0 ? State::kLumen : State::kSolid, {Part::kWhorl, theta}};
  }
  return {};
}

Field::OnTube Field::on_tube(const Vec3& p, double theta) const noexcept {
  const InSection at = in_section(p, theta);
  const StationWeights w = stations_at(scene_, at.theta);
  // Neighbouring stations often share one outline, which is then asked once.
  double reach = 0.0, normal_scale = 0.0, weight = 0.0;
  for (int i = 0; i < 4; ++i) {
    weight += w.weight[i];
    const std::uint32_t here = scene_.stations[static_cast<std::size_t>(w.first + i)].outer;
    if (i < 3 && here == scene_.stations[static_cast<std::size_t>(w.first + i + 1)].outer) continue;
    reach += weight * scene_.outlines[here].reach.value(at.psi);
    normal_scale += weight * scene_.outlines[here].normal_scale.value(at.psi);
    weight = 0.0;
  }
  const double slope = scene_.front.tan_inclination, u = slope * (at.s.depth - at.z), apart2 = at.rho * at.rho + u * u;
  const double lead = growth::front_lead(slope, at.s.depth, {at.rho, at.z});
  // The gradient of growth: round the axis, away from it and along it.
  const double deeper = at.s.depth * scene_.law.by_depth.rate(at.theta);
  const Vec3 gradient((1.0 - slope * deeper * at.rho / apart2) / at.rho, u / apart2, slope * at.rho / apart2);
  return {at.theta - lead, at.psi, at.s.half_breadth * normal_scale * (std::sqrt(at.q2) / reach - 1.0), 1.0 / gradient.length(), at.rho,
          at.s.half_breadth / scene_.law.half_breadth};
}

void Field::coordinates(const Vec3& p, double theta, double& growth, double& around) const noexcept {
  const InSection at = in_section(p, theta);
  growth = at.theta;
  around = at.psi;
}

}  // namespace whorl::field
