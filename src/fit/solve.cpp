// SPDX-License-Identifier: Apache-2.0
// Ceres' trust region with bounds behind a plain interface; starts by a Halton sequence with the size solved in closed form.
#include "fit/solve.h"

#include "fit/statistics.h"

#include <ceres/ceres.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

class Cost : public ceres::CostFunction {
 public:
  Cost(const Task& task, const Trial& base) : task_(task), base_(base) {
    set_num_residuals(static_cast<int>(task.residual_count()));
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

bool stage_by_diameter(const Task& task) {
  return std::any_of(task.readings.begin(), task.readings.end(), [](const specimen::Reading& reading) {
    return reading.stage.kind == specimen::GrowthStage::Kind::kAtDiameter;
  });
}

// Places the outlines by their boxes, which also gives the size where no length does, and returns their misfit, each point's
// bounded, since boxes are no more than near where parts are missing.
double placed_outlines_misfit(const Task& task, Trial& trial) {
  constexpr double kCoarse = 0.02, kMost = 9.0;  // standard error as a fraction of the shell's radius; squared errors a point
  const bool length = std::any_of(task.readings.begin(), task.readings.end(), is_length);
  std::optional<Form> form = form_of(trial.values, task.fixed);
  if (form && !length && task.free[static_cast<std::size_t>(Parameter::kSize)]) {
    at(trial.values, Parameter::kSize) += std::log(boxed_scale(*form, task.outlines.front()));
    form = form_of(trial.values, task.fixed);
  }
  if (!form) return std::numeric_limits<double>::infinity();
  double misfit = 0.0;
  std::vector<double> distances;
  for (std::size_t i = 0; i < task.outlines.size(); ++i) {
    trial.placements[i] = boxed_placement(*form, task.outlines[i], task.sinistral);
    outline_distances(*form, task.outlines[i], trial.placements[i], task.sinistral, distances);
    const double sigma = std::max(task.outlines[i].standard_error, kCoarse * std::exp(at(trial.values, Parameter::kSize)));
    for (const double distance : distances) misfit += std::min(std::pow(distance / sigma, 2), kMost);
  }
  return misfit;
}

// Sets the size that suits a shape best, in closed form since every length is in proportion to it, and returns the misfit, with
// errors no smaller than 1 % of the value so that a start counts as near by its shape. Infinite where there is no such shell.
double fitted_size_misfit(const Task& task, Trial& trial) {
  const bool size_free = task.free[static_cast<std::size_t>(Parameter::kSize)];
  double misfit = std::numeric_limits<double>::infinity();
  // Twice where stages are given by a diameter: they move with the size.
  for (int round = 0; round < (stage_by_diameter(task) ? 2 : 1); ++round) {
    Eigen::VectorXd predicted;
    if (!predictions(task, trial, predicted)) return std::numeric_limits<double>::infinity();
    const auto weight_of = [&](const specimen::Reading& reading) {
      const double floor = 0.01 * std::max(std::abs(reading.value), is_length(reading) ? 0.0 : 1.0);
      return 1.0 / std::max(task.sigma(reading), floor);
    };
    double cross = 0.0, square = 0.0;
    for (std::size_t i = 0; i < task.readings.size(); ++i) {
      if (!is_length(task.readings[i])) continue;
      const double weight = weight_of(task.readings[i]), model = predicted[static_cast<Eigen::Index>(i)];
      cross += weight * weight * model * task.readings[i].value;
      square += weight * weight * model * model;
    }
    const double factor = size_free && square > 0.0 && cross > 0.0 ? cross / square : 1.0;
    if (size_free) at(trial.values, Parameter::kSize) += std::log(factor);
    misfit = 0.0;
    for (std::size_t i = 0; i < task.readings.size(); ++i) {
      const specimen::Reading& reading = task.readings[i];
      const double model = predicted[static_cast<Eigen::Index>(i)] * (is_length(reading) ? factor : 1.0);
      misfit += std::pow((model - reading.value) * weight_of(reading), 2);
    }
  }
  return task.outlines.empty() ? misfit : misfit + placed_outlines_misfit(task, trial);
}

bool near(const Task& task, const Trial& a, const Trial& b, double plausible_widths) {
  const Bounds bounds = bounds_of(task);
  return ((packed(task, a) - packed(task, b)).array().abs() < plausible_widths * bounds.plausible.array()).all();
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
  // The nearest place of an outline jumps from whorl to whorl: the last digits of its misfit are not smooth.
  options.max_num_iterations = task.outlines.empty() ? 80 : 30;
  options.function_tolerance = task.outlines.empty() ? 1e-10 : 1e-5;
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

namespace {

// From a start that may be far off: outlines pull with all their points at first, then those far off are let go by and by.
std::optional<Solution> solve_from_afar(const Task& task, const Trial& start) {
  if (task.outlines.empty()) return solve_from(task, start);
  Task softer = task;
  std::optional<Solution> solution = Solution{start, 0.0, false};
  for (const double factor : {16.0, 4.0, 1.0}) {
    softer.robust_from = factor * task.robust_from;
    solution = solve_from(softer, solution->trial);
    if (!solution) return std::nullopt;
  }
  return solution;
}

struct Search {
  int shapes;
  std::size_t starts;
  double apart;  // starts differ by so much in some number, in plausible widths: else they end in one minimum
};

std::vector<Solution> search(const Task& task, const Trial& known, const Search& how) {
  struct Candidate {
    double misfit;
    Trial trial;
  };
  std::vector<Candidate> candidates;
  for (int index = 0; index <= how.shapes; ++index) {
    Trial trial = known;
    if (index > 0) spread(task, trial, index);  // the first start is what is known
    const double misfit = fitted_size_misfit(task, trial);
    if (std::isfinite(misfit)) candidates.push_back({misfit, trial});
  }
  std::sort(candidates.begin(), candidates.end(), [](const Candidate& a, const Candidate& b) { return a.misfit < b.misfit; });
  std::vector<Trial> starts;
  for (const Candidate& candidate : candidates) {
    if (starts.size() == how.starts) break;
    const bool new_place = std::none_of(starts.begin(), starts.end(), [&](const Trial& other) {
      return near(task, candidate.trial, other, how.apart);
    });
    if (new_place) starts.push_back(candidate.trial);
  }
  constexpr double kSame = 0.02;
  std::vector<Solution> found;
  for (const Trial& start : starts) {
    const auto solution = solve_from_afar(task, start);
    if (!solution) continue;
    const auto twin = std::find_if(found.begin(), found.end(), [&](const Solution& other) {
      return near(task, other.trial, solution->trial, kSame);
    });
    if (twin == found.end()) {
      found.push_back(*solution);
    } else if (solution->chi_square < twin->chi_square) {
      *twin = *solution;
    }
  }
  std::sort(found.begin(), found.end(), [](const Solution& a, const Solution& b) { return a.chi_square < b.chi_square; });
  return found;
}

}  // namespace

std::vector<Solution> solve(const Task& task, const Trial& known) {
  constexpr Search kFirst{200, 6, 0.35}, kThorough{1500, 24, 0.2}, kOfOutlines{200, 4, 0.5};
  if (!task.outlines.empty()) return search(task, known, kOfOutlines);  // many points: few wrong minima, and each start takes longer
  constexpr double kPoor = 3.0;  // normal deviate of the misfit: a minimum that may not be the lowest
  std::vector<Solution> found = search(task, known, kFirst);
  const int freedom = static_cast<int>(task.residual_count()) - static_cast<int>(task.free_count());
  const bool good = !found.empty() && deviate_of(found.front().chi_square, std::max(freedom, 1)) < kPoor;
  return good ? found : search(task, known, kThorough);
}

}  // namespace whorl::fit
