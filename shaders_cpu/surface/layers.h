// SPDX-License-Identifier: Apache-2.0
// Light in a stack of thin flat layers, by transfer matrices.
//
// Abeles 1950, Annales de Physique 12(5): 596-640; in the form of Born & Wolf, Principles of Optics, section 1.6. Indices are
// n - i k with k >= 0 for absorption.
#pragma once

#include "shaders_cpu/surface/fresnel.h"

#include <complex>
#include <span>

namespace whorl::shaders_cpu {

struct Layer {
  std::complex<double> index{1.0, 0.0};
  double thickness_nm = 0.0;
};

struct StackResponse {
  Polarised<double> reflectance, transmittance;
  double mean_reflectance() const noexcept { return 0.5 * (reflectance.s + reflectance.p); }
};

/// `layers` from the side of the light, the whole sequence `repeats` times, between a medium of real index `outer` and a substrate.
/// `cosine` of the angle of incidence in the outer medium, above 0.
StackResponse stack_response(double outer, std::span<const Layer> layers, int repeats, std::complex<double> substrate,
                             double wavelength_nm, double cosine) noexcept;

}  // namespace whorl::shaders_cpu
