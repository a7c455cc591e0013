// SPDX-License-Identifier: Apache-2.0
// Defaults, each said aloud.
#include "fit/assumptions.h"

#include "fit/series_summary.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::Definition;
using specimen::GrowthStage;
using specimen::Reading;

constexpr double kUsualStart = 0.75;
constexpr double kUsualW = 1.6, kUsualD = 0.05, kUsualT = 1.5, kUsualWhorls = 6.0;

bool is_length(const Reading& reading) {
  return specimen::row_of(reading.definition).dimension == specimen::Dimension::kLength;
}

bool is_wall(const Reading& reading) {
  return reading.definition == Definition::kWallThicknessLip || reading.definition == Definition::kWallThicknessWall;
}

void hold(Setting& setting, Parameter p, double value, State state, std::string why) {
  const auto i = static_cast<std::size_t>(p);
  setting.task.free[i] = false;
  setting.trial.values[i] = value;
  setting.state[i] = state;
  setting.why[i] = std::move(why);
}

void hold_stated(Setting& setting, const specimen::Held& held) {
  const auto stated = [&](Parameter p, const std::optional<double>& value, bool logarithm) {
    if (value) hold(setting, p, logarithm ? std::log(*value) : *value, State::kHeld, "held by the file");
  };
  stated(Parameter::kWhorls, held.whorls, false);
  stated(Parameter::kW, held.W, true);
  stated(Parameter::kD, held.D, false);
  stated(Parameter::kT, held.T, false);
  stated(Parameter::kS, held.S, true);
}

// Points lie closer than their errors are independent: so many tell all, and take less time.
specimen::TracedOutline thinned(specimen::TracedOutline outline) {
  constexpr std::size_t kMost = 120;
  const std::size_t count = outline.points.size();
  if (count <= kMost) return outline;
  std::vector<specimen::TracedOutline::Point> kept;
  for (std::size_t i = 0; i < kMost; ++i) kept.push_back(outline.points[i * count / kMost]);
  outline.points = std::move(kept);
  return outline;
}

double step_of_series(const specimen::MeasuredSpecimen& measured, std::size_t series) {
  for (const Reading& reading : measured.readings)
    if (reading.series == static_cast<int>(series)) return reading.standard_error;
  return 0.0;
}

bool all_planispiral(const Task& task) {
  bool any = false;
  for (const Reading& reading : task.readings) {
    const specimen::DefinitionRow& row = specimen::row_of(reading.definition);
    // Angles but that of the lip are those of a spire.
    if (row.dimension == specimen::Dimension::kAngle && reading.definition != Definition::kLipInclinationProfile) return false;
    if (!is_length(reading)) continue;
    if (!row.planispiral && reading.definition != Definition::kWhorlWidthProportional) return false;
    any = any || (row.planispiral && row.quantity != "umbilicus");
  }
  return any;
}

}  // namespace

