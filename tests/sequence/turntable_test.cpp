// SPDX-License-Identifier: Apache-2.0
// The command 'turntable' as a user runs it: names, what is kept, what is rendered anew.
#include "sequence/frame_files.h"
#include "support/catch.h"
#include "support/program.h"
#include "support/scene_text.h"

#include <nlohmann/json.hpp>

#include <fstream>
#include <map>

namespace fs = std::filesystem;
using nlohmann::json;
using whorl::support::Ran;
using whorl::support::read_file;
using whorl::support::run_program;
using whorl::support::ScratchFolder;

namespace {

whorl::support::SceneText tiny_scene() {
  whorl::support::SceneText scene;
  scene.set("growth", "whorls", "2.5").set("growth", "W", "1.9").set("growth", "T", "1.6").set("wall", "thickness", "0.8");
  scene.set("plate", "width", "20").set("plate", "resolution", "200").set("plate", "quality", "\"draft\"");
  return scene.set("panel", "view", "\"apertural\"");
}

/// Runs the command quietly; its words after the scene and the folder.
Ran turn(const std::string& scene, const fs::path& out, std::vector<std::string> more) {
  std::vector<std::string> words{"turntable", scene, "-o", out.string(), "--quiet"};
  words.insert(words.end(), more.begin(), more.end());
  return run_program(words);
}

std::vector<std::string> names_in(const fs::path& folder) {
  std::vector<std::string> names;
  for (const auto& entry : fs::directory_iterator(folder)) names.push_back(entry.path().filename().string());
  std::sort(names.begin(), names.end());
  return names;
}

std::map<std::string, fs::file_time_type> times_in(const fs::path& folder) {
  std::map<std::string, fs::file_time_type> times;
  for (const auto& entry : fs::directory_iterator(folder)) times[entry.path().filename().string()] = entry.last_write_time();
  return times;
}

/// Numbers of the frames whose picture has changed since.
std::vector<int> rendered_since(const std::map<std::string, fs::file_time_type>& before, const fs::path& folder, int frames) {
  std::vector<int> changed;
  for (int i = 0; i < frames; ++i) {
    const fs::path png = whorl::sequence::frame_files(folder, "a", i).png;
    const auto found = before.find(png.filename().string());
    if (found == before.end() || fs::last_write_time(png) != found->second) changed.push_back(i);
  }
  return changed;
}

}  // namespace

TEST_CASE("A turn of N frames is N numbered PNG and EXR files with a record each, and a record of all", "[sequence]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", tiny_scene().text());
  const fs::path out = folder.path() / "new" / "frames";
  const Ran ran = turn(scene, out, {"--frames", "3", "--seed", "11"});
  INFO(ran.err);
  REQUIRE(ran.code == 0);
  CHECK(names_in(out) == std::vector<std::string>{"a_turn.json", "a_turn_0000.exr", "a_turn_0000.json", "a_turn_0000.png",
                                                  "a_turn_0001.exr", "a_turn_0001.json", "a_turn_0001.png",
                                                  "a_turn_0002.exr", "a_turn_0002.json", "a_turn_0002.png"});
  const json record = json::parse(read_file(out / "a_turn.json"));
  CHECK(record["program"]["version"] == "0.1.0");
  CHECK(record["seed"] == 11);
  CHECK(record["scene"]["sha256"].get<std::string>().size() == 64);
  CHECK(record["turn"]["frames"] == 3);
  CHECK(record["turn"]["step_deg"] == 120.0);
  CHECK(record["turn"]["sense"].get<std::string>().find("walks to his right") != std::string::npos);
  CHECK(record["turn"]["mm_per_pixel"].get<double>() > 0.0);
  CHECK(record["turn"]["axis_column_px"].get<int>() * 2 == record["figure"]["width_px"].get<int>());
  CHECK(record["frames_whole"] == 3);
  REQUIRE(record["frames"].size() == 3);
  for (std::size_t i = 0; i < 3; ++i) {
    CHECK(record["frames"][i]["azimuth_deg"] == 120.0 * static_cast<double>(i));
    CHECK(record["frames"][i]["seconds"].get<double>() > 0.0);
    CHECK(fs::exists(out / record["frames"][i]["file"].get<std::string>()));
  }
}

