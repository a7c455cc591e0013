// SPDX-License-Identifier: Apache-2.0
// Ceres' trust region with bounds behind a plain interface; starts by a Halton sequence with the size solved in closed form.
#include "fit/solve.h"

#include <ceres/ceres.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

class Cost : public ceres::CostFunction {
 public:
  Cost(const Task& task, const Trial& base) : task_(task), base_(base) {
    set_num_residuals(static_cast<int>(task.readings.size()));
    mutable_parameter_block_sizes()->push_back(static_cast<int>(task.free_count()));
  }

  bool Evaluate(double const* const* parameters, double* values, double** jacobians) const override {
    const Eigen::VectorXd x = Eigen::Map<const Eigen::VectorXd>(parameters[0], parameter_block_sizes()[0]);
    Eigen::VectorXd result;
    if (!residuals(task_, unpacked(task_, base_, x), result)) return false;
    std::copy(result.data(), result.data() + result.size(), values);
    if (jacobians == nullptr || jacobians[0] == nullptr) return true;
    Eigen::MatrixXd slopes;
    if (!jacobian(task_, base_, x, slopes)) return false;
    Eigen::Map<Eigen::Matrix<double, Eigen::Dynamic, Eigen::Dynamic, Eigen::RowMajor>>(jacobians[0], slopes.rows(),
                                                                                       slopes.cols()) = slopes;
    return true;
  }

 private:
  const Task& task_;
  const Trial& base_;
};

/// The digit-reversed fraction of an index in a base (Halton 1960, Numerische Mathematik 2: 84-90).
double halton(int index, int base) {
  double fraction = 1.0, value = 0.0;
  for (int i = index; i > 0; i /= base) {
    fraction /= base;
    value += fraction * (i % base);
  }
  return value;
}

// Ranges over which starts are spread, in the vector's units; T with more weight on low spires.
void spread(const Task& task, Trial& trial, int index) {
  const auto set = [&](Parameter p, int base, double low, double high, double power) {
    if (task.free[static_cast<std::size_t>(p)])
      at(trial.values, p) = low + (high - low) * std::pow(halton(index, base), power);
  };
  set(Parameter::kW, 2, std::log(1.08), std::log(5.0), 1.5);
  set(Parameter::kT, 3, 0.0, 9.0, 1.6);
  set(Parameter::kD, 5, -0.1, 0.6, 1.0);
  set(Parameter::kS, 7, std::log(0.45), std::log(2.5), 1.0);
  set(Parameter::kWhorls, 11, task.fixed.start + 1.5, task.fixed.start + 9.0, 1.0);
}

bool is_length(const specimen::Reading& reading) {
  return specimen::row_of(reading.definition).dimension == specimen::Dimension::kLength;
}

// Every length is in proportion to the size: the best one for a shape in closed form. Twice, since stages that are given by a
// diameter move with the size.
bool set_size(const Task& task, Trial& trial) {
  for (int round = 0; round < 2; ++round) {
    Eigen::VectorXd predicted;
    if (!predictions(task, trial, predicted)) return false;
    double cross = 0.0, square = 0.0;
    for (std::size_t i = 0; i < task.readings.size(); ++i) {
      const specimen::Reading& reading = task.readings[i];
      if (!is_length(reading)) continue;
      const double weight = 1.0 / std::max(task.sigma(reading), 0.01 * reading.value);
      const double model = predicted[static_cast<Eigen::Index>(i)];
      cross += weight * weight * model * reading.value;
      square += weight * weight * model * model;
    }
    if (square <= 0.0 || cross <= 0.0) return true;
    if (task.free[static_cast<std::size_t>(Parameter::kSize)]) at(trial.values, Parameter::kSize) += std::log(cross / square);
  }
  return true;
}

