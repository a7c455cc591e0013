// SPDX-License-Identifier: Apache-2.0
// Definitions by the methods of src/measure.
#include "fit/on_solid.h"

#include "fit/predict.h"
#include "measure/mouth.h"
#include "measure/support.h"
#include "measure/whorl_section.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::Definition;

// Measures that are taken on whorl sections, which a mould has as well as a shell.
bool by_sections(Definition definition) {
  using enum Definition;
  switch (definition) {
    case kPleuralAngleLastTwo:
    case kPenultimateWidthFlanks:
    case kDiameterSumOfRadii:
    case kWhorlWidthFlanks:
    case kAperturalHeightVenters:
    case kWhorlHeightMargin:
    case kWhorlWidthSection:
    case kWhorlWidthAlongAxis:
    case kUmbilicusMargins:
    case kWhorlsPole: return true;
    default: return false;
  }
}

// Measures of the whole are taken once, when first asked for.
class Taker {
 public:
  Taker(const Fit& fit, const field::Field& field, const trace::SolidOptions& options)
      : form_(*form_of(fit.trial.values, fit.task.fixed)), fit_is_of_mould_(fit.task.fixed.mould), field_(field), options_(options) {}

  std::optional<double> take(const specimen::Reading& reading) {
    using enum Definition;
    if (fit_is_of_mould_ && !by_sections(reading.definition)) return std::nullopt;
    const bool whole = reading.stage.kind == specimen::GrowthStage::Kind::kLip;
    const double theta = theta_of(form_, reading.stage);
    switch (reading.definition) {
      case kShellHeightAxial: return whole ? std::optional(base() - apex()) : std::nullopt;
      case kShellWidthAcross: return whole ? std::optional(measure::width_across_axis(solid())) : std::nullopt;
      case kApertureHeightAxial: return whole ? std::optional(mouth().height) : std::nullopt;
      case kApertureWidthAcross: return whole ? std::optional(mouth().width) : std::nullopt;
      case kLastWhorlHeightFlank: return suture() ? std::optional(base() - *suture()) : std::nullopt;
      case kSpireHeightLessLastWhorl: return suture() ? std::optional(*suture() - apex()) : std::nullopt;
      case kSpireHeightLessAperture: return base() - apex() - mouth().height;
      case kPleuralAngleLastTwo: {
        const auto last = section(theta), before = section(theta - kTwoPi);
        if (last.empty() || before.empty()) return std::nullopt;
        return 2.0 * degrees(measure::touching_angle(last, before));
      }
      case kPenultimateWidthFlanks: return outer(theta - kTwoPi) + outer(theta - 3.0 * kPi);
      case kDiameterSumOfRadii:
      case kWhorlWidthFlanks: return outer(theta) + outer(theta - kPi);
      case kAperturalHeightVenters: return outer(theta) - outer(theta - kTwoPi);
      case kWhorlHeightMargin:
      case kWhorlWidthSection: return outer(theta) - section(theta).rho_min;
      case kWhorlWidthAlongAxis: return section(theta).z_max - section(theta).z_min;
      case kUmbilicusMargins: return section(theta).rho_min + section(theta - kPi).rho_min;
      case kWhorlsPole: return field_.scene().law.theta_lip / kTwoPi;
      default: return std::nullopt;
    }
  }

 private:
  static constexpr int kGrid = 128;

  const trace::EmbreeSolid& solid() {
    if (!solid_) solid_.emplace(field_, options_);
    return *solid_;
  }
  double base() {
    if (!base_) base_ = measure::support(solid(), {0, 0, 1}, kGrid);
    return *base_;
  }
  double apex() {
    if (!apex_) apex_ = -measure::support(solid(), {0, 0, -1}, kGrid);
    return *apex_;
  }
  const measure::MouthExtent& mouth() {
    if (!mouth_) mouth_ = measure::mouth_extent(field_);
    return *mouth_;
  }
  std::optional<double> suture() {
    double z;
    if (!suture_) suture_ = measure::suture_depth(solid(), z) ? std::optional(z) : std::nullopt;
    return *suture_;
  }
  measure::WhorlSection section(double theta) const {
    return fit_is_of_mould_ ? measure::lumen_section(field_, theta) : measure::whorl_section(field_, theta);
  }
  double outer(double theta) const { return section(theta).rho_max; }

  Form form_;
  bool fit_is_of_mould_;
  const field::Field& field_;
  trace::SolidOptions options_;
  std::optional<trace::EmbreeSolid> solid_;
  std::optional<double> base_, apex_;
  std::optional<measure::MouthExtent> mouth_;
  std::optional<std::optional<double>> suture_;
};

}  // namespace

OnSolid measured_on_solid(const Fit& fit, const field::Field& field, const trace::SolidOptions& cells) {
  Taker taker(fit, field, cells);
  OnSolid values;
  for (const specimen::Reading& reading : fit.task.readings) {
    // Whorls before the tube's beginning are embryonic shell on the solid.
    const Form form = *form_of(fit.trial.values, fit.task.fixed);
    const bool tube = theta_of(form, reading.stage) - 3.0 * kPi > form.law.theta_start;
    std::optional<double> value = tube ? taker.take(reading) : std::nullopt;
    if (value && reading.series >= 0) value = *value * std::exp(fit.trial.series_scale[static_cast<std::size_t>(reading.series)]);
    values.push_back(value && std::isfinite(*value) ? value : std::nullopt);
  }
  return values;
}

void compare_with_solid(Fit& fit, const OnSolid& on_solid) {
  constexpr double kAgreement = 0.001;
  const Form form = *form_of(fit.trial.values, fit.task.fixed);
  const double size = std::max(predict(form, Definition::kShellHeightAxial, {}), predict(form, Definition::kDiameterSumOfRadii, {}));
  for (std::size_t i = 0; i < fit.readings.size(); ++i) {
    if (!on_solid[i]) continue;
    const specimen::Reading& reading = fit.task.readings[i];
    const bool length = specimen::row_of(reading.definition).dimension == specimen::Dimension::kLength;
    const double allowed = kAgreement * (length ? size : std::max(1.0, std::abs(*on_solid[i])));
    if (std::abs(*on_solid[i] - fit.readings[i].predicted) > allowed)
      fit.remarks.push_back(fmt::format("On the solid, {} measures {:.5g}, which differs from the law's {:.5g} by more than 0.1 %: wall, lip "
                                        "or columella stand in the way.",
                                        specimen::written_definition(reading.definition), *on_solid[i], fit.readings[i].predicted));
  }
}

}  // namespace whorl::fit
