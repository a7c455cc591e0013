// SPDX-License-Identifier: Apache-2.0
// Settling on what is free, and on one growth model.
#include "fit/models.h"

#include <algorithm>
#include <cmath>
#include <limits>

namespace whorl::fit {
namespace {

using specimen::Reading;

double minus_two_ln_likelihood(const Task& task, double chi_square) {
  double sum = chi_square;
  for (const Reading& reading : task.readings) sum += 2.0 * std::log(task.sigma(reading));
  return sum;
}

// Holds a parameter that the readings do not fix at what is usual, or, where the readings do not go with that, where it came
// to stand: they may leave it open over a range only.
void give_up(Setting& setting, Parameter parameter, const Solution& before) {
  constexpr double kWorse = 4.0;  // by which the usual value may raise the squared misfit
  Setting usual = setting;
  assume(usual, parameter);
  const auto solution = solve_from(usual.task, usual.trial);
  const bool agrees = solution && solution->chi_square < before.chi_square + kWorse;
  if (!agrees) at(usual.trial.values, parameter) = at(before.trial.values, parameter);
  if (!agrees) usual.why[static_cast<std::size_t>(parameter)] = "assumed: the readings leave it open about here";
  setting = std::move(usual);
}

struct Variant {
  const char* name;
  std::vector<Parameter> extra;
};

}  // namespace

double corrected_aic(double minus_two_ln_likelihood, std::size_t parameters, std::size_t readings) {
  const auto k = static_cast<double>(parameters), n = static_cast<double>(readings);
  if (n - k - 1.0 < 1.0) return std::numeric_limits<double>::infinity();
  return minus_two_ln_likelihood + 2.0 * k + 2.0 * k * (k + 1.0) / (n - k - 1.0);
}

std::optional<Settled> settle(Setting setting) {
  for (;;) {
    std::vector<Solution> solutions = solve(setting.task, setting.trial);
    if (solutions.empty()) return std::nullopt;
    const Solution best = solutions.front();
    setting.trial = best.trial;
    Knowledge knowledge;
    if (!knowledge_at(setting.task, best.trial, knowledge)) return std::nullopt;
    solutions.erase(solutions.begin());
    const std::optional<Parameter> weak = knowledge.weakest > kWeak ? to_give_up(knowledge) : std::nullopt;
    if (!weak) return Settled{std::move(setting), best, std::move(knowledge), std::move(solutions)};
    give_up(setting, *weak, best);
  }
}

Settled choose_model(Settled simplest, std::vector<ModelResult>& models) {
  using enum Parameter;
  std::vector<Variant> variants{{"a trend of W along the shell", {kTrend}},
                                {"an expansion of its own for the distance from the axis", {kDistanceRate}},
                                {"a trend of W, and an expansion of its own for the distance", {kTrend, kDistanceRate}}};
  if (simplest.setting.task.free[static_cast<std::size_t>(kT)]) {
    variants.push_back({"an expansion of its own for the depth", {kDepthRate}});
    variants.push_back({"expansions of their own for distance and depth", {kDistanceRate, kDepthRate}});
  }
  const std::size_t count = simplest.setting.task.residual_count();
  const auto entry = [&](const char* name, const Settled& settled) {
    const std::size_t k = settled.setting.task.free_count();
    const double aicc = corrected_aic(minus_two_ln_likelihood(settled.setting.task, settled.solution.chi_square), k, count);
    models.push_back({name, k, settled.solution.chi_square, aicc, false});
    return aicc;
  };
  double least = entry("one W for all", simplest);
  Settled best = simplest;
  std::size_t chosen = 0;
  for (const Variant& variant : variants) {
    const std::size_t k = simplest.setting.task.free_count() + variant.extra.size();
    // The best that the model could reach: no misfit at all.
    const double reachable = corrected_aic(minus_two_ln_likelihood(simplest.setting.task, 0.0), k, count);
    if (!std::isfinite(reachable) || reachable >= least) continue;
    Settled tried = simplest;
    for (const Parameter p : variant.extra) {
      tried.setting.task.free[static_cast<std::size_t>(p)] = true;
      tried.setting.state[static_cast<std::size_t>(p)] = State::kFitted;
    }
    std::optional<Solution> solution;
    for (const double sign : {1.0, -1.0}) {
      Trial start = simplest.solution.trial;
      for (const Parameter p : variant.extra) at(start.values, p) = sign * 0.05 * row_of(p).plausible;
      auto found = solve_from(tried.setting.task, start);
      if (found && (!solution || found->chi_square < solution->chi_square)) solution = found;
    }
    if (!solution || !knowledge_at(tried.setting.task, solution->trial, tried.knowledge)) continue;
    if (tried.knowledge.weakest > kWeak) continue;
    tried.solution = *solution;
    tried.setting.trial = solution->trial;
    const double aicc = entry(variant.name, tried);
    if (aicc < least) {
      least = aicc;
      best = tried;
      chosen = models.size() - 1;
    }
  }
  models[chosen].chosen = true;
  return best;
}

}  // namespace whorl::fit