// Misfit with errors no smaller than 1 % of the value, so that a start counts as near by its shape.
double coarse_misfit(const Task& task, const Trial& trial) {
  Eigen::VectorXd predicted;
  if (!predictions(task, trial, predicted)) return std::numeric_limits<double>::infinity();
  double sum = 0.0;
  for (std::size_t i = 0; i < task.readings.size(); ++i) {
    const specimen::Reading& reading = task.readings[i];
    const double floor = 0.01 * std::max(std::abs(reading.value), is_length(reading) ? 0.0 : 1.0);
    const double sigma = std::max(task.sigma(reading), floor);
    sum += std::pow((predicted[static_cast<Eigen::Index>(i)] - reading.value) / sigma, 2);
  }
  return sum;
}

bool same_place(const Task& task, const Trial& a, const Trial& b) {
  const Bounds bounds = bounds_of(task);
  return ((packed(task, a) - packed(task, b)).array().abs() < 0.02 * bounds.plausible.array()).all();
}

}  // namespace

std::optional<Solution> solve_from(const Task& task, const Trial& start) {
  Eigen::VectorXd check;
  if (!residuals(task, start, check)) return std::nullopt;
  Solution solution{start, check.squaredNorm(), true};
  if (task.free_count() == 0) return solution;
  const Bounds bounds = bounds_of(task);
  Eigen::VectorXd x = packed(task, start).cwiseMax(bounds.low).cwiseMin(bounds.high);
  ceres::Problem problem;
  problem.AddResidualBlock(new Cost(task, start), nullptr, x.data());  // the problem owns the cost
  for (int k = 0; k < static_cast<int>(x.size()); ++k) {
    problem.SetParameterLowerBound(x.data(), k, bounds.low[k]);
    problem.SetParameterUpperBound(x.data(), k, bounds.high[k]);
  }
  ceres::Solver::Options options;
  options.linear_solver_type = ceres::DENSE_QR;
  options.max_num_iterations = 80;
  options.function_tolerance = 1e-10;
  options.gradient_tolerance = 1e-12;
  options.parameter_tolerance = 1e-10;
  options.max_num_consecutive_invalid_steps = 12;
  options.num_threads = 1;
  options.logging_type = ceres::SILENT;
  ceres::Solver::Summary summary;
  ceres::Solve(options, &problem, &summary);
  solution.trial = unpacked(task, start, x);
  solution.converged = summary.termination_type == ceres::CONVERGENCE;
  if (!residuals(task, solution.trial, check)) return std::nullopt;
  solution.chi_square = check.squaredNorm();
  return solution;
}

std::vector<Solution> solve(const Task& task, const Trial& known) {
  constexpr int kShapes = 160;
  constexpr std::size_t kStarts = 5;
  struct Candidate {
    double misfit;
    Trial trial;
  };
  std::vector<Candidate> candidates;
  for (int index = 0; index <= kShapes; ++index) {
    Trial trial = known;
    if (index > 0) spread(task, trial, index);  // the first start is what is known
    if (!set_size(task, trial)) continue;
    const double misfit = coarse_misfit(task, trial);
    if (std::isfinite(misfit)) candidates.push_back({misfit, trial});
  }
  const std::size_t starts = std::min(kStarts, candidates.size());
  std::partial_sort(candidates.begin(), candidates.begin() + static_cast<std::ptrdiff_t>(starts), candidates.end(),
                    [](const Candidate& a, const Candidate& b) { return a.misfit < b.misfit; });
  std::vector<Solution> found;
  for (std::size_t i = 0; i < starts; ++i) {
    const auto solution = solve_from(task, candidates[i].trial);
    if (!solution) continue;
    const auto twin = std::find_if(found.begin(), found.end(),
                                   [&](const Solution& other) { return same_place(task, other.trial, solution->trial); });
    if (twin == found.end()) {
      found.push_back(*solution);
    } else if (solution->chi_square < twin->chi_square) {
      *twin = *solution;
    }
  }
  std::sort(found.begin(), found.end(), [](const Solution& a, const Solution& b) { return a.chi_square < b.chi_square; });
  return found;
}

}  // namespace whorl::fit
