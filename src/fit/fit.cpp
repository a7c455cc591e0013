// SPDX-License-Identifier: Apache-2.0
// The whole of a fit: settle, choose a model, say how well everything is known, judge.
#include "fit/fit.h"

#include "fit/indices.h"
#include "fit/models.h"
#include "fit/predict.h"
#include "fit/series_summary.h"
#include "fit/statistics.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::MeasuredSpecimen;

constexpr double kMostSigmas = 3.0;      // within which a reading fits whatever the tolerance
constexpr double kMostScatter = 0.12;    // irregularity beyond which a series is no longer one of a law
constexpr double kUnlikely = 1.645;      // normal deviate of the misfit beyond which errors are inflated: 5 %
constexpr double kVeryUnlikely = 3.09;   // beyond which it is said aloud: 0.1 %

// An assumed whorl count follows the expansion that was found.
void refine_whorls(Settled& settled) {
  if (settled.setting.state[static_cast<std::size_t>(Parameter::kWhorls)] != State::kAssumed) return;
  Trial moved = settled.solution.trial;
  settled.setting.trial = moved;
  at(moved.values, Parameter::kWhorls) = closing_whorls(settled.setting);
  const auto solution = solve_from(settled.setting.task, moved);
  Knowledge knowledge;
  if (!solution || !knowledge_at(settled.setting.task, solution->trial, knowledge)) return;
  settled.solution = *solution;
  settled.knowledge = knowledge;
}

// What an assumption hides shows in the errors of what depends on it: each assumed parameter is moved to either side of where it
// stands, the free ones follow, and how far they go where the readings do not object counts as an error of their own. By solving
// again rather than by derivatives, since a measure may depend on the parameter on one side only.
std::vector<std::vector<Trial>> alternatives_of(const Settled& settled) {
  constexpr double kNoObjection = 4.0;  // in squared standard errors
  constexpr double kShifts[] = {0.5, 0.2, 0.08, 0.03, 0.01};  // of the plausible width; the farthest that is not objected to
  std::vector<std::vector<Trial>> alternatives;
  for (std::size_t i = 0; i < kParameterCount; ++i) {
    if (settled.setting.state[i] != State::kAssumed) continue;
    const ParameterRow& row = row_of(static_cast<Parameter>(i));
    alternatives.emplace_back();
    for (const double side : {-1.0, 1.0})
      for (const double shift : kShifts) {
        Trial moved = settled.solution.trial;
        moved.values[i] = std::clamp(moved.values[i] + side * shift * row.plausible, row.low, row.high);
        const auto solution = solve_from(settled.setting.task, moved);
        if (!solution || solution->chi_square > settled.solution.chi_square + kNoObjection) continue;
        alternatives.back().push_back(solution->trial);
        break;
      }
  }
  return alternatives;
}

void fill_parameters(const Setting& setting, double quantile, Fit& fit) {
  const Bounds bounds = bounds_of(fit.task);
  const Eigen::VectorXd x = packed(fit.task, fit.trial);
  for (std::size_t i = 0; i < kParameterCount; ++i) {
    const auto parameter = static_cast<Parameter>(i);
    ParameterResult result;
    result.parameter = parameter;
    result.value = natural(parameter, fit.trial.values[i]);
    const auto place = std::find(fit.knowledge.indices.begin(), fit.knowledge.indices.end(), i);
    if (place != fit.knowledge.indices.end()) {
      const auto k = static_cast<Eigen::Index>(place - fit.knowledge.indices.begin());
      double variance = fit.inflation * fit.inflation * fit.knowledge.covariance(k, k);
      for (const std::vector<Trial>& sides : fit.alternatives) {
        double farthest = 0.0;
        for (const Trial& side : sides) farthest = std::max(farthest, std::abs(packed(fit.task, side)[k] - x[k]));
        variance += farthest * farthest;
      }
      const double error = std::sqrt(variance);
      result.error = error * natural_slope(parameter, x[k]);
      result.low = natural(parameter, std::max(x[k] - quantile * error, bounds.low[k]));
      result.high = natural(parameter, std::min(x[k] + quantile * error, bounds.high[k]));
      const double edge = 1e-6 * bounds.plausible[k];
      if (x[k] <= bounds.low[k] + edge || x[k] >= bounds.high[k] - edge) {
        result.state = State::kAtBound;
        result.why = "as far as it may go";
      }
    } else if (setting.state[i] == State::kFitted) {
      continue;  // a parameter of a model that was not chosen
    } else {
      result.state = setting.state[i];
      result.why = setting.why[i];
      if (result.state == State::kAssumed) result.fixed_by = would_fix(fit.task, fit.trial, parameter);
    }
    fit.parameters.push_back(std::move(result));
  }
}

