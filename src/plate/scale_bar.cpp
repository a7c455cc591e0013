// SPDX-License-Identifier: Apache-2.0
// The 1-2-5 rule for scale bars, and their labels.
#include "plate/scale_bar.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::plate {

double automatic_bar_mm(double view_width_mm) {
  // A view whose limit is a step to rounding gets that step.
  const double limit = kLongestBar * view_width_mm * (1.0 + 1e-12);
  const int decade = static_cast<int>(std::floor(std::log10(limit)));
  // One decade up as well: log10 may fall short of a whole number by rounding.
  for (int n = decade + 1; n >= decade - 1; --n) {
    for (const double step : {5.0, 2.0, 1.0}) {
      const double length = n < 0 ? step / std::pow(10.0, -n) : step * std::pow(10.0, n);
      if (length <= limit) return length;
    }
  }
  return limit;
}

std::string plain_number(double value) { return fmt::format("{:.4g}", value); }

std::string bar_label(double length_mm) {
  if (length_mm < 1.0) return plain_number(length_mm * 1000.0) + " µm";
  return plain_number(length_mm) + " mm";
}

}  // namespace whorl::plate
