// SPDX-License-Identifier: Apache-2.0
// Residuals and their derivatives.
#include "fit/task.h"

#include "fit/predict.h"

#include <algorithm>
#include <cmath>

namespace whorl::fit {

using specimen::Reading;

namespace {

constexpr double kMostTilt = 0.35, kUsualTilt = 0.02;  // radians, of the axis in a picture that was meant to be upright

// Cauchy's loss as a residual: its square is c^2 ln(1 + (r / c)^2).
double robust(double residual, double c) {
  return std::copysign(c * std::sqrt(std::log1p(residual * residual / (c * c))), residual);
}

}  // namespace

std::size_t Task::free_count() const {
  return static_cast<std::size_t>(std::count(free.begin(), free.end(), true) +
                                  std::count(scale_free.begin(), scale_free.end(), true)) +
         3 * outlines.size();
}

std::size_t Task::residual_count() const {
  std::size_t count = readings.size();
  for (const specimen::TracedOutline& outline : outlines) count += outline.points.size();
  return count + outlines.size();
}

double Task::sigma(const Reading& reading) const {
  const double natural_part = reading.series < 0 ? 0.0 : scatter[static_cast<std::size_t>(reading.series)] * reading.value;
  return std::hypot(reading.standard_error, natural_part);
}

std::vector<std::size_t> free_indices(const Task& task) {
  std::vector<std::size_t> indices;
  for (std::size_t i = 0; i < kParameterCount; ++i)
    if (task.free[i]) indices.push_back(i);
  for (const bool scale : task.scale_free)
    if (scale) indices.push_back(kParameterCount);
  indices.resize(indices.size() + 3 * task.outlines.size(), kParameterCount);
  return indices;
}

Eigen::VectorXd packed(const Task& task, const Trial& trial) {
  Eigen::VectorXd x(static_cast<Eigen::Index>(task.free_count()));
  Eigen::Index k = 0;
  for (std::size_t i = 0; i < kParameterCount; ++i)
    if (task.free[i]) x[k++] = trial.values[i];
  for (std::size_t i = 0; i < task.scale_free.size(); ++i)
    if (task.scale_free[i]) x[k++] = trial.series_scale[i];
  for (const Placement& placement : trial.placements)
    for (const double value : {placement.x, placement.y, placement.tilt}) x[k++] = value;
  return x;
}

Trial unpacked(const Task& task, const Trial& base, const Eigen::VectorXd& x) {
  Trial trial = base;
  Eigen::Index k = 0;
  for (std::size_t i = 0; i < kParameterCount; ++i)
    if (task.free[i]) trial.values[i] = x[k++];
  for (std::size_t i = 0; i < task.scale_free.size(); ++i)
    if (task.scale_free[i]) trial.series_scale[i] = x[k++];
  for (Placement& placement : trial.placements)
    for (double* value : {&placement.x, &placement.y, &placement.tilt}) *value = x[k++];
  return trial;
}

Bounds bounds_of(const Task& task) {
  const auto count = static_cast<Eigen::Index>(task.free_count());
  Bounds bounds{Eigen::VectorXd::Constant(count, -20.0), Eigen::VectorXd::Constant(count, 20.0),
                Eigen::VectorXd::Constant(count, 1.0)};
  Eigen::Index k = 0;
  for (std::size_t i = 0; i < kParameterCount; ++i) {
    if (!task.free[i]) continue;
    const ParameterRow& row = row_of(static_cast<Parameter>(i));
    bounds.low[k] = row.low;
    bounds.high[k] = row.high;
    bounds.plausible[k++] = row.plausible;
  }
  k += std::count(task.scale_free.begin(), task.scale_free.end(), true);
  for (std::size_t i = 0; i < task.outlines.size(); ++i)
    for (const auto& [most, plausible] : {std::pair{1e5, 1.0}, {1e5, 1.0}, {kMostTilt, kUsualTilt}}) {
      bounds.low[k] = -most;
      bounds.high[k] = most;
      bounds.plausible[k++] = plausible;
    }
  return bounds;
}

bool predictions(const Task& task, const Trial& trial, Eigen::VectorXd& predicted) {
  const std::optional<Form> form = form_of(trial.values, task.fixed);
  if (!form) return false;
  predicted.resize(static_cast<Eigen::Index>(task.readings.size()));
  for (std::size_t i = 0; i < task.readings.size(); ++i) {
    const Reading& reading = task.readings[i];
    double value = predict(*form, reading.definition, reading.stage);
    if (reading.series >= 0) value *= std::exp(trial.series_scale[static_cast<std::size_t>(reading.series)]);
    if (!std::isfinite(value)) return false;
    predicted[static_cast<Eigen::Index>(i)] = value;
  }
  return true;
}

bool residuals(const Task& task, const Trial& trial, Eigen::VectorXd& result) {
  if (!predictions(task, trial, result)) return false;
  for (std::size_t i = 0; i < task.readings.size(); ++i) {
    double& value = result[static_cast<Eigen::Index>(i)];
    value = (value - task.readings[i].value) / task.sigma(task.readings[i]);
  }
  if (task.outlines.empty()) return true;
  const Form form = *form_of(trial.values, task.fixed);
  auto k = static_cast<Eigen::Index>(task.readings.size());
  result.conservativeResize(static_cast<Eigen::Index>(task.residual_count()));
  std::vector<double> distances;
  for (std::size_t i = 0; i < task.outlines.size(); ++i) {
    outline_distances(form, task.outlines[i], trial.placements[i], task.sinistral, distances);
    for (const double distance : distances) {
      if (!std::isfinite(distance)) return false;
      result[k++] = robust(distance / task.outlines[i].standard_error, task.robust_from);
    }
    // Pictures are meant to be upright.
    result[k++] = trial.placements[i].tilt / kUsualTilt;
  }
  return true;
}

bool jacobian(const Task& task, const Trial& base, const Eigen::VectorXd& x, Eigen::MatrixXd& result) {
  constexpr double kStep = 1e-5;  // of the plausible width: truncation 1e-10, rounding 1e-10 of a residual's scale
  const Bounds bounds = bounds_of(task);
  Eigen::VectorXd above, below;
  result.resize(static_cast<Eigen::Index>(task.residual_count()), x.size());
  for (Eigen::Index k = 0; k < x.size(); ++k) {
    const double h = kStep * bounds.plausible[k];
    Eigen::VectorXd high = x, low = x;
    high[k] = std::min(x[k] + h, bounds.high[k]);
    low[k] = std::max(x[k] - h, bounds.low[k]);
    if (!residuals(task, unpacked(task, base, high), above)) {
      high[k] = x[k];
      if (!residuals(task, unpacked(task, base, high), above)) return false;
    }
    if (!residuals(task, unpacked(task, base, low), below)) {
      low[k] = x[k];
      if (!residuals(task, unpacked(task, base, low), below)) return false;
    }
    if (!(high[k] > low[k])) return false;
    result.col(k) = (above - below) / (high[k] - low[k]);
  }
  return true;
}

}  // namespace whorl::fit
