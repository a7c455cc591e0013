// SPDX-License-Identifier: Apache-2.0
// Lays pattern, callus and lip over the ground colour, in this order.
#include "transport/paint.h"

#include "shaders_cpu/surface/nacre.h"
#include "shaders_cpu/tone/srgb.h"

#include <algorithm>
#include <cmath>

namespace whorl::transport {
namespace {

/// Where a pattern begins and ends it fades over this much growth, whorls.
constexpr float kOnsetFade = 0.02f;
/// The lip's own colour is whole over this share of its breadth, the callus over this share of its spread.
constexpr float kWhole = 0.5f;

Vec3f linear(const specimen::Colour& c) { return Vec3f(shaders_cpu::srgb_decode_bytes(c.red, c.green, c.blue)); }

Vec3f mixed(const Vec3f& below, const Vec3f& above, float share) noexcept { return below + (above - below) * share; }

/// Falls from 1 to 0 while `x` rises from `from` to `to`.
float fall(double x, double from, double to) noexcept {
  if (x >= to) return 0.0f;
  const double u = std::clamp((to - x) / (to - from), 0.0, 1.0);
  return static_cast<float>(u * u * (3.0 - 2.0 * u));
}

struct Cover {
  double growth;
  float around_deg, threshold, fade;
  float operator()(const shaders_cpu::BandShape& band) const noexcept { return shaders_cpu::band_cover(band, around_deg); }
  float operator()(const shaders_cpu::FlameShape& flame) const noexcept {
    return shaders_cpu::flame_cover(flame, growth, around_deg);
  }
  float operator()(const shaders_cpu::SpotShape& spot) const noexcept {
    return shaders_cpu::spot_cover(spot, growth, around_deg);
  }
  float operator()(const scene::EdgePattern* pattern) const noexcept {
    const double over = pattern->level(growth, radians(static_cast<double>(around_deg))) / static_cast<double>(threshold);
    return 1.0f - fall(over, 1.0 - 0.5 * static_cast<double>(fade) - 1e-6, 1.0 + 0.5 * static_cast<double>(fade));
  }
};

float number(const specimen::Stated<double>& stated) { return static_cast<float>(stated.value); }
std::uint64_t seed(const specimen::Stated<int>& stated) { return static_cast<std::uint64_t>(stated.value); }

}  // namespace

Paint::Paint(const field::Field& field, const specimen::Look& look, const specimen::Colouring& colouring)
    : field_(field),
      exterior_(linear(look.exterior)),
      interior_(linear(look.interior)),
      lip_breadth_(look.lip_breadth_mm),
      callus_breadth_(look.callus_breadth_mm) {
  if (look.lip) lip_ = linear(*look.lip);
  if (look.callus) callus_ = linear(*look.callus);
  const auto add = [this](Shape shape, const specimen::Pigment& p) -> Layer& {
    return layers_.emplace_back(Layer{shape, linear(p.colour), number(p.opacity), number(p.onset), number(p.end)});
  };
  for (const specimen::Band& b : colouring.bands)
    add(shaders_cpu::BandShape{number(b.at_deg), number(b.width_deg), number(b.pigment.fade)}, b.pigment);
  for (const specimen::Flame& f : colouring.flames)
    add(shaders_cpu::FlameShape{number(f.per_whorl), number(f.breadth), number(f.at_deg), number(f.width_deg),
                                number(f.taper), number(f.sway), number(f.bends), number(f.irregularity),
                                number(f.pigment.fade), seed(f.seed)},
        f.pigment);
  for (const specimen::Spot& s : colouring.spots)
    add(shaders_cpu::SpotShape{number(s.per_whorl), number(s.length), number(s.at_deg), number(s.width_deg),
                               number(s.stagger), number(s.irregularity), number(s.pigment.fade), seed(s.seed)},
        s.pigment);
  for (std::size_t i = 0; i < colouring.patterns.size(); ++i) {
    const specimen::EdgePattern& p = colouring.patterns[i];
    Layer& layer = add(&field.scene().edge_patterns[i], p.pigment);
    layer.threshold = number(p.threshold);
    layer.fade = number(p.pigment.fade);
  }
}

double Paint::growth_angle(const trace::Hit& hit) const noexcept {
  const auto azimuth = static_cast<double>(std::atan2(hit.position.y, hit.position.x));
  return hit.passage + std::remainder(azimuth - hit.passage, kTwoPi);
}

double Paint::behind_rim(const Vec3& p, double theta) const noexcept {
  const scene::Scene& s = field_.scene();
  const double rho = std::hypot(p.x, p.y);
  const double lead = growth::front_lead(s.front.tan_inclination, s.law.depth, {rho, p.z});
  return (s.law.theta_lip + lead - theta) * rho * s.front.cos_inclination + s.front.rim_radius;
}

bool Paint::on_lip(const trace::Hit& hit) const noexcept {
  const double theta = growth_angle(hit);
  return !hit.parietal && theta > field_.scene().law.theta_lip - kPi && behind_rim(Vec3(hit.position), theta) < lip_breadth_;
}

float Paint::drift(const trace::Hit& hit) const noexcept {
  double theta, around;
  field_.coordinates(Vec3(hit.position), hit.passage, theta, around);
  constexpr std::uint64_t kSeed = 1;
  return shaders_cpu::nacre_drift(theta / kTwoPi, static_cast<float>(degrees(around)), kSeed);
}

Vec3f Paint::outside(const trace::Hit& hit) const noexcept {
  Vec3f colour = exterior_;
  if (layers_.empty()) return colour;
  const scene::Scene& s = field_.scene();
  const Vec3 p(hit.position);
  double theta, around;
  field_.coordinates(p, hit.passage, theta, around);
  const auto around_deg = static_cast<float>(degrees(around));
  const double lead = growth::front_lead(s.front.tan_inclination, s.law.at(theta).depth, {std::hypot(p.x, p.y), p.z});
  const double growth = (theta - lead) / kTwoPi;
  const auto turn = static_cast<float>(growth);
  for (const Layer& layer : layers_) {
    if (turn < layer.onset || turn > layer.end + kOnsetFade) continue;
    float share = layer.opacity * std::visit(Cover{growth, around_deg, layer.threshold, layer.fade}, layer.shape);
    if (layer.onset > 0.0f) share *= std::min(1.0f, (turn - layer.onset) / kOnsetFade);
    share *= fall(turn, layer.end, layer.end + kOnsetFade);
    colour = mixed(colour, layer.colour, share);
  }
  return colour;
}

float Paint::callus_share(const trace::Hit& hit) const noexcept {
  if (hit.parietal) return 1.0f;
  if (hit.part == trace::Part::kInterior || !(callus_breadth_ > 0.0)) return 0.0f;
  // The mouth's passage at this azimuth, within half a turn of the lip; the place must lie on an earlier one.
  const scene::Scene& s = field_.scene();
  const Vec3 p(hit.position);
  const double last = s.law.theta_lip + std::remainder(std::atan2(p.y, p.x) - s.law.theta_lip, kTwoPi);
  if (growth_angle(hit) > last - 0.5 * kTwoPi) return 0.0f;
  const double along = behind_rim(p, last), across = std::min(0.0, field_.tube(p, last));
  return fall(std::hypot(along, across), static_cast<double>(kWhole) * callus_breadth_, callus_breadth_);
}

Vec3f Paint::albedo(const trace::Hit& hit) const noexcept {
  const bool inside = hit.part == trace::Part::kInterior;
  if (callus_ && (hit.parietal || !inside)) {
    const float share = callus_share(hit);
    if (share > 0.0f) return mixed(inside ? interior_ : outside(hit), *callus_, share);
  }
  const double theta = growth_angle(hit);
  // Only the last half whorl can reach the rim.
  const bool near_rim = !hit.parietal && theta > field_.scene().law.theta_lip - kPi;
  const double behind = near_rim ? std::max(0.0, behind_rim(Vec3(hit.position), theta)) : lip_breadth_;
  if (behind >= lip_breadth_) return inside ? interior_ : outside(hit);
  if (lip_)
    return mixed(inside ? interior_ : outside(hit), *lip_, fall(behind, static_cast<double>(kWhole) * lip_breadth_, lip_breadth_));
  const Vec3f out = outside(hit);
  const float other = 0.5f * fall(behind, 0.0, lip_breadth_);
  return inside ? mixed(interior_, out, other) : mixed(out, interior_, other);
}

}  // namespace whorl::transport
