// SPDX-License-Identifier: Apache-2.0
// Gathers what the frames have in common, and the frames.
#include "sequence/turn_record.h"

#include "plate/views.h"
#include "sequence/frame_files.h"

#include <fmt/format.h>
#include <nlohmann/json.hpp>

#include <fstream>

namespace whorl::sequence {
namespace {

using nlohmann::ordered_json;

/// Seconds that the frame's record states; null where it states none.
ordered_json seconds_of(const std::filesystem::path& record) {
  std::ifstream stream(record, std::ios::binary);
  const ordered_json json = ordered_json::parse(stream, nullptr, false);
  const auto at = json.is_object() ? json.find("seconds") : json.end();
  return at != json.end() && at->is_object() ? at->value("render", ordered_json()) : ordered_json();
}

ordered_json turn_of(const TurnPlan& plan) {
  const int axis = static_cast<int>(plan.pole_px.x);
  return {{"frames", plan.frames},
          {"step_deg", plan.azimuth_deg(1)},
          {"axis", "axis of coiling, upright"},
          {"first_frame", plate::kAzimuthZero},
          {"sense", fmt::format("azimuth grows: {}", plate::kAzimuthSense)},
          {"light", "fixed to the page"},
          {"axis_column_px", axis},
          {"axis_column_rule",
           fmt::format("the width is even: in every frame the axis runs on the edge between columns {} and {}, counted from 0",
                       axis - 1, axis)},
          {"pole_row_px", static_cast<int>(plan.pole_px.y)},
          {"mm_per_pixel", plan.mm_per_pixel},
          {"magnification", plan.paper_scale}};
}

}  // namespace

std::string turn_record_text(const TurnPlan& plan, const specimen::Specimen& specimen, const plate::RunFacts& run,
                             const std::filesystem::path& folder, const std::string& stem, const std::string& key) {
  ordered_json json = plate::make_record(plan.figure(0), specimen, {transport::Film()}, run);
  for (const char* of_one_frame : {"threads", "seconds", "panels", "scale_bars", "counters", "notes"}) json.erase(of_one_frame);
  json["turn"] = turn_of(plan);
  int whole = 0;
  double seconds = 0.0;
  ordered_json frames = ordered_json::array();
  for (int i = 0; i < plan.frames; ++i) {
    const FrameFiles files = frame_files(folder, stem, i);
    ordered_json frame = {{"number", i}, {"file", files.png.filename().string()}, {"azimuth_deg", plan.azimuth_deg(i)}};
    const bool is_whole = frame_is_whole(files, key);
    frame["whole"] = is_whole;
    if (is_whole) {
      frame["seconds"] = seconds_of(files.record);
      if (frame["seconds"].is_number()) seconds += frame["seconds"].get<double>();
      ++whole;
    }
    frames.push_back(frame);
  }
  json["frames_whole"] = whole;
  json["seconds"] = seconds;
  json["frames"] = frames;
  return json.dump(2, ' ', false, ordered_json::error_handler_t::replace) + "\n";
}

}  // namespace whorl::sequence
