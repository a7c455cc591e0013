// SPDX-License-Identifier: Apache-2.0
// The command 'measure': what the shell of a scene measures, on its solid.
#include "app/commands.h"

#include "compile/compile.h"
#include "diagnostics/error.h"
#include "measure/report.h"
#include "specimen/scene_file.h"

#include <cstdio>

namespace whorl::app {

int measure_command(const Options& options, Progress& progress) {
  const specimen::Specimen specimen = specimen::read_scene_file(options.scene);
  progress.step("compiling the shell");
  const scene::Scene scene = compile::compile_scene(specimen);
  const field::Field field(scene);
  const trace::EmbreeSolid solid(field, {scene::measuring_tolerance_mm(scene), options.exact});
  progress.step("measuring");
  const measure::Measurements m =
      measure::measure_shell(solid, specimen.identity.mineral, {1 << 19, options.seed});
  if (options.json)
    std::printf("%s\n", measure::to_json(m).dump(2).c_str());
  else
    std::fputs(measure::to_table(m).c_str(), stdout);
  return static_cast<int>(diagnostics::ExitCode::kDone);
}

}  // namespace whorl::app
