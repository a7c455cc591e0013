// SPDX-License-Identifier: Apache-2.0
// Bounds of the parameters; from values to a coiling law.
#include "fit/parameters.h"

#include <cmath>

namespace whorl::fit {
namespace {

constexpr double kLeastLnW = 1e-3;

// Bounds are the scene file's, or what no shell exceeds. The plausible width is that of the shells in Raup's block diagram.
constexpr ParameterRow kRows[kParameterCount] = {
    {"radius", "distance of the outer margin from the axis at the lip, mm", -6.0, 8.0, 1.0},
    {"whorls", "turns from the pole to the lip", 1.0, 40.0, 4.0},
    {"W", "whorl expansion per turn", kLeastLnW, 13.8, 0.7},
    {"trend", "change of ln W in a whorl", -2.0, 2.0, 0.1},
    {"D", "distance of the inner margin from the axis / that of the outer", -0.4, 0.95, 0.4},
    {"T", "descent along the axis / distance from the axis", 0.0, 50.0, 2.0},
    {"S", "height of the section along the axis / its breadth", -1.6, 1.6, 0.7},
    {"inclination", "angle between aperture plane and axis, degrees", -1.04, 1.04, 0.3},
    {"W_distance / W", "expansion of the distance from the axis / that of the section", -1.0, 1.0, 0.2},
    {"W_depth / W", "expansion of the depth / that of the section", -1.0, 1.0, 0.2},
};

}  // namespace

const ParameterRow& row_of(Parameter parameter) { return kRows[static_cast<std::size_t>(parameter)]; }

double ln_W_at_start(const Values& values, const Fixed& fixed) {
  return at(values, Parameter::kW) - at(values, Parameter::kTrend) * (at(values, Parameter::kWhorls) - fixed.start);
}

std::optional<Form> form_of(const Values& values, const Fixed& fixed) {
  const double whorls = at(values, Parameter::kWhorls), D = at(values, Parameter::kD), trend = at(values, Parameter::kTrend);
  const double ln_W = at(values, Parameter::kW), ln_W_start = ln_W_at_start(values, fixed);
  const double extra[] = {at(values, Parameter::kDistanceRate), at(values, Parameter::kDepthRate)};
  if (whorls < fixed.start + 0.25 || std::fmin(ln_W, ln_W_start) < kLeastLnW) return std::nullopt;
  for (const double more : extra)
    if (std::fmin(ln_W, ln_W_start) + more < kLeastLnW) return std::nullopt;
  const double margin = std::exp(at(values, Parameter::kSize));
  Form form;
  growth::CoilingLaw& law = form.law;
  law.theta_lip = kTwoPi * whorls;
  law.theta_start = kTwoPi * fixed.start;
  law.half_breadth = 0.5 * margin * (1.0 - D);
  law.distance = 0.5 * margin * (1.0 + D);
  law.depth = at(values, Parameter::kT) * law.distance;
  law.S = std::exp(at(values, Parameter::kS));
  law.roll_cos = std::cos(radians(fixed.roll_deg));
  law.roll_sin = std::sin(radians(fixed.roll_deg));
  const auto expansion = [&](double more) {
    if (trend == 0.0) return growth::Expansion({{0.0, std::exp(ln_W + more)}}, law.theta_lip);
    return growth::Expansion({{fixed.start, std::exp(ln_W_start + more)}, {whorls, std::exp(ln_W + more)}}, law.theta_lip);
  };
  law.by_section = expansion(0.0);
  law.one_expansion = extra[0] == 0.0 && extra[1] == 0.0;
  law.by_distance = law.one_expansion ? law.by_section : expansion(extra[0]);
  law.by_depth = law.one_expansion ? law.by_section : expansion(extra[1]);
  form.tan_inclination = std::tan(at(values, Parameter::kInclination));
  form.wall_mm = fixed.wall_mm;
  form.lip_mm = fixed.lip_mm;
  return form;
}

double natural(Parameter parameter, double value) {
  switch (parameter) {
    case Parameter::kSize:
    case Parameter::kW:
    case Parameter::kS:
    case Parameter::kDistanceRate:
    case Parameter::kDepthRate: return std::exp(value);
    case Parameter::kInclination: return degrees(value);
    default: return value;
  }
}

double natural_slope(Parameter parameter, double value) {
  switch (parameter) {
    case Parameter::kSize:
    case Parameter::kW:
    case Parameter::kS:
    case Parameter::kDistanceRate:
    case Parameter::kDepthRate: return std::exp(value);
    case Parameter::kInclination: return degrees(1.0);
    default: return 1.0;
  }
}

}  // namespace whorl::fit
