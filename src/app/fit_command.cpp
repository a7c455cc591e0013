// SPDX-License-Identifier: Apache-2.0
// The command 'fit': from a measurement file to scene files and a report.
#include "app/commands.h"
#include "app/out_folder.h"

#include "compile/compile.h"
#include "diagnostics/error.h"
#include "diagnostics/whole_file.h"
#include "fit/mould.h"
#include "fit/on_solid.h"
#include "fit/scene_text.h"
#include "fit/words.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <cstdio>
#include <filesystem>
#include <set>

namespace whorl::app {
namespace {

using specimen::MeasuredSpecimen;

struct Done {
  fit::Fit fit;
  fit::OnSolid on_solid;
  std::string scene;  // its text, empty where there is none
};

// Fits, writes the scene's text and measures the shell back on its solid. A shell that cannot be built does not fit.
Done fit_one(const MeasuredSpecimen& measured, const Options& options, Progress& progress) {
  progress.step("fitting");
  Done done{fit::fit_specimen(measured), {}, {}};
  if (done.fit.verdict == fit::Verdict::kNotFixed || done.fit.parameters.empty()) return done;
  if (done.fit.task.fixed.mould && !fit::shell_round(done.fit.trial.values, done.fit.task.fixed)) {
    done.fit.verdict = fit::Verdict::kDoesNotFit;
    done.fit.remarks.push_back("No shell has a wall of that thickness round this mould: state a thinner one in [wall].");
    return done;
  }
  std::string text = fit::scene_text(done.fit, measured, options.scene);
  try {
    const specimen::Specimen specimen = specimen::parse_scene(text, "fitted shell");
    const scene::Scene scene = compile::compile_scene(specimen);
    const field::Field field(scene);
    progress.step("measuring the solid");
    constexpr double kTolerance = 2e-5;  // of the height: a fiftieth of what is asked of the agreement
    done.on_solid = fit::measured_on_solid(done.fit, field, {kTolerance * scene.height_mm, options.exact});
    fit::compare_with_solid(done.fit, done.on_solid);
    if (fit::is_success(done.fit.verdict)) done.scene = std::move(text);
  } catch (const diagnostics::InvalidInput& faults) {
    done.fit.verdict = fit::Verdict::kDoesNotFit;
    for (const diagnostics::Problem& problem : faults.problems())
      done.fit.remarks.push_back("The fitted shell cannot be built: " + problem.message);
  }
  return done;
}

std::string report_of(const Done& done, const MeasuredSpecimen& measured) {
  return fit::to_json(done.fit, measured, done.on_solid).dump(2) + "\n";
}

void write_scene(const std::filesystem::path& scene_path, const Done& done, const MeasuredSpecimen& measured) {
  if (scene_path.has_parent_path()) make_out_folder(scene_path.parent_path());
  std::filesystem::path report_path = scene_path;
  report_path.replace_extension(".fit.json");
  diagnostics::write_whole_file(report_path, report_of(done, measured));
  diagnostics::write_whole_file(scene_path, done.scene);
}

// A specimen's name as that of a file: letters, digits, points, hyphens; anything else an underscore. Each once.
std::filesystem::path file_of(const std::string& name, std::set<std::string>& taken) {
  std::string stem;
  for (const char c : name.substr(0, 80)) {
    const bool plain = (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || (c >= '0' && c <= '9') || c == '-' || c == '.';
    stem += plain ? c : '_';
  }
  if (stem.empty() || stem.front() == '.') stem = "_" + stem;
  std::string unique = stem;
  for (int i = 2; !taken.insert(unique).second; ++i) unique = fmt::format("{}_{}", stem, i);
  return unique + ".toml";
}

int fit_many(const specimen::MeasurementFile& file, const Options& options, Progress& progress) {
  if (options.json)
    throw diagnostics::UsageError("--json is for one specimen; of a table of many, each scene's report lies beside it in the folder of -o");
  const std::filesystem::path folder = options.fitted_scene;
  if (!folder.empty()) make_out_folder(folder);
  std::vector<std::string> failures;
  std::set<std::string> taken;
  std::fputs(fit::csv_header().c_str(), stdout);
  for (const MeasuredSpecimen& measured : file.specimens) {
    const Done done = fit_one(measured, options, progress);
    std::fputs(fit::csv_row(done.fit, measured).c_str(), stdout);
    if (done.scene.empty())
      failures.push_back(fmt::format("{}: {}", measured.identity.name.value, fit::verdict_words(done.fit.verdict)));
    else if (!folder.empty())
      write_scene(folder / file_of(measured.identity.name.value, taken), done, measured);
  }
  if (failures.empty()) return static_cast<int>(diagnostics::ExitCode::kDone);
  std::string message = fmt::format("{} of {} specimens were not fitted:", failures.size(), file.specimens.size());
  for (const std::string& failure : failures) message += "\n  " + failure;
  throw diagnostics::Error(diagnostics::ExitCode::kFitFailed, message);
}

}  // namespace

int fit_command(const Options& options, Progress& progress) {
  const specimen::MeasurementFile file = specimen::read_measurement_file(options.scene);
  if (file.specimens.size() > 1) return fit_many(file, options, progress);
  const MeasuredSpecimen& measured = file.specimens.front();
  const Done done = fit_one(measured, options, progress);
  std::fputs(options.json ? report_of(done, measured).c_str() : fit::to_table(done.fit, measured, done.on_solid).c_str(), stdout);
  if (done.scene.empty()) {
    throw diagnostics::Error(diagnostics::ExitCode::kFitFailed,
                             fmt::format("{}: {}; no scene was written", measured.identity.name.value, fit::verdict_words(done.fit.verdict)));
  }
  if (!options.fitted_scene.empty()) write_scene(options.fitted_scene, done, measured);
  return static_cast<int>(diagnostics::ExitCode::kDone);
}

}  // namespace whorl::app