TEST_CASE("A second run renders nothing and touches no file; another seed, scene, quality or count renders all anew", "[sequence]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", tiny_scene().text());
  const fs::path out = folder.path() / "frames";
  REQUIRE(turn(scene, out, {"--frames", "2"}).code == 0);
  auto before = times_in(out);
  REQUIRE(turn(scene, out, {"--frames", "2"}).code == 0);
  CHECK(times_in(out) == before);

  const std::vector<int> both{0, 1};
  REQUIRE(turn(scene, out, {"--frames", "2", "--seed", "1"}).code == 0);
  CHECK(rendered_since(before, out, 2) == both);
  before = times_in(out);
  REQUIRE(turn(scene, out, {"--frames", "2", "--seed", "1", "--quality", "proof"}).code == 0);
  CHECK(rendered_since(before, out, 2) == both);
  before = times_in(out);
  folder.with_file("a.toml", tiny_scene().set("growth", "D", "0.07").text());
  REQUIRE(turn(scene, out, {"--frames", "2", "--seed", "1", "--quality", "proof"}).code == 0);
  CHECK(rendered_since(before, out, 2) == both);
  before = times_in(out);
  REQUIRE(turn(scene, out, {"--frames", "3", "--seed", "1", "--quality", "proof"}).code == 0);
  CHECK(rendered_since(before, out, 3) == std::vector<int>{0, 1, 2});
}

TEST_CASE("A frame that lost a file, or whose picture is cut short, is rendered again, and no other", "[sequence]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", tiny_scene().text());
  const fs::path out = folder.path() / "frames";
  REQUIRE(turn(scene, out, {"--frames", "4"}).code == 0);
  const auto before = times_in(out);
  const std::string whole = read_file(out / "a_turn_0003.exr");
  fs::remove(out / "a_turn_0000.png");
  fs::remove(out / "a_turn_0001.json");
  std::ofstream(out / "a_turn_0003.exr", std::ios::binary) << whole.substr(0, whole.size() / 2);
  REQUIRE(turn(scene, out, {"--frames", "4"}).code == 0);
  CHECK(rendered_since(before, out, 4) == std::vector<int>{0, 1, 3});
  CHECK(read_file(out / "a_turn_0003.exr") == whole);
  CHECK(names_in(out).size() == 13);
}

TEST_CASE("The parts of a turn, run one by one, give the very files of one run", "[sequence]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", tiny_scene().set("plate", "background", "\"clear\"").text());
  const fs::path one = folder.path() / "one", parts = folder.path() / "parts";
  REQUIRE(turn(scene, one, {"--frames", "3"}).code == 0);
  REQUIRE(turn(scene, parts, {"--frames", "3", "--slice", "2/2", "--threads", "1"}).code == 0);
  CHECK(json::parse(read_file(parts / "a_turn.json"))["frames_whole"] == 1);
  CHECK_FALSE(fs::exists(parts / "a_turn_0000.png"));
  REQUIRE(turn(scene, parts, {"--frames", "3", "--slice", "1/2"}).code == 0);
  CHECK(json::parse(read_file(parts / "a_turn.json"))["frames_whole"] == 3);
  CHECK(names_in(parts) == names_in(one));
  for (const std::string& name : names_in(one))
    if (!name.ends_with(".json")) CHECK(read_file(parts / name) == read_file(one / name));
}

TEST_CASE("Frames left over from a turn with more frames are named, not removed", "[sequence]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", tiny_scene().text());
  REQUIRE(turn(scene, folder.path(), {"--frames", "3"}).code == 0);
  const Ran ran = run_program({"turntable", scene, "-o", folder.path().string(), "--frames", "2"});
  CHECK(ran.code == 0);
  CHECK(ran.err.find("a_turn_0002.png") != std::string::npos);
  CHECK(fs::exists(folder.path() / "a_turn_0002.png"));
}
