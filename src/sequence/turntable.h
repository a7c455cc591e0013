// SPDX-License-Identifier: Apache-2.0
// A turntable: one turn about the axis of coiling as numbered frames, resumable and in parts.
#pragma once

#include "plate/record.h"
#include "plate/studio.h"
#include "sequence/turn_plan.h"
#include "specimen/specimen.h"
#include "transport/progress.h"

#include <filesystem>
#include <string>
#include <vector>

namespace whorl::sequence {

struct TurntableJob {
  specimen::Specimen specimen;  // at the quality that is to be drawn (plate::at_quality)
  std::filesystem::path folder; // must be there
  std::string stem;             // of the files' names
  int frames = 36;
  int part = 1, of = 1;         // this run's share, 1 <= part <= of
  plate::RunFacts run;          // version, build, seed, threads, exact and quality are used
};

class Turntable {
 public:
  /// Compiles the shell once for all frames, plans them, and looks which are there. Throws InvalidInput.
  explicit Turntable(TurntableJob job);

  const TurnPlan& plan() const { return plan_; }
  /// Frames of this run's share that are missing, or were made from another scene or otherwise.
  const std::vector<int>& missing() const { return missing_; }
  int kept() const { return kept_; }
  const scene::Scene& scene() const { return studio_.scene(); }

  /// Renders and writes what is missing, in order; returns the pictures that it wrote. Each frame appears whole or not at
  /// all. Progress runs over all of it. Throws FileTrouble.
  std::vector<std::filesystem::path> render(const transport::Progress& progress);

  /// Writes `STEM_turn.json` from the plan and the frames that are whole by now, whoever rendered them; leaves the file
  /// alone where it says just that. Returns its path. Throws FileTrouble.
  std::filesystem::path write_record() const;

 private:
  TurntableJob job_;
  plate::Studio studio_;
  TurnPlan plan_;
  std::string key_;
  std::vector<int> missing_;
  int kept_ = 0;
};

}  // namespace whorl::sequence
