// SPDX-License-Identifier: Apache-2.0
// Matching functions, illuminant and the sum over wavelengths.
#include "shaders_cpu/light/observer.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

/// A bell with one width on each side of its peak, all in nanometres.
double bell(double nm, double peak, double left, double right) {
  const double t = (nm - peak) / (nm < peak ? left : right);
  return std::exp(-0.5 * t * t);
}

/// D65 from 380 to 780 nm by 10 nm.
constexpr std::array<double, 41> kDaylight = {
    49.9755, 54.6482, 82.7549, 91.4860, 93.4318, 86.6823, 104.865, 117.008, 117.812, 114.861, 115.923,
    108.811, 109.354, 107.802, 104.790, 107.689, 104.405, 104.046, 100.000, 96.3342, 95.7880, 88.6856,
    90.0062, 89.5991, 87.6987, 83.2886, 83.6992, 80.0268, 80.2146, 82.2778, 78.2842, 69.7213, 71.6091,
    74.3490, 61.6040, 69.8856, 75.0870, 63.5927, 46.4182, 66.8054, 63.3828};

}  // namespace

Vec3 cie_observer(double nm) {
  return {1.056 * bell(nm, 599.8, 37.9, 31.0) + 0.362 * bell(nm, 442.0, 16.0, 26.7) - 0.065 * bell(nm, 501.1, 20.4, 26.2),
          0.821 * bell(nm, 568.8, 46.9, 40.5) + 0.286 * bell(nm, 530.9, 16.3, 31.1),
          1.217 * bell(nm, 437.0, 11.8, 36.0) + 0.681 * bell(nm, 459.0, 26.0, 13.8)};
}

double daylight_d65(double nm) {
  const double place = std::clamp((nm - 380.0) / 10.0, 0.0, 40.0 - 1e-9);
  const auto i = static_cast<std::size_t>(place);
  return kDaylight[i] + (kDaylight[i + 1] - kDaylight[i]) * (place - static_cast<double>(i));
}

Vec3 srgb_of_xyz(const Vec3& c) {
  return {3.2406 * c.x - 1.5372 * c.y - 0.4986 * c.z, -0.9689 * c.x + 1.8758 * c.y + 0.0415 * c.z,
          0.0557 * c.x - 0.2040 * c.y + 1.0570 * c.z};
}

const std::array<Vec3, kWavelengths>& daylight_weights() {
  static const std::array<Vec3, kWavelengths> weights = [] {
    std::array<Vec3, kWavelengths> w;
    Vec3 sum(0.0);
    for (int i = 0; i < kWavelengths; ++i) {
      const double nm = kFirstNm + kStepNm * i;
      w[static_cast<std::size_t>(i)] = srgb_of_xyz(cie_observer(nm) * daylight_d65(nm));
      sum += w[static_cast<std::size_t>(i)];
    }
    for (Vec3& one : w) one = Vec3(one.x / sum.x, one.y / sum.y, one.z / sum.z);
    return w;
  }();
  return weights;
}

Vec3 reflected_colour(const std::function<double(double)>& reflectance) {
  Vec3 sum(0.0);
  for (int i = 0; i < kWavelengths; ++i) sum += daylight_weights()[static_cast<std::size_t>(i)] * reflectance(kFirstNm + kStepNm * i);
  return sum;
}

}  // namespace whorl::shaders_cpu
