// SPDX-License-Identifier: Apache-2.0
// How shell weakens X-rays.
#pragma once

namespace whorl::shaders_cpu {

/// Photon energies for which the mass attenuation is known, keV.
inline constexpr double kLeastEnergyKev = 10.0, kMostEnergyKev = 150.0;

/// Mass attenuation coefficient of calcium carbonate with coherent scattering, cm^2/g. The elements' coefficients of Hubbell &
/// Seltzer 1995, Tables of X-Ray Mass Attenuation Coefficients (NISTIR 5632), joined by mass fractions; between the
/// tabulated energies straight in logarithms, as their authors advise. There is no edge between 10 and 150 keV; energies outside
/// are held to these.
double carbonate_mass_attenuation(double energy_kev);

/// Linear attenuation, 1/mm, at a density in g/cm^3.
inline double carbonate_attenuation_per_mm(double energy_kev, double density) {
  return 0.1 * carbonate_mass_attenuation(energy_kev) * density;
}

}  // namespace whorl::shaders_cpu
