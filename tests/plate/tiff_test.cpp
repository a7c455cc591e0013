// SPDX-License-Identifier: Apache-2.0
// The TIFF file as printers want it, and its colour profile.
#include "plate/image_tiff.h"

#include "plate/icc_profile.h"
#include "support/catch.h"
#include "support/independent_reader.h"
#include "support/program.h"
#include "support/read_image.h"

#include <cmath>
#include <cstdint>
#include <string>
#include <utility>

namespace whorl::plate {
namespace {

Picture ramp(int channels, int bits) {
  Picture picture;
  picture.width = 64;
  picture.height = 48;
  picture.channels = channels;
  picture.bits = bits;
  picture.samples.resize(picture.index(0, picture.height));
  for (std::size_t i = 0; i < picture.samples.size(); ++i)
    picture.samples[i] = static_cast<std::uint16_t>(bits == 16 ? i * 40503u % 65536u : i * 7u % 256u);
  return picture;
}

PictureTags tags() {
  PictureTags one;
  one.resolution_ppi = 600.0;
  one.title = "Cochlidion argutum";
  one.software = "Whorlwright";
  return one;
}

std::uint32_t big_endian(const std::string& bytes, std::size_t at, std::size_t count) {
  std::uint32_t value = 0;
  for (std::size_t i = 0; i < count; ++i) value = value * 256u + static_cast<unsigned char>(bytes.at(at + i));
  return value;
}

/// Where a tag's body begins in a profile.
std::size_t body_of(const std::string& profile, const std::string& tag) {
  for (std::uint32_t i = 0; i < big_endian(profile, 128, 4); ++i)
    if (profile.substr(132 + 12 * i, 4) == tag) return big_endian(profile, 136 + 12 * i, 4);
  FAIL("no tag " << tag);
  return 0;
}

double fixed_at(const std::string& profile, std::size_t at) {
  return static_cast<std::int32_t>(big_endian(profile, at, 4)) / 65536.0;
}

}  // namespace

TEST_CASE("tiffinfo reads 600 pixels an inch, LZW, three samples and no alpha", "[plate][tiff]") {
  const support::ScratchFolder folder;
  const auto path = folder.path() / "figure.tif";
  write_tiff(path, ramp(3, 8), tags());
  const auto opinion = support::ask("tiffinfo", path);
  if (!opinion) return;
  INFO(opinion->words);
  CHECK(opinion->code == 0);
  for (const char* line : {"Resolution: 600, 600 pixels/inch", "Compression Scheme: LZW", "Samples/Pixel: 3", "Bits/Sample: 8",
                           "Photometric Interpretation: RGB color", "ICC Profile: <present>"})
    CHECK(opinion->words.find(line) != std::string::npos);
  CHECK(opinion->words.find("Extra Samples") == std::string::npos);
  CHECK(opinion->words.find("Warning") == std::string::npos);
}

TEST_CASE("On clear ground tiffinfo reads one extra sample, alpha that is not multiplied in", "[plate][tiff]") {
  const support::ScratchFolder folder;
  const auto path = folder.path() / "figure.tif";
  write_tiff(path, ramp(4, 16), tags());
  const auto opinion = support::ask("tiffinfo", path);
  if (!opinion) return;
  INFO(opinion->words);
  CHECK(opinion->words.find("Extra Samples: 1<unassoc-alpha>") != std::string::npos);
  CHECK(opinion->words.find("Bits/Sample: 16") != std::string::npos);
}

TEST_CASE("TIFF gives back every sample", "[plate][tiff]") {
  const support::ScratchFolder folder;
  for (const auto& [channels, bits] : {std::pair{3, 8}, std::pair{4, 16}}) {
    const Picture picture = ramp(channels, bits);
    const auto path = folder.path() / "ramp.tif";
    write_tiff(path, picture, tags());
    const support::ReadImage image = support::read_image(path);
    REQUIRE(image.values.size() == picture.samples.size());
    bool same = true;
    for (std::size_t i = 0; i < image.values.size(); ++i) same = same && image.values[i] == static_cast<float>(picture.samples[i]);
    CHECK(same);
  }
}

TEST_CASE("The same picture gives the same TIFF bytes, which hold no date", "[plate][tiff]") {
  const support::ScratchFolder folder;
  write_tiff(folder.path() / "a.tif", ramp(3, 8), tags());
  write_tiff(folder.path() / "b.tif", ramp(3, 8), tags());
  const std::string bytes = support::read_file(folder.path() / "a.tif");
  CHECK(bytes == support::read_file(folder.path() / "b.tif"));
  CHECK(bytes.find("    :  :     :  :  ") != std::string::npos);
}

TEST_CASE("The profile is sRGB: its colorants are those of the published one and add up to its white", "[plate][tiff]") {
  const std::string profile = srgb_profile();
  CHECK(big_endian(profile, 0, 4) == profile.size());
  CHECK(profile.substr(36, 4) == "acsp");
  CHECK(profile.substr(12, 12) == "mntrRGB XYZ ");
  // sRGB colorants adapted to D50 as the International Color Consortium publishes them, to four places.
  const double published[3][3] = {{0.4361, 0.2225, 0.0139}, {0.3851, 0.7169, 0.0971}, {0.1431, 0.0606, 0.7141}};
  const char* const names[3] = {"rXYZ", "gXYZ", "bXYZ"};
  double sum[3] = {0.0, 0.0, 0.0};
  for (std::size_t c = 0; c < 3; ++c) {
    const std::size_t at = body_of(profile, names[c]);
    CHECK(profile.substr(at, 4) == "XYZ ");
    for (std::size_t i = 0; i < 3; ++i) {
      CHECK(std::abs(fixed_at(profile, at + 8 + 4 * i) - published[c][i]) < 2e-4);
      sum[i] += fixed_at(profile, at + 8 + 4 * i);
    }
  }
  const double d50[3] = {0.9642, 1.0, 0.8249};
  for (std::size_t i = 0; i < 3; ++i) CHECK(std::abs(sum[i] - d50[i]) < 1e-4);
}

TEST_CASE("The profile's curve is sRGB's at its ends, its knee and its middle", "[plate][tiff]") {
  const std::string profile = srgb_profile();
  const std::size_t at = body_of(profile, "gTRC");
  CHECK(profile.substr(at, 4) == "curv");
  const std::uint32_t entries = big_endian(profile, at + 8, 4);
  REQUIRE(entries == 1024);
  const auto entry = [&](std::uint32_t i) { return big_endian(profile, at + 12 + 2 * i, 2) / 65535.0; };
  CHECK(entry(0) == 0.0);
  CHECK(entry(1023) == 1.0);
  CHECK(entry(41) == Approx(41.0 / 1023.0 / 12.92).epsilon(0.01));                                // below the knee at 0.04045
  CHECK(entry(512) == Approx(std::pow((512.0 / 1023.0 + 0.055) / 1.055, 2.4)).epsilon(1e-4));
}

}  // namespace whorl::plate
