// SPDX-License-Identifier: Apache-2.0
// From stacks to tables.
#include "shaders_cpu/surface/nacre.h"

#include "math/falloff.h"
#include "math/hash.h"
#include "math/parallel.h"
#include "shaders_cpu/light/observer.h"
#include "shaders_cpu/surface/layers.h"
#include "shaders_cpu/surface/visible_normals.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

constexpr double kLeastCosine = 1e-3;
constexpr int kSpreadSteps = 41;      // over +-3 standard deviations
constexpr double kSpreadReach = 3.0;
/// Thickness counts in wavelengths only (no dispersion), so one fine spectrum serves all scales: 380 / 1.25 .. 780 / 0.75 nm.
constexpr double kSpectrumFirst = 300.0, kSpectrumStep = 2.5;
constexpr int kSpectrum = 301;

double single(const NacreStack& stack, double tablet_nm, double wavelength_nm, double cosine) {
  const std::array<Layer, 2> pair = {Layer{{stack.sheet_index, 0.0}, stack.sheet_nm}, Layer{{kTabletIndex, 0.0}, tablet_nm}};
  return stack_response(1.0, pair, stack.layers, kTabletIndex, wavelength_nm, cosine).mean_reflectance();
}

/// What the tables do with a spectrum that is known at steps of wavelength.
double at_wavelength(const std::vector<double>& spectrum, double nm) {
  const double place = std::clamp((nm - kSpectrumFirst) / kSpectrumStep, 0.0, kSpectrum - 1.0 - 1e-9);
  const auto i = static_cast<std::size_t>(place);
  return spectrum[i] + (spectrum[i + 1] - spectrum[i]) * (place - static_cast<double>(i));
}

double cosine_of(int node, int count) {
  const double u = static_cast<double>(node) / (count - 1);
  return u * u;
}

float scale_of(int row) {
  return NacreCoat::kLeastScale + (NacreCoat::kMostScale - NacreCoat::kLeastScale) * static_cast<float>(row) /
                                      static_cast<float>(NacreCoat::kScales - 1);
}

Vec3 clamped(const Vec3& c) { return {std::clamp(c.x, 0.0, 1.0), std::clamp(c.y, 0.0, 1.0), std::clamp(c.z, 0.0, 1.0)}; }

}  // namespace

double nacre_reflectance(const NacreStack& stack, double wavelength_nm, double cosine, double scale) {
  const double nm = wavelength_nm / scale, c = std::max(cosine, kLeastCosine);
  if (!(stack.spread_nm > 0.0)) return single(stack, stack.tablet_nm, nm, c);
  double sum = 0.0, weights = 0.0;
  for (int i = 0; i < kSpreadSteps; ++i) {
    const double deviation = kSpreadReach * (2.0 * i / (kSpreadSteps - 1) - 1.0);
    const double tablet = stack.tablet_nm + deviation * stack.spread_nm;
    if (tablet <= 0.0) continue;
    const double weight = std::exp(-0.5 * deviation * deviation);
    sum += weight * single(stack, tablet, nm, c);
    weights += weight;
  }
  return sum / weights;
}