void fill_readings(double tolerance, Fit& fit) {
  Eigen::VectorXd predicted;
  predictions(fit.task, fit.trial, predicted);
  for (std::size_t i = 0; i < fit.task.readings.size(); ++i) {
    const specimen::Reading& reading = fit.task.readings[i];
    ReadingResult result;
    result.predicted = predicted[static_cast<Eigen::Index>(i)];
    result.residual = result.predicted - reading.value;
    result.sigma = fit.task.sigma(reading);
    result.fits = std::abs(result.residual) <= std::max(kMostSigmas * result.sigma, tolerance * std::abs(reading.value));
    fit.readings.push_back(result);
  }
}

// An outline fits if most of its points lie on the form's; what is broken or slipped may lie off.
void fill_outlines(Fit& fit) {
  constexpr double kMost = 0.6, kOfRadius = 0.02;
  const Form form = *form_of(fit.trial.values, fit.task.fixed);
  for (std::size_t i = 0; i < fit.task.outlines.size(); ++i) {
    std::vector<double> distances;
    outline_distances(form, fit.task.outlines[i], fit.trial.placements[i], fit.task.sinistral, distances);
    const double near = std::max(kMostSigmas * fit.task.outlines[i].standard_error, kOfRadius * std::exp(at(fit.trial.values, Parameter::kSize)));
    for (double& distance : distances) distance = std::abs(distance);
    OutlineResult result;
    result.points = distances.size();
    result.on_outline = static_cast<std::size_t>(std::count_if(distances.begin(), distances.end(), [&](double d) { return d <= near; }));
    std::nth_element(distances.begin(), distances.begin() + static_cast<std::ptrdiff_t>(distances.size() / 2), distances.end());
    result.median_distance = distances[distances.size() / 2];
    result.tilt_deg = degrees(fit.trial.placements[i].tilt);
    result.fits = static_cast<double>(result.on_outline) >= kMost * static_cast<double>(result.points);
    fit.outlines.push_back(result);
  }
}

void remark_on_correlations(Fit& fit) {
  constexpr double kAlike = 0.98;
  const Eigen::MatrixXd& c = fit.knowledge.covariance;
  for (Eigen::Index i = 0; i < c.rows(); ++i)
    for (Eigen::Index j = i + 1; j < c.rows(); ++j) {
      const double r = c(i, j) / std::sqrt(c(i, i) * c(j, j));
      const std::size_t a = fit.knowledge.indices[static_cast<std::size_t>(i)], b = fit.knowledge.indices[static_cast<std::size_t>(j)];
      if (std::abs(r) < kAlike || a >= kParameterCount || b >= kParameterCount) continue;
      const auto parameter = static_cast<Parameter>(b);
      const std::vector<std::string> better = would_fix(fit.task, fit.trial, parameter);
      fit.remarks.push_back(fmt::format("{} and {} are known together better than apart (correlation {:.2f}){}",
                                        row_of(static_cast<Parameter>(a)).name, row_of(parameter).name, r,
                                        better.empty() ? "." : fmt::format("; {} would part them.", better.front())));
    }
}

// An ammonoid's five measures say more than an isometric conch can follow: where they disagree, it is said.
void remark_on_isometry(Fit& fit) {
  for (const IndexResult& index : fit.indices) {
    if (index.name != kIsometricUmbilicus || !index.from_readings) continue;
    for (const specimen::Reading& reading : fit.task.readings) {
      if (reading.definition != specimen::Definition::kUmbilicusMargins && reading.definition != specimen::Definition::kUmbilicusSeams) continue;
      if (std::abs(reading.value - index.read) <= kMostSigmas * std::hypot(index.read_error, reading.standard_error)) continue;
      fit.remarks.push_back(fmt::format("The umbilicus was read as {:.3g} mm; in a conch that grows isometrically diameter, whorl height and "
                                        "apertural height would make it {:.3g} mm: the readings disagree with each other.",
                                        reading.value, index.read));
      return;
    }
  }
}

// Whether the expansion is known in spite of what had to be assumed.
bool expansion_is_known(const Fit& fit) {
  for (const ParameterResult& p : fit.parameters)
    if (p.parameter == Parameter::kW) return p.error / p.value <= kWeak * row_of(Parameter::kW).plausible;
  return true;
}

std::string shape_words(const Trial& trial) {
  return fmt::format("W {:.3f}, D {:.3f}, T {:.2f}, S {:.2f}", std::exp(at(trial.values, Parameter::kW)), at(trial.values, Parameter::kD),
                     at(trial.values, Parameter::kT), std::exp(at(trial.values, Parameter::kS)));
}

