// SPDX-License-Identifier: Apache-2.0
// The frames as pictures: the axis stands still, and the first is what the plate shows.
#include "support/catch.h"
#include "support/program.h"
#include "support/read_image.h"
#include "support/scene_text.h"

#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>

namespace fs = std::filesystem;
using nlohmann::json;
using namespace whorl::support;

namespace {

SceneText scene_of(const char* coiling) {
  SceneText scene;
  scene.set("specimen", "coiling", coiling);
  scene.set("growth", "whorls", "2.5").set("growth", "W", "1.9").set("growth", "T", "1.6").set("wall", "thickness", "0.8");
  scene.set("plate", "width", "30").set("plate", "resolution", "300").set("plate", "quality", "\"draft\"");
  scene.set("plate", "letters", "\"none\"");
  return scene.set("panel", "view", "\"apertural\"");
}

struct Compared {
  int judged = 0, differing = 0;
};

/// Compares the `part` layer of a frame with the plate's where the plate is of one part all round; both about the pole.
Compared compare_parts(const ReadImage& frame, int frame_x, int frame_y, const ReadImage& plate, double plate_x, double plate_y) {
  Compared result;
  const auto part = plate.channel("part");
  for (int y = 1; y + 1 < plate.height; ++y)
    for (int x = 1; x + 1 < plate.width; ++x) {
      const float here = plate.at(x, y, part);
      bool uniform = true;
      for (int dy = -1; dy <= 1; ++dy)
        for (int dx = -1; dx <= 1; ++dx) uniform = uniform && plate.at(x + dx, y + dy, part) == here;
      // The centre of the plate's pixel, in the frame: at most half a pixel from the centre of the frame's own.
      const int fx = static_cast<int>(std::floor(x + 0.5 - plate_x + frame_x));
      const int fy = static_cast<int>(std::floor(y + 0.5 - plate_y + frame_y));
      if (!uniform || fx < 0 || fy < 0 || fx >= frame.width || fy >= frame.height) continue;
      ++result.judged;
      if (frame.at(fx, fy, "part") != here) ++result.differing;
    }
  return result;
}

}  // namespace

TEST_CASE("Silhouettes half a turn apart are mirror images about the same column of pixels", "[sequence]") {
  // So they are of any solid seen along parallel lines; a shifted axis would show as twice the shift.
  for (const char* coiling : {"\"dextral\"", "\"sinistral\""}) {
    const ScratchFolder folder;
    const std::string scene = folder.with_file("a.toml", scene_of(coiling).text());
    REQUIRE(run_program({"turntable", scene, "-o", folder.path().string(), "--frames", "4", "--quiet"}).code == 0);
    std::vector<ReadImage> frames;
    for (const char* name : {"a_turn_0000.exr", "a_turn_0001.exr", "a_turn_0002.exr", "a_turn_0003.exr"})
      frames.push_back(read_image(folder.path() / name));
    double same_way = 0.0;
    for (std::size_t i : {0u, 1u}) {
      const ReadImage &a = frames[i], &b = frames[i + 2];
      REQUIRE(a.width == b.width);
      REQUIRE(a.height == b.height);
      double covered = 0.0, differing = 0.0;
      for (int y = 0; y < a.height; ++y)
        for (int x = 0; x < a.width; ++x) {
          const float mirrored = b.at(a.width - 1 - x, y, "part");
          covered += a.at(x, y, "part") != 0.0f;
          differing += (a.at(x, y, "part") != 0.0f) != (mirrored != 0.0f);
          same_way += (a.at(x, y, "part") != 0.0f) != (b.at(x, y, "part") != 0.0f);
        }
      CHECK(covered > 500.0);
      CHECK(differing <= 2.0);  // a grazing ray may be rounded to either side
    }
    CHECK(same_way > 100.0);  // the outlines are not symmetric, or this would say nothing
  }
}

TEST_CASE("Frame 0 is the plate's apertural view at the same scale", "[sequence]") {
  for (const char* coiling : {"\"dextral\"", "\"sinistral\""}) {
    const ScratchFolder folder;
    const std::string scene = folder.with_file("a.toml", scene_of(coiling).text()), out = folder.path().string();
    REQUIRE(run_program({"plate", scene, "-o", out, "--quiet"}).code == 0);
    REQUIRE(run_program({"turntable", scene, "-o", out, "--frames", "3", "--quiet"}).code == 0);
    const json plate = json::parse(read_file(folder.path() / "a.json"));
    const json turn = json::parse(read_file(folder.path() / "a_turn.json"));
    const json& panel = plate["panels"][0];
    CHECK(turn["turn"]["mm_per_pixel"].get<double>() == Approx(panel["mm_per_pixel"].get<double>()).epsilon(1e-12));

    const ReadImage whole = read_image(folder.path() / "a.exr");
    const double pole_x = panel["pole_px"]["x"].get<double>(), pole_y = panel["pole_px"]["y"].get<double>();
    const int axis = turn["turn"]["axis_column_px"].get<int>(), row = turn["turn"]["pole_row_px"].get<int>();
    const Compared first = compare_parts(read_image(folder.path() / "a_turn_0000.exr"), axis, row, whole, pole_x, pole_y);
    CHECK(first.judged > 1000);
    CHECK(first.differing == 0);
    const Compared second = compare_parts(read_image(folder.path() / "a_turn_0001.exr"), axis, row, whole, pole_x, pole_y);
    CHECK(second.differing > second.judged / 20);
  }
}
