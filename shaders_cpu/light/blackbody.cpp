// SPDX-License-Identifier: Apache-2.0
// Planck's law seen by the CIE 1931 standard observer.
#include "shaders_cpu/light/blackbody.h"

#include <algorithm>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

/// A bell with one width on each side of its peak, all in nanometres.
double bell(double nm, double peak, double left, double right) {
  const double t = (nm - peak) / (nm < peak ? left : right);
  return std::exp(-0.5 * t * t);
}

Vec3 observer(double nm) {
  return {1.056 * bell(nm, 599.8, 37.9, 31.0) + 0.362 * bell(nm, 442.0, 16.0, 26.7) - 0.065 * bell(nm, 501.1, 20.4, 26.2),
          0.821 * bell(nm, 568.8, 46.9, 40.5) + 0.286 * bell(nm, 530.9, 16.3, 31.1),
          1.217 * bell(nm, 437.0, 11.8, 36.0) + 0.681 * bell(nm, 459.0, 26.0, 13.8)};
}

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
  for (double nm = 360.0; nm <= 830.0; nm += 1.0) sum += observer(nm) * planck(nm, kelvin);
  return sum / sum.y;
}

Vec3 blackbody_colour(double kelvin) {
  const Vec3 c = blackbody_xyz(std::clamp(kelvin, 500.0, 100000.0));
  // IEC 61966-2-1, XYZ (D65) to linear sRGB.
  const Vec3 rgb(std::max(0.0, 3.2406 * c.x - 1.5372 * c.y - 0.4986 * c.z),
                 std::max(0.0, -0.9689 * c.x + 1.8758 * c.y + 0.0415 * c.z),
                 std::max(0.0, 0.0557 * c.x - 0.2040 * c.y + 1.0570 * c.z));
  return rgb / (0.2126 * rgb.x + 0.7152 * rgb.y + 0.0722 * rgb.z);
}

}  // namespace whorl::shaders_cpu