void judge(const Settled& settled, Fit& fit) {
  const double deviate = deviate_of(fit.chi_square, fit.degrees_of_freedom);
  const bool all_fit = std::all_of(fit.readings.begin(), fit.readings.end(), [](const ReadingResult& r) { return r.fits; });
  const bool outlines_fit = std::all_of(fit.outlines.begin(), fit.outlines.end(), [](const OutlineResult& o) { return o.fits; });
  const bool regular = std::all_of(fit.task.scatter.begin(), fit.task.scatter.end(), [](double s) { return s <= kMostScatter; });
  const bool trend = fit.task.free[static_cast<std::size_t>(Parameter::kTrend)];
  fit.verdict = !all_fit || !regular || !outlines_fit ? Verdict::kDoesNotFit : trend ? Verdict::kFitsWithTrend : Verdict::kFits;
  if (!regular)
    fit.remarks.push_back(fmt::format("A series scatters about the law by more than {:.0f} %: the shell does not follow it.", 100.0 * kMostScatter));
  if (fit.degrees_of_freedom == 0)
    fit.remarks.push_back("There are as many free parameters as readings: every set of readings would fit, so that nothing is tested. "
                          "Add a measurement.");
  if (all_fit && deviate > kVeryUnlikely)
    fit.remarks.push_back(fmt::format("The misfit exceeds the errors of the readings, within the tolerance: all standard errors are raised by "
                                      "{:.1f}.",
                                      fit.inflation));
  if (trend)
    fit.remarks.push_back(fmt::format("The shell is not self-similar: W runs from {:.3f} at the end of the embryonic shell to {:.3f} at the lip.",
                                      std::exp(ln_W_at_start(fit.trial.values, fit.task.fixed)), std::exp(at(fit.trial.values, Parameter::kW))));
  constexpr double kAsGood = 6.0;  // in squared standard errors: within twenty times the likelihood
  for (const Solution& other : settled.others)
    if (other.chi_square < fit.chi_square + kAsGood) {
      if (fit.verdict == Verdict::kFits || fit.verdict == Verdict::kFitsWithTrend) fit.verdict = Verdict::kNotAlone;
      fit.remarks.push_back(fmt::format("Another shell measures nearly the same: {}. A further measurement would tell them apart.",
                                        shape_words(other.trial)));
    }
}

}  // namespace

Fit fit_specimen(const MeasuredSpecimen& measured) {
  Setting setting = first_setting(measured);
  Fit fit;
  fit.task = setting.task;
  fit.trial = setting.trial;
  for (const specimen::Series& series : measured.series) {
    fit.series.push_back(summary_of(series));
    fit.series.back().index = fit.series.size() - 1;
  }
  if (fit.task.readings.size() < 2 && fit.task.outlines.empty()) {
    fit.remarks.push_back("One measurement alone fixes nothing but the size. For the expansion add the width of another whorl, or "
                          "shell_height axial, shell_width across_axis, aperture_height axial and last_whorl_height flank.");
    return fit;
  }
  std::optional<Settled> settled = settle(setting);
  if (!settled) {
    fit.verdict = Verdict::kDoesNotFit;
    fit.remarks.push_back("No coiled shell has all of these measures, whatever its parameters: is every definition the right one?");
    return fit;
  }
  Settled best = choose_model(*settled, fit.models);
  refine_whorls(best);
  fit.task = best.setting.task;
  fit.trial = best.solution.trial;
  fit.knowledge = best.knowledge;
  fit.alternatives = alternatives_of(best);
  fit.chi_square = best.solution.chi_square;
  fit.degrees_of_freedom = static_cast<int>(fit.task.residual_count()) - static_cast<int>(fit.task.free_count());
  fit.remarks = best.setting.remarks;
  for (std::size_t i = 0; i < fit.series.size(); ++i) fit.series[i].scatter = fit.task.scatter[i];
  if (deviate_of(fit.chi_square, fit.degrees_of_freedom) > kUnlikely && fit.degrees_of_freedom > 0)
    fit.inflation = std::max(1.0, std::sqrt(fit.chi_square / fit.degrees_of_freedom));
  const bool estimated = std::any_of(measured.series.begin(), measured.series.end(), [](const auto& series) { return !series.scatter; });
  const bool errors_estimated = fit.inflation > 1.0 || estimated;
  fill_parameters(best.setting, errors_estimated ? student95(fit.degrees_of_freedom) : kNormal95, fit);
  fill_readings(measured.tolerance, fit);
  fill_outlines(fit);
  const bool no_size = best.setting.state[static_cast<std::size_t>(Parameter::kSize)] == State::kAssumed;
  if (no_size) {
    fit.verdict = Verdict::kNotFixed;
    fit.remarks.push_back("No length was measured: the form may be known but not its size. Add any length, such as shell_height axial.");
    return fit;
  }
  if (best.knowledge.weakest > kWeak || !expansion_is_known(fit)) {
    fit.verdict = Verdict::kNotFixed;
    const auto better = would_fix(fit.task, fit.trial, Parameter::kW);
    fit.remarks.push_back(fmt::format("The readings do not fix the whorl expansion W{}.",
                                      better.empty() ? "; add a width at an earlier whorl" : fmt::format("; add {}", fmt::join(better, ", or "))));
    return fit;
  }
  remark_on_correlations(fit);
  judge(best, fit);
  fit.indices = indices_of(fit);
  remark_on_isometry(fit);
  return fit;
}

}  // namespace whorl::fit
