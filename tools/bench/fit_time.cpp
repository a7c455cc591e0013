// SPDX-License-Identifier: Apache-2.0
// Fits the demo specimen again and again.
#include "fit_time.h"

#include "stopwatch.h"

#include "compile/compile.h"
#include "fit/fit.h"
#include "fit/on_solid.h"
#include "fit/scene_text.h"
#include "fit/words.h"
#include "math/parallel.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <algorithm>

namespace whorl::bench {

nlohmann::ordered_json time_fit(int rounds) {
  const std::string path = std::string(WHORL_SCENE_DIR) + "/measured/morwenia_whole.toml";
  const specimen::MeasuredSpecimen measured = specimen::read_measurement_file(path).specimens.at(0);
  double fitting = 1e300, whole = 1e300;
  std::string verdict;
  for (int round = 0; round < rounds; ++round) {
    const Stopwatch watch;
    const fit::Fit fit = fit::fit_specimen(measured);
    fitting = std::min(fitting, watch.seconds());
    verdict = fit::verdict_words(fit.verdict);
    const specimen::Specimen specimen = specimen::parse_scene(fit::scene_text(fit, measured, path), "fitted shell");
    const scene::Scene scene = compile::compile_scene(specimen);
    const field::Field field(scene);
    constexpr double kTolerance = 2e-5;  // of the height, as the command has it
    fit::measured_on_solid(fit, field, {kTolerance * scene.height_mm, false});
    whole = std::min(whole, watch.seconds());
  }
  return {{"specimen", measured.identity.name.value}, {"readings", measured.readings.size()}, {"verdict", verdict},
          {"threads", thread_count()},                {"seconds_fit", fitting},               {"seconds_with_solid", whole}};
}

std::string fit_text(const nlohmann::ordered_json& timed) {
  return fmt::format("fit of one specimen with {} measurements ({}), {} threads: {:.2f} s, with the answer measured on the solid {:.2f} s\n",
                     timed.at("readings").get<int>(), timed.at("verdict").get<std::string>(), timed.at("threads").get<int>(),
                     timed.at("seconds_fit").get<double>(), timed.at("seconds_with_solid").get<double>());
}

}  // namespace whorl::bench
