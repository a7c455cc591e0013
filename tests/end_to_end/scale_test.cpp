// SPDX-License-Identifier: Apache-2.0
// The picture's own pixels against the record and against what the shell measures.
#include "support/catch.h"

#include "support/read_image.h"

#include <nlohmann/json.hpp>

#include <algorithm>
#include <cmath>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <string>

#include <unistd.h>

namespace {

namespace fs = std::filesystem;
using nlohmann::json;

json run_plate(const fs::path& folder, const std::string& scene_text) {
  fs::create_directories(folder);
  std::ofstream(folder / "shell.toml") << scene_text;
  const std::string command = std::string("\"") + WHORL_PROGRAM + "\" plate \"" + (folder / "shell.toml").string() +
                              "\" -o \"" + folder.string() + "\" --quiet > /dev/null";
  REQUIRE(std::system(command.c_str()) == 0);
  return json::parse(std::ifstream(folder / "shell.json"));
}

struct Extent {
  double first = -1.0, last = -1.0;
  double length() const { return last - first; }
};

}  // namespace

TEST_CASE("silhouette and scale bar in the PNG are true to the record and to the measured shell", "[end_to_end]") {
  const fs::path folder = fs::temp_directory_path() / ("whorl_scale_" + std::to_string(::getpid()));
  const json record = run_plate(folder, R"(format = 1
[specimen]
name = "Vorrinella mensurabilis"
coiling = "dextral"
[growth]
whorls = 5.5
W = 1.6
D = 0.1
T = 1.8
[size]
shell_height = 11.7
[wall]
thickness = 0.2
[plate]
width = 60.0
resolution = 800
quality = "draft"
letters = "none"
background = "clear"
[[panel]]
view = "apertural"
)");
  const whorl::support::ReadImage image = whorl::support::read_image(folder / "shell.png");
  const json& panel = record.at("panels").at(0);
  const double mm_per_pixel = panel.at("mm_per_pixel");
  const json rect = panel.at("rectangle_px");
  CAPTURE(rect.dump());
  const auto number = [&](const char* key, std::size_t i) {
    return (rect.is_array() ? rect.at(i) : rect.at(key)).get<int>();
  };
  const int x0 = number("x", 0), y0 = number("y", 1), w = number("width", 2), h = number("height", 3);
  const std::size_t alpha = image.channel("A");
  constexpr float kWhole = 65535.0f;  // clear plates are 16 bit

  // Rows of the panel that are at least half covered somewhere: the pixel filter's skirt does not count.
  Extent rows;
  for (int y = y0; y < y0 + h; ++y) {
    float most = 0.0f;
    for (int x = x0; x < x0 + w; ++x) most = std::max(most, image.at(x, y, alpha));
    if (most > 0.5f * kWhole) {
      if (rows.first < 0.0) rows.first = y;
      rows.last = y + 1;
    }
  }
  const double height = record.at("measurements").at("shell_height");
  CHECK(height == Approx(11.7).epsilon(0.002));
  CHECK(rows.length() * mm_per_pixel == Approx(height).margin(2.0 * mm_per_pixel));

  // The bar: the longest run of whole ink below the panel, without its antialiased end.
  const json& bar = record.at("scale_bars").at(0);
  double longest = 0.0;
  for (int y = y0 + h; y < image.height; ++y) {
    double run = 0.0;
    for (int x = 0; x < image.width; ++x) {
      run = image.at(x, y, alpha) > 0.99f * kWhole ? run + 1.0 : 0.0;
      longest = std::max(longest, run);
    }
  }
  const double length_mm = bar.at("length_mm"), length_px = bar.at("length_px");
  CHECK(length_px == Approx(length_mm / mm_per_pixel));
  CHECK(longest == Approx(length_px).margin(1.0));
  fs::remove_all(folder);
}
