// SPDX-License-Identifier: Apache-2.0
// One fitting task: readings with their weights, which parameters are free, and the residuals of a trial.
#pragma once

#include "fit/outline_distance.h"
#include "fit/parameters.h"
#include "specimen/measurement_file.h"

#include <Eigen/Core>

#include <array>
#include <vector>

namespace whorl::fit {

/// A trial: the parameters, and the scale of each series of which only the ratios count (logarithm; 0 for other series).
struct Trial {
  Values values{};
  std::vector<double> series_scale;
  std::vector<Placement> placements;  // of the traced outlines
};

struct Task {
  std::vector<specimen::Reading> readings;
  Fixed fixed;
  std::vector<double> scatter;               // natural irregularity of each series, as a fraction of the value
  std::array<bool, kParameterCount> free{};
  std::vector<bool> scale_free;              // of each series
  std::vector<specimen::TracedOutline> outlines;
  bool sinistral = false;                    // matters to outlines only
  /// Distances of outline points count as they are up to about so many standard errors; beyond, by their logarithm, so that a
  /// broken edge or a slip of the tracer does not pull (Cauchy's loss).
  double robust_from = 2.0;

  std::size_t residual_count() const;

  std::size_t free_count() const;
  /// Standard error of a reading with the scatter of its series.
  double sigma(const specimen::Reading& reading) const;
};

/// The free numbers of a trial in one vector, and back.
Eigen::VectorXd packed(const Task& task, const Trial& trial);
Trial unpacked(const Task& task, const Trial& base, const Eigen::VectorXd& x);
/// Per free number: bounds and plausible width.
struct Bounds {
  Eigen::VectorXd low, high, plausible;
};
Bounds bounds_of(const Task& task);
/// The parameter of each free number; the count of parameters for scales of series.
std::vector<std::size_t> free_indices(const Task& task);

/// What the trial predicts for every reading. False where it makes no shell or lacks a measure.
bool predictions(const Task& task, const Trial& trial, Eigen::VectorXd& predicted);
/// (predicted - read) / sigma.
bool residuals(const Task& task, const Trial& trial, Eigen::VectorXd& result);
/// Derivatives of the residuals by the free numbers: central differences, one-sided at a bound or an edge of what is
/// measurable. False where neither side can be taken.
bool jacobian(const Task& task, const Trial& base, const Eigen::VectorXd& x, Eigen::MatrixXd& result);

}  // namespace whorl::fit
