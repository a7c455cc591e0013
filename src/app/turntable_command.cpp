// SPDX-License-Identifier: Apache-2.0
// The command 'turntable': a scene file in, the frames of one turn out.
#include "app/commands.h"
#include "app/out_folder.h"
#include "app/picture_progress.h"
#include "app/shell_notes.h"
#include "app/version.h"

#include "diagnostics/error.h"
#include "math/parallel.h"
#include "plate/figure.h"
#include "plate/studio.h"
#include "sequence/frame_files.h"
#include "sequence/turntable.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <cstdio>

namespace whorl::app {

int turntable_command(const Options& options, Progress& progress) {
  sequence::TurntableJob job;
  job.specimen = specimen::read_scene_file(options.scene);
  job.run.quality = options.quality.value_or(job.specimen.plate.quality.value);
  job.specimen = plate::at_quality(job.specimen, job.run.quality);
  job.folder = options.out;
  job.stem = plate::figure_stem(options.scene);
  job.frames = options.frames;
  job.part = options.slice.part;
  job.of = options.slice.of;
  job.run.version = program_version();
  job.run.build = program_build();
  job.run.seed = options.seed;
  job.run.threads = thread_count();
  job.run.exact = options.exact;

  progress.step("compiling the shell");
  sequence::Turntable turntable(job);
  make_out_folder(options.out);  // only now: a faulty scene leaves no trace
  note_on_shell(turntable.scene(), progress);
  if (turntable.kept() > 0) progress.note(fmt::format("{} frames are whole already and are kept", turntable.kept()));
  const std::size_t count = turntable.missing().size();
  if (count > 0)
    progress.step(fmt::format("rendering {} frame{}, {} x {} pixels", count, count == 1 ? "" : "s", turntable.plan().width,
                              turntable.plan().height));
  for (const auto& picture : turntable.render(PictureProgress(progress, 0.0, 1.0))) std::printf("%s\n", picture.string().c_str());
  std::printf("%s\n", turntable.write_record().string().c_str());
  const auto beyond = sequence::frames_beyond(job.folder, job.stem, job.frames);
  if (!beyond.empty())
    progress.note(fmt::format("note: {} and {} more of a turn with more frames are in the folder; remove them before you make a "
                              "film of it",
                              beyond.front().string(), beyond.size() - 1));
  return static_cast<int>(diagnostics::ExitCode::kDone);
}

}  // namespace whorl::app
