// SPDX-License-Identifier: Apache-2.0
// Tabulated coefficients and their mixture.
#include "shaders_cpu/medium/attenuation.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace whorl::shaders_cpu {
namespace {

struct Row {
  double energy_kev, calcium, carbon, oxygen;  // cm^2/g
};

// Hubbell & Seltzer 1995, NISTIR 5632, table 3, total with coherent scattering.
constexpr std::array<Row, 10> kRows = {{{10.0, 93.41, 2.373, 5.952},
                                        {15.0, 29.79, 0.8071, 1.836},
                                        {20.0, 13.06, 0.4420, 0.8651},
                                        {30.0, 4.080, 0.2562, 0.3779},
                                        {40.0, 1.830, 0.2076, 0.2585},
                                        {50.0, 1.019, 0.1871, 0.2132},
                                        {60.0, 0.6578, 0.1753, 0.1907},
                                        {80.0, 0.3656, 0.1610, 0.1678},
                                        {100.0, 0.2571, 0.1514, 0.1551},
                                        {150.0, 0.1674, 0.1347, 0.1361}}};

// Mass fractions in CaCO3, from the atomic weights 40.078, 12.011 and 15.999.
constexpr double kMass = 40.078 + 12.011 + 3.0 * 15.999;
constexpr double kCalcium = 40.078 / kMass, kCarbon = 12.011 / kMass, kOxygen = 3.0 * 15.999 / kMass;

}  // namespace

double carbonate_mass_attenuation(double energy_kev) {
  const double energy = std::clamp(energy_kev, kLeastEnergyKev, kMostEnergyKev);
  std::size_t i = 0;
  while (i + 2 < kRows.size() && kRows[i + 1].energy_kev <= energy) ++i;
  const Row &a = kRows[i], &b = kRows[i + 1];
  const double share = std::log(energy / a.energy_kev) / std::log(b.energy_kev / a.energy_kev);
  const auto between = [share](double low, double high) { return low * std::pow(high / low, share); };
  return kCalcium * between(a.calcium, b.calcium) + kCarbon * between(a.carbon, b.carbon) +
         kOxygen * between(a.oxygen, b.oxygen);
}

}  // namespace whorl::shaders_cpu
