// SPDX-License-Identifier: Apache-2.0
// The command 'plate': a scene file in, a finished figure out.
#include "app/commands.h"
#include "app/out_folder.h"
#include "app/picture_progress.h"
#include "app/shell_notes.h"
#include "app/solid_counters.h"
#include "app/version.h"

#include "diagnostics/error.h"
#include "math/parallel.h"
#include "measure/provenance_shares.h"
#include "measure/report.h"
#include "plate/figure.h"
#include "plate/studio.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <chrono>
#include <cstdio>
#include <filesystem>
#include <memory>

namespace whorl::app {
namespace {

using plate::FigurePanel;
using plate::FigurePlan;

std::string lower(std::string text) {
  for (char& c : text) c = static_cast<char>(std::tolower(static_cast<unsigned char>(c)));
  return text;
}

// Random lines for volumes and areas: what is printed is measured as `measure` does, a draft more coarsely.
int measure_lines(specimen::Quality quality) { return quality == specimen::Quality::kPrint ? 1 << 19 : 1 << 16; }

// Keeps the one panel that is named by letter, number or view.
void keep_only(specimen::Specimen& specimen, const std::vector<plate::View>& views, const std::string& wanted) {
  std::vector<specimen::Panel> kept;
  std::string known;
  for (std::size_t i = 0; i < views.size(); ++i) {
    const std::string letter = plate::panel_letter(static_cast<int>(i), specimen::Letters::kUpper);
    if (lower(wanted) == lower(letter) || wanted == std::to_string(i + 1) || lower(wanted) == views[i].label)
      kept.push_back(specimen.plate.panels[i]);
    known += fmt::format("{}{} ({})", i ? ", " : "", letter, views[i].label);
  }
  if (kept.empty())
    throw diagnostics::UsageError(fmt::format("--only '{}': the plate has no such panel; it has {}", wanted, known));
  kept.resize(1);
  specimen.plate.panels = kept;
}

}  // namespace

int plate_command(const Options& options, Progress& progress) {
  specimen::Specimen specimen = specimen::read_scene_file(options.scene);
  specimen = plate::at_quality(specimen, options.quality.value_or(specimen.plate.quality.value));

  const bool sheet = specimen.contact_sheet.wanted();
  if (sheet && options.only_panel) throw diagnostics::UsageError("--only: a contact sheet is drawn as a whole");
  progress.step(sheet ? "compiling the shells" : "compiling the shell");
  std::vector<std::unique_ptr<plate::Studio>> studios;  // one for each panel of a contact sheet, else one for all
  for (const specimen::Specimen& shell : sheet ? plate::sheet_shells(specimen) : std::vector{specimen})
    studios.push_back(std::make_unique<plate::Studio>(shell));
  if (sheet) specimen = plate::sheet_plate(specimen);
  make_out_folder(options.out);  // only now: a faulty scene leaves no trace
  if (options.only_panel) {
    keep_only(specimen, plate::views_of(specimen), *options.only_panel);
  }
  const std::vector<plate::View> views = plate::views_of(specimen);
  std::vector<plate::Extents> extents;
  for (std::size_t i = 0; i < views.size(); ++i)
    extents.push_back(plate::extents_in(views[i], studios[sheet ? i : 0]->surface_points()));
  const FigurePlan plan = plate::plan_figure(specimen, views, extents);
  double finest = 1e300;
  for (const FigurePanel& panel : plan.panels) finest = std::min(finest, panel.mm_per_pixel);
  if (!sheet) {
    studios[0]->set_up(finest, options.exact);
    note_on_shell(studios[0]->scene(), progress);
  }

  const plate::QualitySteps steps = plate::quality_steps(specimen.plate.quality.value);
  double area = 0.0, before = 0.0;
  for (const FigurePanel& panel : plan.panels) area += static_cast<double>(panel.rect.width) * panel.rect.height;
  progress.step(fmt::format("rendering {} panel{}, {} x {} pixels", plan.panels.size(),
                            plan.panels.size() == 1 ? "" : "s", plan.width, plan.height));
  const auto start = std::chrono::steady_clock::now();
  std::vector<transport::Film> films;
  plate::RunFacts facts;
  for (std::size_t i = 0; i < plan.panels.size(); ++i) {
    const FigurePanel& panel = plan.panels[i];
    const double share = static_cast<double>(panel.rect.width) * panel.rect.height / area;
    plate::Studio& studio = *studios[sheet ? i : 0];
    if (sheet) studio.set_up(finest, options.exact);
    films.push_back(studio.picture(panel.view, panel.look, panel.shows, panel.camera(studio.front_mm()), steps, options.seed,
                                   static_cast<std::uint32_t>(i), PictureProgress(progress, before, share)));
    before += share;
    if (!sheet) continue;
    facts.seconds_compile += studio.compile_seconds();
    studios[i].reset();  // its cells are large
  }

  facts.version = program_version();
  facts.build = program_build();
  facts.seed = options.seed;
  facts.threads = thread_count();
  facts.seconds_render = std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
  facts.exact = options.exact;
  facts.quality = specimen.plate.quality.value;
  if (!sheet) {
    facts.seconds_compile = studios[0]->compile_seconds();
    facts.counters = solid_counters(studios[0]->solid(), studios[0]->attached());
    progress.step("measuring the shell");
    facts.measurements = measure::to_json(measure::measure_shell(
        studios[0]->solid(), specimen.identity.mineral, {measure_lines(specimen.plate.quality.value), options.seed}));
    if (const specimen::Preservation preservation(specimen); preservation.stated())
      facts.provenance = measure::provenance_shares(studios[0]->solid(), preservation, {1 << 16, options.seed});
  }
  progress.step("writing the files");
  const auto paths = plate::write_figure(plan, specimen, films, facts, options.out, plate::figure_stem(options.scene));
  for (const std::filesystem::path& path : paths) std::printf("%s\n", path.string().c_str());
  return static_cast<int>(diagnostics::ExitCode::kDone);
}

}  // namespace whorl::app
