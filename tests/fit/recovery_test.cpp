// SPDX-License-Identifier: Apache-2.0
// Known shells, measured by the forward model, rounded to the caliper's step and fitted back.
#include "support/catch.h"

#include "fit/fit.h"
#include "fit/predict.h"
#include "math/parallel.h"

#include <fmt/format.h>

#include <cmath>
#include <mutex>

using namespace whorl;
using fit::Parameter;
using specimen::Definition;
using specimen::GrowthStage;

namespace {

double uniform(std::uint64_t& state) {
  state = state * 6364136223846793005u + 1442695040888963407u;
  return static_cast<double>(state >> 11) * 0x1.0p-53;
}

struct Known {
  fit::Values values{};
  specimen::MeasuredSpecimen measured;
};

constexpr fit::Fixed kFixed{};

void add(Known& known, const fit::Form& form, Definition definition, double step, GrowthStage stage = {}) {
  const double value = fit::predict(form, definition, stage);
  if (!std::isfinite(value) || value < 4.0 * step) return;
  specimen::Reading reading;
  reading.definition = definition;
  reading.stage = stage;
  reading.value = step * std::round(value / step);
  reading.step = step;
  reading.standard_error = step / std::sqrt(12.0);
  known.measured.readings.push_back(reading);
}

// Over the morphospace of coiled shells: expansion, distance from the axis, spire, section, whorls and size all vary.
std::optional<Known> random_shell(std::uint64_t seed) {
  std::uint64_t state = seed * 0x9E3779B97F4A7C15u + 12345u;
  for (int i = 0; i < 4; ++i) uniform(state);
  Known known;
  fit::Values& v = known.values;
  const bool planispiral = uniform(state) < 0.25;
  fit::at(v, Parameter::kW) = std::log(1.12) + (std::log(3.0) - std::log(1.12)) * uniform(state);
  fit::at(v, Parameter::kD) = 0.45 * uniform(state);
  fit::at(v, Parameter::kT) = planispiral ? 0.0 : 0.3 + 5.0 * uniform(state);
  fit::at(v, Parameter::kS) = std::log(0.6) + std::log(1.8 / 0.6) * uniform(state);
  fit::at(v, Parameter::kWhorls) = 3.5 + 6.0 * uniform(state);
  const double step = uniform(state) < 0.5 ? 0.01 : 0.1;
  const double margin = (step == 0.01 ? 1.0 : 8.0) * std::exp(2.0 * uniform(state));  // mm: minute shells under the finer step
  fit::at(v, Parameter::kSize) = std::log(margin);
  const auto form = fit::form_of(v, kFixed);
  if (!form) return std::nullopt;
  known.measured.identity.name.value = "known";
  if (planispiral) {
    for (const double behind : {0.0, 0.5, 1.0}) {
      const GrowthStage stage{behind == 0.0 ? GrowthStage::Kind::kLip : GrowthStage::Kind::kBehindLip, behind};
      for (const Definition d : {Definition::kDiameterSumOfRadii, Definition::kWhorlWidthAlongAxis, Definition::kWhorlHeightMargin,
                                 Definition::kUmbilicusMargins, Definition::kAperturalHeightVenters})
        add(known, *form, d, step, stage);
    }
  } else {
    for (const Definition d : {Definition::kShellHeightAxial, Definition::kShellWidthAcross, Definition::kApertureHeightAxial,
                               Definition::kApertureWidthAcross, Definition::kLastWhorlHeightFlank,
                               Definition::kPenultimateWidthFlanks, Definition::kUmbilicusSeams,
                               Definition::kPenultimateHeightBetweenSutures, Definition::kApertureHeightLongest})
      add(known, *form, d, step);
    add(known, *form, Definition::kWhorlWidthFlanks, step, {GrowthStage::Kind::kBehindLip, 2.0});
    add(known, *form, Definition::kWhorlsNucleusLine, 0.25);
  }
  if (known.measured.readings.size() < 7) return std::nullopt;
  return known;
}

}  // namespace

TEST_CASE("500 random shells are recovered: parameters lie in their 95 % intervals in 95 +- 3 % of cases", "[fit]") {
  constexpr std::size_t kShells = 500;
  constexpr double kGross = 6.0;  // standard errors: no accident
  std::mutex mutex;
  std::size_t inside = 0, fitted = 0, failed = 0, not_alone = 0;
  std::vector<std::string> silent;  // wrong, and the verdict says nothing of it
  parallel_for(kShells, 1, [&](std::size_t i) {
    std::optional<Known> known;
    for (std::uint64_t seed = 1000 * i + 1; !known; ++seed) known = random_shell(seed);
    const fit::Fit fit = fit::fit_specimen(known->measured);
    const std::lock_guard lock(mutex);
    const bool fits = fit.verdict == fit::Verdict::kFits || fit.verdict == fit::Verdict::kFitsWithTrend;
    if (fit.verdict == fit::Verdict::kNotAlone) ++not_alone;
    else if (!fits) ++failed;
    for (const fit::ParameterResult& p : fit.parameters) {
      if (p.state != fit::State::kFitted && p.state != fit::State::kAtBound) continue;
      const double truth = fit::natural(p.parameter, fit::at(known->values, p.parameter));
      ++fitted;
      inside += p.low <= truth + 1e-9 && truth <= p.high + 1e-9 ? 1u : 0u;
      if (fits && std::abs(p.value - truth) > kGross * p.error)
        silent.push_back(fmt::format("shell {}: {} is {:.5g}, fitted as {:.5g} +- {:.2g}", i, fit::row_of(p.parameter).name, truth, p.value,
                                     p.error));
    }
  });
  const double coverage = static_cast<double>(inside) / static_cast<double>(fitted);
  CAPTURE(inside, fitted, failed, not_alone, silent);
  CHECK(fitted > 5 * kShells);
  CHECK(coverage >= 0.92);
  CHECK(coverage <= 0.98);
  CHECK(silent.empty());
  CHECK(failed == 0);
  CHECK(not_alone < kShells / 20);
}
