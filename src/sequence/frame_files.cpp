// SPDX-License-Identifier: Apache-2.0
// A frame on disk: two pictures and the record that vouches for them.
#include "sequence/frame_files.h"

#include "diagnostics/error.h"
#include "diagnostics/whole_file.h"
#include "plate/compose.h"
#include "plate/image_exr.h"
#include "plate/image_png.h"
#include "plate/sha256.h"

#include <fmt/format.h>

#include <algorithm>
#include <fstream>
#include <system_error>

namespace whorl::sequence {
namespace {

using nlohmann::ordered_json;

constexpr std::size_t kDigits = 4;

/// 0 where there is no such file; a picture is never empty.
std::uintmax_t size_of(const std::filesystem::path& path) {
  std::error_code fault;
  const std::uintmax_t size = std::filesystem::file_size(path, fault);
  return fault ? 0 : size;
}

void unmake(const std::filesystem::path& path) {
  std::error_code fault;
  std::filesystem::remove(path, fault);
  if (fault) throw diagnostics::FileTrouble(fmt::format("cannot replace {}: {}", path.string(), fault.message()));
}

}  // namespace

FrameFiles frame_files(const std::filesystem::path& folder, const std::string& stem, int frame) {
  const std::string name = fmt::format("{}_turn_{:0{}}", stem, frame, kDigits);
  return {folder / (name + ".png"), folder / (name + ".exr"), folder / (name + ".json")};
}

std::string frame_key(const specimen::Specimen& specimen, const plate::RunFacts& run, int frames) {
  return plate::sha256_hex(fmt::format("turn 1|{}|{}|seed {}|exact {}|quality {}|frames {}|{}", run.version, run.build, run.seed,
                                       run.exact, static_cast<int>(run.quality), frames, specimen.text));
}

bool frame_is_whole(const FrameFiles& files, const std::string& key) {
  std::ifstream stream(files.record, std::ios::binary);
  if (!stream) return false;
  const ordered_json json = ordered_json::parse(stream, nullptr, false);
  if (!json.is_object() || !json.contains("frame") || !json["frame"].is_object()) return false;
  const ordered_json& frame = json["frame"];
  const auto says = [&frame](const char* name, const ordered_json& value) {
    return frame.contains(name) && frame[name] == value;
  };
  const std::uintmax_t png = size_of(files.png), exr = size_of(files.exr);
  return png > 0 && exr > 0 && says("key", key) && says("png_bytes", png) && says("exr_bytes", exr);
}

void write_frame(const FrameFiles& files, const std::string& key, const TurnPlan& plan, int frame,
                 const specimen::Specimen& specimen, const transport::Film& film, const plate::RunFacts& run) {
  const plate::FigurePlan figure = plan.figure(frame);
  const std::vector<transport::Film> films{film};
  plate::PictureTags tags;
  tags.resolution_ppi = plan.resolution_ppi;
  tags.title = specimen.identity.name;
  tags.description = fmt::format("Frame {} of 0 to {}, one turn of {} about its axis of coiling: {}", frame, plan.frames - 1,
                                 specimen.identity.name.value, figure.panels[0].view.label);
  tags.copyright = specimen.identity.licence;
  tags.software = "Whorlwright " + run.version;

  // The old record would vouch for a mixture of old and new pictures.
  unmake(files.record);
  plate::write_png(files.png, plate::compose(figure, films, specimen.plate.background), tags);
  plate::write_exr(files.exr, figure, films, tags);
  ordered_json record = plate::make_record(figure, specimen, films, run);
  record["frame"] = {{"number", frame},
                     {"of", plan.frames},
                     {"azimuth_deg", plan.azimuth_deg(frame)},
                     {"key", key},
                     {"png_bytes", size_of(files.png)},
                     {"exr_bytes", size_of(files.exr)}};
  diagnostics::write_whole_file(files.record, record.dump(2, ' ', false, ordered_json::error_handler_t::replace) + "\n");
}

std::vector<std::filesystem::path> frames_beyond(const std::filesystem::path& folder, const std::string& stem, int frames) {
  std::vector<std::filesystem::path> found;
  std::error_code fault;
  const std::string prefix = stem + "_turn_";
  for (const auto& entry : std::filesystem::directory_iterator(folder, fault)) {
    const std::filesystem::path& path = entry.path();
    const std::string name = path.stem().string();
    if (path.extension() != ".png" || !name.starts_with(prefix)) continue;
    const std::string number = name.substr(prefix.size());
    const bool digits = number.size() == kDigits &&
                        std::all_of(number.begin(), number.end(), [](char c) { return c >= '0' && c <= '9'; });
    if (digits && std::stoi(number) >= frames) found.push_back(path);
  }
  std::sort(found.begin(), found.end());
  return found;
}

}  // namespace whorl::sequence
