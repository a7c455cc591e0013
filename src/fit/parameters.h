// SPDX-License-Identifier: Apache-2.0
// What a fit may vary, each with its bounds and its plausible range, and the form that a set of values makes.
#pragma once

#include "fit/form.h"

#include <array>
#include <optional>
#include <string_view>
#include <vector>

namespace whorl::fit {

/// In the order of the vector of values.
enum class Parameter : std::size_t {
  kSize,          // ln of the outer margin's distance from the axis at the lip, mm
  kWhorls,        // from the pole
  kW,             // ln W; at the lip where there is a trend
  kTrend,         // change of ln W in a whorl
  kD,
  kT,
  kS,             // ln S
  kInclination,   // of the aperture, radians
  kDistanceRate,  // ln W_distance - ln W
  kDepthRate,     // ln W_depth - ln W
};
inline constexpr std::size_t kParameterCount = 10;

struct ParameterRow {
  std::string_view name;    // as in the scene file where it has one
  std::string_view meaning;
  double low, high;         // bounds of the vector's value
  double plausible;         // width of the range that shells take, in the vector's unit: the yardstick of being fixed by data
};
const ParameterRow& row_of(Parameter parameter);

using Values = std::array<double, kParameterCount>;
inline double& at(Values& values, Parameter p) { return values[static_cast<std::size_t>(p)]; }
inline double at(const Values& values, Parameter p) { return values[static_cast<std::size_t>(p)]; }

/// What does not vary within a fit.
struct Fixed {
  double start = 0.75;     // whorls
  double roll_deg = 0.0;
  double wall_mm = 0.0, lip_mm = 0.0;
  bool mould = false;      // the form is that of an internal mould, with a wall of `wall_mm` at the lip round it
};

/// Empty where the values make no shell: an expansion that falls to 1 or below, a lip before the start.
std::optional<Form> form_of(const Values& values, const Fixed& fixed);

/// The value as a user knows it: W from ln W, degrees from radians, mm from its logarithm.
double natural(Parameter parameter, double value);
/// Derivative of `natural`.
double natural_slope(Parameter parameter, double value);

/// ln W at the embryonic shell's end, and at the lip, of the section.
double ln_W_at_start(const Values& values, const Fixed& fixed);

}  // namespace whorl::fit
