// SPDX-License-Identifier: Apache-2.0
// Quantiles that judge a fit.
#pragma once

#include <cmath>

namespace whorl::fit {

/// Quantile of the normal distribution for a 95 % interval.
inline constexpr double kNormal95 = 1.959963985;

/// A sum of squares as a normal deviate (Wilson & Hilferty 1931, PNAS 17: 684-688); 0 without degrees of freedom.
inline double deviate_of(double chi_square, int freedom) {
  if (freedom <= 0) return 0.0;
  const double spread = 2.0 / (9.0 * freedom);
  return (std::cbrt(chi_square / freedom) - (1.0 - spread)) / std::sqrt(spread);
}

/// Student's two-sided 95 % quantile: exact for 1 and 2 degrees, beyond by the expansion of Fisher & Cornish 1960.
inline double student95(int freedom) {
  if (freedom <= 1) return 12.7062;
  if (freedom == 2) return 4.30265;
  const double z = kNormal95, v = freedom, z2 = z * z;
  return z + z * (z2 + 1.0) / (4.0 * v) + z * ((5.0 * z2 + 16.0) * z2 + 3.0) / (96.0 * v * v) +
         z * (((3.0 * z2 + 19.0) * z2 + 17.0) * z2 - 15.0) / (384.0 * v * v * v);
}

}  // namespace whorl::fit
