// SPDX-License-Identifier: Apache-2.0
// Renders what is missing of a turn.
#include "sequence/turntable.h"

#include "diagnostics/whole_file.h"
#include "sequence/frame_files.h"
#include "sequence/turn_record.h"

#include <chrono>
#include <fstream>
#include <iterator>
#include <utility>

namespace whorl::sequence {
namespace {

/// One frame's progress as a part of all of it.
class FrameProgress final : public transport::Progress {
 public:
  FrameProgress(const transport::Progress& all, std::size_t before, std::size_t of)
      : all_(all), before_(static_cast<double>(before)), of_(static_cast<double>(of)) {}
  void done(double fraction) const noexcept override { all_.done((before_ + fraction) / of_); }

 private:
  const transport::Progress& all_;
  double before_, of_;
};

bool holds(const std::filesystem::path& path, const std::string& text) {
  std::ifstream stream(path, std::ios::binary);
  return stream && std::string(std::istreambuf_iterator<char>(stream), {}) == text;
}

}  // namespace

Turntable::Turntable(TurntableJob job)
    : job_(std::move(job)),
      studio_(job_.specimen),
      plan_(plan_turn(job_.specimen, studio_.surface_points(), job_.frames)),
      key_(frame_key(job_.specimen, job_.run, job_.frames)) {
  for (const int frame : frames_of_slice(job_.frames, job_.part, job_.of)) {
    if (frame_is_whole(frame_files(job_.folder, job_.stem, frame), key_))
      ++kept_;
    else
      missing_.push_back(frame);
  }
}

std::vector<std::filesystem::path> Turntable::render(const transport::Progress& progress) {
  std::vector<std::filesystem::path> written;
  if (missing_.empty()) return written;
  studio_.set_up(plan_.mm_per_pixel, job_.run.exact);
  const plate::QualitySteps steps = plate::quality_steps(job_.run.quality);
  plate::RunFacts facts = job_.run;
  facts.seconds_compile = studio_.compile_seconds();
  for (std::size_t i = 0; i < missing_.size(); ++i) {
    const int frame = missing_[i];
    const plate::FigurePlan figure = plan_.figure(frame);
    const plate::FigurePanel& panel = figure.panels[0];
    const auto start = std::chrono::steady_clock::now();
    const transport::Film film =
        studio_.picture(panel.view, panel.look, panel.shows, panel.camera(studio_.front_mm()), steps, facts.seed, static_cast<std::uint32_t>(frame),
                        FrameProgress(progress, i, missing_.size()));
    facts.seconds_render = std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
    const FrameFiles files = frame_files(job_.folder, job_.stem, frame);
    write_frame(files, key_, plan_, frame, job_.specimen, film, facts);
    written.push_back(files.png);
  }
  return written;
}

std::filesystem::path Turntable::write_record() const {
  const std::filesystem::path path = job_.folder / (job_.stem + "_turn.json");
  const std::string text = turn_record_text(plan_, job_.specimen, job_.run, job_.folder, job_.stem, key_);
  if (!holds(path, text)) diagnostics::write_whole_file(path, text);
  return path;
}

}  // namespace whorl::sequence