Setting first_setting(const specimen::MeasuredSpecimen& measured) {
  Setting setting;
  Task& task = setting.task;
  task.fixed.start = measured.held.start.value_or(kUsualStart);
  task.fixed.roll_deg = measured.held.roll_deg.value_or(0.0);
  task.fixed.mould = measured.mould;
  if (measured.mould_wall) task.fixed.wall_mm = measured.mould_wall->value;
  for (const Reading& reading : measured.readings) {
    if (reading.definition == Definition::kWallThicknessWall) task.fixed.wall_mm = reading.value;
    if (reading.definition == Definition::kWallThicknessLip) task.fixed.lip_mm = reading.value;
    if (!is_wall(reading)) task.readings.push_back(reading);
  }
  for (const Parameter p : {Parameter::kSize, Parameter::kWhorls, Parameter::kW, Parameter::kD, Parameter::kT, Parameter::kS})
    task.free[static_cast<std::size_t>(p)] = true;
  setting.trial.values = {};
  at(setting.trial.values, Parameter::kWhorls) = kUsualWhorls;
  at(setting.trial.values, Parameter::kW) = std::log(kUsualW);
  at(setting.trial.values, Parameter::kD) = kUsualD;
  at(setting.trial.values, Parameter::kT) = kUsualT;
  at(setting.trial.values, Parameter::kSize) = std::log(10.0);

  for (const Reading& reading : task.readings) {
    if (reading.definition == Definition::kLipInclinationProfile) {
      task.free[static_cast<std::size_t>(Parameter::kInclination)] = true;
      at(setting.trial.values, Parameter::kInclination) = radians(reading.value);
    }
    if (specimen::row_of(reading.definition).dimension == specimen::Dimension::kCount) {
      double whorls = reading.value;
      if (reading.definition != Definition::kWhorlsPole) whorls += task.fixed.start;
      if (reading.definition == Definition::kWhorlsNucleusLineQuarter) whorls -= 0.25;
      at(setting.trial.values, Parameter::kWhorls) = whorls;
    }
    double least = 0.0;
    if (reading.stage.kind == GrowthStage::Kind::kBehindLip) least = reading.stage.value;
    if (reading.stage.kind == GrowthStage::Kind::kAtWhorl) least = reading.stage.value;
    setting.least_whorls = std::max(setting.least_whorls, task.fixed.start + least + 0.5);
  }
  at(setting.trial.values, Parameter::kWhorls) = std::max(at(setting.trial.values, Parameter::kWhorls), setting.least_whorls);
  hold_stated(setting, measured.held);
  if (all_planispiral(task) && !measured.held.T)
    hold(setting, Parameter::kT, 0.0, State::kImplied, "planispiral: all lengths are those of a shell coiled in one plane");

  task.sinistral = measured.identity.coiling.value == specimen::Coiling::kSinistral;
  for (const specimen::TracedOutline& outline : measured.outlines) task.outlines.push_back(thinned(outline));
  setting.trial.placements.resize(task.outlines.size());
  if (task.outlines.empty() && std::none_of(task.readings.begin(), task.readings.end(), is_length))
    hold(setting, Parameter::kSize, std::log(10.0), State::kAssumed, "unknown: no length was measured");

  task.scatter.assign(measured.series.size(), 0.0);
  task.scale_free.assign(measured.series.size(), false);
  setting.trial.series_scale.assign(measured.series.size(), 0.0);
  const bool another_length = std::any_of(task.readings.begin(), task.readings.end(), [](const Reading& reading) {
    return is_length(reading) && reading.definition != Definition::kWhorlWidthProportional;
  });
  for (std::size_t i = 0; i < measured.series.size(); ++i) {
    task.scatter[i] = measured.series[i].scatter ? *measured.series[i].scatter : own_scatter(measured.series[i], step_of_series(measured, i));
    if (measured.series[i].definition != Definition::kWhorlWidthProportional) continue;
    if (another_length || i > 0) {
      task.scale_free[i] = true;
    } else {
      setting.remarks.push_back("No length fixes the size, since only the ratios of the series count: its widths are taken as the "
                                "breadth of the whorl section. Add any length, such as shell_height axial.");
    }
  }
  return setting;
}

double closing_whorls(const Setting& setting) {
  constexpr double kSmallest = 100.0, kFewest = 1.5, kMost = 12.0;
  const double ln_W = std::max(at(setting.trial.values, Parameter::kW), 1e-3);
  const double whorls = setting.task.fixed.start + std::clamp(std::log(kSmallest) / ln_W, kFewest, kMost);
  return std::max(whorls, setting.least_whorls);
}

void assume(Setting& setting, Parameter parameter) {
  switch (parameter) {
    case Parameter::kWhorls:
      hold(setting, parameter, closing_whorls(setting), State::kAssumed,
           "assumed, so that the first whorl of the tube has a hundredth of the last one's size");
      break;
    case Parameter::kD: hold(setting, parameter, kUsualD, State::kAssumed, "assumed, so that the whorls all but reach the axis"); break;
    case Parameter::kT: hold(setting, parameter, kUsualT, State::kAssumed, "assumed: the height of the spire is unknown"); break;
    case Parameter::kS: hold(setting, parameter, 0.0, State::kAssumed, "assumed: a circular whorl section"); break;
    case Parameter::kInclination: hold(setting, parameter, 0.0, State::kAssumed, "assumed: an upright aperture"); break;
    default: hold(setting, parameter, 0.0, State::kAssumed, "assumed: the same expansion everywhere"); break;
  }
}

std::optional<Parameter> to_give_up(const Knowledge& knowledge) {
  // Least is lost with the first: what nothing measured depends on is nearest to being a mere default.
  constexpr Parameter kOrder[] = {Parameter::kWhorls, Parameter::kInclination,  Parameter::kDepthRate, Parameter::kDistanceRate,
                                  Parameter::kTrend,  Parameter::kD,            Parameter::kS,         Parameter::kT};
  constexpr double kTakesPart = 0.3;  // of the largest component
  const double largest = knowledge.weakest_direction.cwiseAbs().maxCoeff();
  for (const Parameter parameter : kOrder)
    for (std::size_t k = 0; k < knowledge.indices.size(); ++k)
      if (knowledge.indices[k] == static_cast<std::size_t>(parameter) &&
          std::abs(knowledge.weakest_direction[static_cast<Eigen::Index>(k)]) > kTakesPart * largest)
        return parameter;
  return std::nullopt;
}

}  // namespace whorl::fit
