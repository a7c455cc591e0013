// SPDX-License-Identifier: Apache-2.0
// Provenance on a rendered plate: the layer against the layer of growth.
#include "support/catch.h"
#include "support/program.h"
#include "support/read_image.h"

#include <nlohmann/json.hpp>

using namespace whorl;
using namespace whorl::support;

namespace {

const std::string kScene = "format = 1\n[specimen]\nname = \"Fracta\"\ncoiling = \"dextral\"\n[growth]\nwhorls = 5.0\nW = 1.6\nD = 0.06\nT = 2.2\n"
                           "[size]\nshell_height = 20.0\n[wall]\nthickness = 0.4\n[plate]\nwidth = 45.0\nresolution = 300\n";
const std::string kPanel = "[[panel]]\nview = \"apertural\"\n";
const std::string kPreserved = "[[preserved]]\nfrom = 3.0\nto = 4.25\nparts = \"wall\"\n";

}  // namespace

TEST_CASE("the provenance layer of a plate is that of each pixel's whorl, and a plain plate keeps its pixels", "[end_to_end][provenance]") {
  const ScratchFolder folder;
  const auto plate = [&](const std::string& stem, const std::string& text) {
    const Ran ran = run_program({"plate", folder.with_file(stem + ".toml", text), "-o", folder.path().string(), "--quality", "draft", "--quiet"});
    INFO(ran.err);
    REQUIRE(ran.code == 0);
  };
  plate("stated", kScene + kPanel + kPreserved);
  plate("silent", kScene + kPanel);
  const ReadImage image = read_image(folder.path() / "stated.exr");
  REQUIRE(image.channels.size() == 16);
  const std::size_t turn = image.channel("turn"), part = image.channel("part"), provenance = image.channel("provenance");
  int seen = 0, right = 0, observed = 0, nothing_wrong = 0;
  for (int y = 0; y < image.height; ++y)
    for (int x = 0; x < image.width; ++x) {
      const float whorl = image.at(x, y, turn), told = image.at(x, y, provenance);
      if (image.at(x, y, part) == 0.0f) nothing_wrong += told != 0.0f;
      if (image.at(x, y, part) == 0.0f || whorl < 1.0f) continue;  // nothing, or near the embryonic shell
      ++seen;
      const bool within = whorl >= 3.0f && whorl <= 4.25f;
      observed += within;
      right += told == (within ? 1.0f : 3.0f);
    }
  CHECK(nothing_wrong == 0);
  CHECK(observed > 100);
  CHECK(seen > 3 * observed / 2);
  CHECK(right >= seen - seen / 200);  // turns are those of the growth angle; here growth lines run with it
  CHECK(read_image(folder.path() / "silent.exr").channels.size() == 15);
  CHECK(read_file(folder.path() / "stated.tif").size() > 0);
  const ReadImage a = read_image(folder.path() / "stated.png"), b = read_image(folder.path() / "silent.png");
  bool same = a.width == b.width && a.height == b.height;
  for (int y = 0; same && y < a.height; ++y)
    for (int x = 0; same && x < a.width; ++x)
      for (std::size_t c = 0; c < a.channels.size(); ++c) same = same && a.at(x, y, c) == b.at(x, y, c);
  CHECK(same);
  const auto record = nlohmann::json::parse(read_file(folder.path() / "stated.json"));
  CHECK(record.at("provenance").at("outer_surface_share").at("observed").get<double>() > 0.1);
  CHECK_FALSE(nlohmann::json::parse(read_file(folder.path() / "silent.json")).contains("provenance"));
  CHECK(read_file(folder.path() / "stated.txt").find("Preserved: the wall from whorl 3 to whorl 4.25.") != std::string::npos);
}
