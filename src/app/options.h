// SPDX-License-Identifier: Apache-2.0
// What the user asked for on the command line, as plain values that have been checked one by one.
#pragma once

#include "specimen/specimen.h"

#include <cstdint>
#include <filesystem>
#include <optional>
#include <string>

namespace whorl::app {

enum class Command { kPlate, kMeasure, kCheck, kTurntable, kFit };

/// Part `part` of `of` equal parts of a job, 1 <= part <= of.
struct Slice {
  int part = 1, of = 1;
};

struct Options {
  Command command = Command::kCheck;
  std::string scene;                            // a path, or "-" for standard input; of 'fit', the measurement file
  std::string fitted_scene;                     // where 'fit' writes: a scene file, or a folder for many
  std::filesystem::path out = ".";              // folder that receives the files
  std::optional<specimen::Quality> quality;     // stands before the scene's own
  std::optional<std::string> only_panel;        // its letter, its number or its view's name, as typed
  bool json = false;
  int frames = 36;                              // of one full turn, 1 .. 3600
  Slice slice;
  int threads = 0;                              // 0: one a core
  std::uint64_t seed = 0;
  bool exact = false;                           // only where the method has a faster, bounded approximation
  bool quiet = false;
};

}  // namespace whorl::app
