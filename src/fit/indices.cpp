// SPDX-License-Identifier: Apache-2.0
// Formulas of the indices and their propagated errors, by differences.
#include "fit/indices.h"

#include "fit/predict.h"

#include <cmath>
#include <functional>

namespace whorl::fit {
namespace {

using specimen::Definition;
using specimen::GrowthStage;
using specimen::Reading;

struct IndexRow {
  const char* name;
  const char* meaning;
  std::vector<std::vector<Definition>> needs;  // for each argument, what may stand for it
  double (*formula)(const std::vector<double>& arguments);
};

// Korn & Klug 2007 and Korn 2010 for the conch indices; relative height of the spire as printed for gastropods.
const std::vector<IndexRow>& rows() {
  using enum Definition;
  static const std::vector<Definition> dm{kDiameterSumOfRadii}, ah{kAperturalHeightVenters}, ww{kWhorlWidthAlongAxis},
      wh{kWhorlHeightMargin, kWhorlHeightSeam}, uw{kUmbilicusMargins, kUmbilicusSeams};
  static const std::vector<IndexRow> all{
      {"WER", "whorl expansion rate (dm / (dm - ah))^2", {dm, ah},
       [](const std::vector<double>& v) { return std::pow(v[0] / (v[0] - v[1]), 2); }},
      {"CWI", "conch width index ww / dm", {ww, dm}, [](const std::vector<double>& v) { return v[0] / v[1]; }},
      {"WWI", "whorl width index ww / wh", {ww, wh}, [](const std::vector<double>& v) { return v[0] / v[1]; }},
      {"UWI", "umbilical width index uw / dm", {uw, dm}, [](const std::vector<double>& v) { return v[0] / v[1]; }},
      {"IZR", "imprint zone rate (wh - ah) / wh", {wh, ah}, [](const std::vector<double>& v) { return (v[0] - v[1]) / v[0]; }},
      {kIsometricUmbilicus, "dm - wh - wh / sqrt(WER), mm", {dm, wh, ah},
       [](const std::vector<double>& v) { return v[0] - v[1] - v[1] * (v[0] - v[2]) / v[0]; }},
      {"spire index", "relative height of the spire (shell height - aperture height) / shell height",
       {{kShellHeightAxial}, {kApertureHeightAxial}},
       [](const std::vector<double>& v) { return (v[0] - v[1]) / v[0]; }},
      {"height / width", "shell height / shell width", {{kShellHeightAxial}, {kShellWidthAcross}},
       [](const std::vector<double>& v) { return v[0] / v[1]; }},
      {"umbilicus / width", "umbilicus / shell width", {uw, {kShellWidthAcross}},
       [](const std::vector<double>& v) { return v[0] / v[1]; }}};
  return all;
}

bool same_stage(const GrowthStage& a, const GrowthStage& b) {
  // A diameter is its own stage.
  return a.kind == b.kind && a.value == b.value;
}

const Reading* reading_of(const Task& task, const std::vector<Definition>& any_of, const GrowthStage& stage) {
  for (const Reading& reading : task.readings)
    for (const Definition definition : any_of)
      if (reading.definition == definition && reading.series < 0 && same_stage(reading.stage, stage)) return &reading;
  return nullptr;
}

void from_readings(const Task& task, const IndexRow& row, IndexResult& result) {
  for (const Reading& anchor : task.readings) {
    std::vector<const Reading*> readings;
    for (const auto& need : row.needs) readings.push_back(reading_of(task, need, anchor.stage));
    std::vector<double> values;
    for (const Reading* reading : readings) {
      if (reading == nullptr) break;
      values.push_back(reading->value);
    }
    if (values.size() < readings.size()) continue;
    result.from_readings = true;
    result.read = row.formula(values);
    double variance = 0.0;
    std::vector<double> upwards = values, downwards = values;  // every reading off by its step, in the worst senses
    for (std::size_t i = 0; i < values.size(); ++i) {
      const double h = 1e-6 * values[i];
      std::vector<double> moved = values;
      moved[i] += h;
      const double slope = (row.formula(moved) - result.read) / h;
      variance += std::pow(slope * readings[i]->standard_error, 2);
      const double step = readings[i]->step > 0.0 ? readings[i]->step : readings[i]->standard_error;
      upwards[i] += std::copysign(step, slope);
      downwards[i] -= std::copysign(step, slope);
    }
    result.read_step = std::max(std::abs(row.formula(upwards) - result.read), std::abs(row.formula(downwards) - result.read));
    result.read_error = std::sqrt(variance);
    return;
  }
}

double of_shell(const Fit& fit, const IndexRow& row, const Trial& trial) {
  const std::optional<Form> form = form_of(trial.values, fit.task.fixed);
  if (!form) return kNotMeasurable;
  std::vector<double> values;
  for (const auto& need : row.needs) {
    // Under the definition that was read, the catalogue's first where none was.
    const Reading* read = nullptr;
    for (const Reading& reading : fit.task.readings)
      for (const Definition definition : need)
        if (reading.definition == definition) read = &reading;
    values.push_back(predict(*form, read != nullptr ? read->definition : need.front(), {}));
  }
  return row.formula(values);
}

}  // namespace

std::vector<IndexResult> indices_of(const Fit& fit) {
  std::vector<IndexResult> results;
  const Eigen::VectorXd x = packed(fit.task, fit.trial);
  const Bounds bounds = bounds_of(fit.task);
  for (const IndexRow& row : rows()) {
    IndexResult result{row.name, row.meaning, of_shell(fit, row, fit.trial), 0.0, false, 0.0, 0.0, 0.0};
    from_readings(fit.task, row, result);
    if (std::isfinite(result.of_shell) && fit.knowledge.covariance.rows() == x.size()) {
      Eigen::VectorXd slopes = Eigen::VectorXd::Zero(x.size());
      for (Eigen::Index k = 0; k < x.size(); ++k) {
        const double h = 1e-5 * bounds.plausible[k];
        Eigen::VectorXd moved = x;
        moved[k] += moved[k] + h > bounds.high[k] ? -h : h;
        const double there = of_shell(fit, row, unpacked(fit.task, fit.trial, moved));
        if (std::isfinite(there)) slopes[k] = (there - result.of_shell) / (moved[k] - x[k]);
      }
      double variance = fit.inflation * fit.inflation * std::max(0.0, slopes.dot(fit.knowledge.covariance * slopes));
      for (const std::vector<Trial>& sides : fit.alternatives) {
        double farthest = 0.0;
        for (const Trial& side : sides) farthest = std::max(farthest, std::abs(of_shell(fit, row, side) - result.of_shell));
        if (std::isfinite(farthest)) variance += farthest * farthest;
      }
      result.of_shell_error = std::sqrt(variance);
    }
    results.push_back(std::move(result));
  }
  return results;
}

}  // namespace whorl::fit
