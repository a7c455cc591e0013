// SPDX-License-Identifier: Apache-2.0
// Shapes of bands, flames and spots.
#include "shaders_cpu/surface/pattern.h"

#include "math/hash.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

/// At full irregularity an element strays this far from its place, in spacings, and loses up to this share of its size.
constexpr float kMostShift = 0.45f, kMostLoss = 0.6f;

/// What chance makes of the element with number `k`: values in [0, 1).
struct Chance {
  float a, b, c;
  Chance(std::uint64_t seed, std::int64_t k) noexcept {
    const std::uint64_t word = hash_with(mix64(seed), static_cast<std::uint64_t>(k));
    a = unit_float(high_word(word));
    b = unit_float(low_word(word));
    c = unit_float(low_word(mix64(word)));
  }
};

/// A triangle wave of period 2 between -1 and 1.
float zigzag(float x) noexcept {
  const float folded = x - 2.0f * std::floor(0.5f * x);
  return folded < 1.0f ? 2.0f * folded - 1.0f : 3.0f - 2.0f * folded;
}

}  // namespace

float soft_cover(float distance, float fade) noexcept {
  if (distance >= 1.0f) return 0.0f;
  if (distance <= 1.0f - fade) return 1.0f;
  const float x = (1.0f - distance) / fade;
  return x * x * (3.0f - 2.0f * x);
}

float degrees_apart(float from, float to) noexcept { return std::remainder(to - from, 360.0f); }

float band_cover(const BandShape& band, float around_deg) noexcept {
  const float half = 0.5f * band.width_deg;
  if (half >= 180.0f) return 1.0f;
  return soft_cover(std::abs(degrees_apart(band.at_deg, around_deg)) / half, band.fade);
}

float flame_cover(const FlameShape& flame, double growth, float around_deg) noexcept {
  const float half = 0.5f * flame.width_deg, apart = degrees_apart(flame.at_deg, around_deg);
  const float along = apart / half;  // 1 at the end towards +90 degrees
  if (std::abs(along) >= 1.0f) return 0.0f;
  const float from_top = 0.5f * (1.0f - along);
  const float breadth = flame.breadth * (1.0f - flame.taper * from_top);
  // A whole circle has no ends to round off.
  const float ends = half >= 180.0f ? 1.0f : soft_cover(std::abs(along), 0.15f);
  const float sway = flame.sway > 0.0f ? 0.5f * flame.sway * zigzag(flame.bends * from_top) : 0.0f;
  const double place = growth * flame.per_whorl - sway;
  const auto nearest = static_cast<std::int64_t>(std::floor(place + 0.5));
  float cover = 0.0f;
  for (std::int64_t k = nearest - 1; k <= nearest + 1; ++k) {
    const Chance chance(flame.seed, k);
    const float shift = flame.irregularity * kMostShift * (2.0f * chance.a - 1.0f);
    const float own = 0.5f * breadth * (1.0f - flame.irregularity * kMostLoss * chance.b);
    const float off = std::abs(static_cast<float>(place - static_cast<double>(k)) - shift);
    if (own > 0.0f) cover = std::max(cover, soft_cover(off / own, flame.fade));
  }
  return cover * ends;
}

float spot_cover(const SpotShape& spot, double growth, float around_deg) noexcept {
  const float apart = degrees_apart(spot.at_deg, around_deg);
  if (std::abs(apart) >= spot.width_deg) return 0.0f;
  const double place = growth * spot.per_whorl - static_cast<double>(spot.stagger);
  const auto nearest = static_cast<std::int64_t>(std::floor(place + 0.5));
  float cover = 0.0f;
  for (std::int64_t k = nearest - 1; k <= nearest + 1; ++k) {
    const Chance chance(spot.seed, k);
    const float size = 0.5f * (1.0f - spot.irregularity * kMostLoss * chance.b);
    const float x = static_cast<float>(place - static_cast<double>(k)) -
                    spot.irregularity * kMostShift * (2.0f * chance.a - 1.0f);
    const float y = apart - 0.5f * spot.irregularity * spot.width_deg * (chance.c - 0.5f);
    const float u = x / (size * spot.length), v = y / (size * spot.width_deg);
    cover = std::max(cover, soft_cover(std::sqrt(u * u + v * v), spot.fade));
  }
  return cover;
}

}  // namespace whorl::shaders_cpu
