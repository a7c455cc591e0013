// SPDX-License-Identifier: Apache-2.0
// The colour of a glowing body.
#pragma once

#include "math/vec.h"

namespace whorl::shaders_cpu {

/// CIE 1931 tristimulus values of a black body at `kelvin` (> 0), scaled to Y = 1. Planck's law against the fits of
/// Wyman, Sloan, Shirley 2013, Simple Analytic Approximations to the CIE XYZ Color Matching Functions, JCGT 2(2).
Vec3 blackbody_xyz(double kelvin);

/// The same as linear sRGB with luminance 1. Below about 1900 K the colour lies outside sRGB: the negative channel is cut
/// and the luminance restored. `kelvin` is held to 500 .. 100000.
Vec3 blackbody_colour(double kelvin);

}  // namespace whorl::shaders_cpu
