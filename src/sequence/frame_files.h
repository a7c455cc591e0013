// SPDX-License-Identifier: Apache-2.0
// The files of one frame: their names, and whether they are there and whole.
#pragma once

#include "plate/record.h"
#include "sequence/turn_plan.h"
#include "specimen/specimen.h"
#include "transport/film.h"

#include <filesystem>
#include <string>
#include <vector>

namespace whorl::sequence {

/// `FOLDER/STEM_turn_0007.png`, `.exr` and, the frame's own record, `.json`: always four digits.
struct FrameFiles {
  std::filesystem::path png, exr, record;
};
FrameFiles frame_files(const std::filesystem::path& folder, const std::string& stem, int frame);

/// Everything that a frame's pixels depend on, as one SHA-256: scene, seed, method, quality, number of frames, program, build.
std::string frame_key(const specimen::Specimen& specimen, const plate::RunFacts& run, int frames);

/// The frame's record names the key and the sizes of the two pictures, and is written last, so that it vouches for both.
bool frame_is_whole(const FrameFiles& files, const std::string& key);

/// Writes the three files, each whole or not at all; what was there before is unmade first. Throws FileTrouble.
void write_frame(const FrameFiles& files, const std::string& key, const TurnPlan& plan, int frame,
                 const specimen::Specimen& specimen, const transport::Film& film, const plate::RunFacts& run);

/// Pictures of the same name whose number is `frames` or more: left over from a turn of more frames.
std::vector<std::filesystem::path> frames_beyond(const std::filesystem::path& folder, const std::string& stem, int frames);

}  // namespace whorl::sequence
