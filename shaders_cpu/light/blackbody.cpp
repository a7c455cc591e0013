// SPDX-License-Identifier: Apache-2.0
// Planck's law seen by the CIE 1931 standard observer.
#include "shaders_cpu/light/blackbody.h"

#include "shaders_cpu/light/observer.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

constexpr double kSecondRadiationNmK = 1.438776877e7;  // h c / k of the SI (2019), nm K
constexpr double kReferenceNm = 560.0;                 // where the spectrum is scaled to 1

/// Planck's spectral radiance relative to that at the reference wavelength; never overflows.
double planck(double nm, double kelvin) {
  const double a = kSecondRadiationNmK / (nm * kelvin), b = kSecondRadiationNmK / (kReferenceNm * kelvin);
  return std::pow(kReferenceNm / nm, 5) * std::exp(b - a) * std::expm1(-b) / std::expm1(-a);
}

}  // namespace

Vec3 blackbody_xyz(double kelvin) {
  Vec3 sum(0.0);
  for (double nm = 360.0; nm <= 830.0; nm += 1.0) sum += cie_observer(nm) * planck(nm, kelvin);
  return sum / sum.y;
}

Vec3 blackbody_colour(double kelvin) {
  const Vec3 c = blackbody_xyz(std::clamp(kelvin, 500.0, 100000.0));
  const Vec3 all = srgb_of_xyz(c);
  const Vec3 rgb(std::max(0.0, all.x), std::max(0.0, all.y), std::max(0.0, all.z));
  return rgb / (0.2126 * rgb.x + 0.7152 * rgb.y + 0.0722 * rgb.z);
}

}  // namespace whorl::shaders_cpu
