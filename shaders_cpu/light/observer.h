// SPDX-License-Identifier: Apache-2.0
// From spectra to colours: the CIE 1931 standard observer and daylight.
#pragma once

#include "math/vec.h"

#include <array>
#include <functional>

namespace whorl::shaders_cpu {

/// CIE 1931 colour matching functions by the fits of Wyman, Sloan, Shirley 2013, Simple Analytic Approximations to the CIE XYZ Color
/// Matching Functions, JCGT 2(2).
Vec3 cie_observer(double nm);

/// Relative spectral power of CIE standard illuminant D65 (CIE 15, table T.1), 380 .. 780 nm; straight between steps of 10 nm.
double daylight_d65(double nm);

/// IEC 61966-2-1: XYZ to linear sRGB.
Vec3 srgb_of_xyz(const Vec3& xyz);

/// Linear sRGB of a surface of this reflectance in daylight. A reflectance of 1 at all wavelengths is exactly (1, 1, 1).
Vec3 reflected_colour(const std::function<double(double nm)>& reflectance);

/// The same as weights: the colour is the sum of weights[i] * reflectance(380 + 5 i).
inline constexpr double kFirstNm = 380.0, kStepNm = 5.0;
inline constexpr int kWavelengths = 81;
const std::array<Vec3, kWavelengths>& daylight_weights();

}  // namespace whorl::shaders_cpu