NacreCoat::NacreCoat(const NacreStack& stack, double alpha) : alpha_(static_cast<float>(alpha)) {
  constexpr auto kTable = static_cast<std::size_t>(kNodes) * kScales;
  facet_.resize(kTable);
  albedo_.resize(kTable);
  parallel_for(kNodes, 1, [&](std::size_t node) {
    const double cosine = cosine_of(static_cast<int>(node), kNodes);
    std::vector<double> spectrum;
    for (int i = 0; i < kSpectrum; ++i) spectrum.push_back(nacre_reflectance(stack, kSpectrumFirst + kSpectrumStep * i, cosine));
    for (int row = 0; row < kScales; ++row) {
      Vec3 colour(0.0);
      for (int i = 0; i < kWavelengths; ++i)
        colour += daylight_weights()[static_cast<std::size_t>(i)] *
                  at_wavelength(spectrum, (kFirstNm + kStepNm * i) / static_cast<double>(scale_of(row)));
      facet_[static_cast<std::size_t>(row) * kNodes + node] = Vec3f(clamped(colour));
    }
  });
  constexpr int kOrder = 16;
  const Rule rule = gauss_legendre(kOrder);
  parallel_for(kNodes, 1, [&](std::size_t node) {
    std::array<Vec3, kScales> sums;  // an Imath vector does not begin at 0
    sums.fill(Vec3(0.0));
    over_visible_normals(std::max(cosine_of(static_cast<int>(node), kNodes), 1e-6), alpha, rule, [&](double facing, double weight) {
      for (int row = 0; row < kScales; ++row)
        sums[static_cast<std::size_t>(row)] += Vec3(facet(static_cast<float>(facing), scale_of(row))) * weight;
    });
    for (int row = 0; row < kScales; ++row)
      albedo_[static_cast<std::size_t>(row) * kNodes + node] = Vec3f(clamped(sums[static_cast<std::size_t>(row)]));
  });
  for (int row = 0; row < kScales; ++row) {
    Vec3 sum(0.0);  // exact integral of c times a linear piece
    for (int i = 0; i + 1 < kNodes; ++i) {
      const double a = cosine_of(i, kNodes), b = cosine_of(i + 1, kNodes);
      const auto at = static_cast<std::size_t>(row) * kNodes + static_cast<std::size_t>(i);
      sum += (Vec3(albedo_[at]) * (2.0 * a + b) + Vec3(albedo_[at + 1]) * (a + 2.0 * b)) * ((b - a) / 6.0);
    }
    mean_.push_back(Vec3f(sum * 2.0));
  }
}

Vec3f NacreCoat::mean(float scale) const noexcept {
  const float y = std::clamp((scale - kLeastScale) / (kMostScale - kLeastScale), 0.0f, 1.0f) * static_cast<float>(kScales - 1);
  const auto row = static_cast<std::size_t>(std::min(static_cast<int>(y), kScales - 2));
  return mean_[row] + (mean_[row + 1] - mean_[row]) * (y - static_cast<float>(row));
}

Vec3f NacreCoat::read(const std::vector<Vec3f>& table, float cosine, float scale) const noexcept {
  const float c = std::clamp(cosine, 0.0f, 1.0f);
  const int i = std::min(static_cast<int>(std::sqrt(c) * static_cast<float>(kNodes - 1)), kNodes - 2);
  const auto low_c = static_cast<float>(cosine_of(i, kNodes)), high_c = static_cast<float>(cosine_of(i + 1, kNodes));
  const float fx = (c - low_c) / (high_c - low_c);
  const float y = std::clamp((scale - kLeastScale) / (kMostScale - kLeastScale), 0.0f, 1.0f) * static_cast<float>(kScales - 1);
  const auto row = static_cast<std::size_t>(std::min(static_cast<int>(y), kScales - 2));
  const Vec3f* low = table.data() + row * kNodes + static_cast<std::size_t>(i);
  const Vec3f* high = low + kNodes;
  const Vec3f a = low[0] + (low[1] - low[0]) * fx, b = high[0] + (high[1] - high[0]) * fx;
  return a + (b - a) * (y - static_cast<float>(row));
}

float nacre_drift(double turn, float around_deg, std::uint64_t seed) noexcept {
  constexpr int kAround = 5;           // cells round the section
  constexpr double kPerTurn = 6.0;     // cells in a whorl
  float sum = 0.0f, share = 0.65f;
  double x = turn * kPerTurn, y = (static_cast<double>(around_deg) / 360.0 + 1.0) * kAround;
  int around = kAround;
  for (std::uint64_t octave = 0; octave < 2; ++octave) {
    const double cx = std::floor(x), cy = std::floor(y);
    const auto value = [&](double i, double j) {
      const auto row = static_cast<std::uint64_t>(static_cast<std::int64_t>(j) % around);
      const std::uint64_t word = hash_with(hash_with(mix64(seed + octave), static_cast<std::uint64_t>(static_cast<std::int64_t>(i))), row);
      return 2.0f * unit_float(high_word(word)) - 1.0f;
    };
    const auto u = static_cast<float>(smooth_step(x - cx)), v = static_cast<float>(smooth_step(y - cy));
    const float low = value(cx, cy) + (value(cx + 1.0, cy) - value(cx, cy)) * u;
    const float high = value(cx, cy + 1.0) + (value(cx + 1.0, cy + 1.0) - value(cx, cy + 1.0)) * u;
    sum += share * (low + (high - low) * v);
    share = 0.35f;
    x *= 2.0;
    y *= 2.0;
    around *= 2;
  }
  return sum;
}

}  // namespace whorl::shaders_cpu
