// SPDX-License-Identifier: Apache-2.0
// The PNG file: resolution, colour space, alpha, bytes; read by other programs and by its chunks.
#include "plate/image_png.h"

#include "diagnostics/error.h"
#include "plate/png_chunks.h"
#include "support/catch.h"
#include "support/independent_reader.h"
#include "support/program.h"
#include "support/read_image.h"

#include <cstdint>
#include <map>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

namespace whorl::plate {
namespace {

Picture stripes(int channels, int bits) {
  Picture picture;
  picture.width = 37;
  picture.height = 21;
  picture.channels = channels;
  picture.bits = bits;
  picture.samples.resize(picture.index(0, picture.height));
  const unsigned top = bits == 16 ? 65535u : 255u;
  for (std::size_t i = 0; i < picture.samples.size(); ++i)
    picture.samples[i] = static_cast<std::uint16_t>(i * 2654435761u % (top + 1u));
  return picture;
}

/// A walk through the chunks of its own: nothing of the writer's is used.
std::vector<std::pair<std::string, std::string>> walk(const std::string& bytes) {
  std::vector<std::pair<std::string, std::string>> chunks;
  REQUIRE(bytes.substr(0, 8) == "\x89PNG\r\n\x1a\n");
  const auto number = [&bytes](std::size_t at) {
    std::uint32_t value = 0;
    for (std::size_t i = 0; i < 4; ++i) value = value * 256u + static_cast<unsigned char>(bytes[at + i]);
    return value;
  };
  for (std::size_t at = 8; at < bytes.size();) {
    REQUIRE(at + 12 <= bytes.size());
    const std::uint32_t length = number(at);
    REQUIRE(at + 12 + length <= bytes.size());
    chunks.emplace_back(bytes.substr(at + 4, 4), bytes.substr(at + 8, length));
    at += 12 + length;
  }
  return chunks;
}

std::string only(const std::string& bytes, const std::string& type) {
  std::string data;
  int found = 0;
  for (const auto& [name, content] : walk(bytes))
    if (name == type) data = content, ++found;
  INFO("chunk " << type);
  CHECK(found == 1);
  return data;
}

std::uint32_t number_at(const std::string& data, std::size_t at) {
  std::uint32_t value = 0;
  for (std::size_t i = 0; i < 4; ++i) value = value * 256u + static_cast<unsigned char>(data.at(at + i));
  return value;
}

PictureTags tags_at(double ppi) {
  PictureTags tags;
  tags.resolution_ppi = ppi;
  tags.title = "Cochlidion argutum";
  tags.description = "Kühn's shell, 500 µm";
  tags.software = "Whorlwright";
  return tags;
}

}  // namespace

TEST_CASE("PNG resolution is the whole number of pixels a metre nearest to the stated one", "[plate][png]") {
  // ppi / 0.0254, rounded: reference rendering-methods 9.3, fault 1, which lists those that truncation gets wrong.
  const std::map<double, std::uint32_t> per_metre = {{72, 2835},   {96, 3780},    {150, 5906},   {240, 9449},
                                                     {300, 11811}, {600, 23622}, {1200, 47244}, {800, 31496}};
  for (const auto& [ppi, expected] : per_metre) {
    const std::string data = only(encode_png(stripes(3, 8), tags_at(ppi), "x.png"), "pHYs");
    REQUIRE(data.size() == 9);
    CHECK(number_at(data, 0) == expected);
    CHECK(number_at(data, 4) == expected);
    CHECK(data[8] == 1);  // the metre
  }
}

TEST_CASE("PNG says once that it is sRGB, with white as the paper's white, and carries nothing of the writer's own", "[plate][png]") {
  const std::string bytes = encode_png(stripes(3, 8), tags_at(600), "x.png");
  CHECK(only(bytes, "sRGB") == std::string(1, '\1'));  // relative colorimetric
  CHECK(only(bytes, "gAMA").size() == 4);
  bool pixels_begun = false;
  for (const auto& [type, data] : walk(bytes)) {
    CHECK((type == "IHDR" || type == "sRGB" || type == "gAMA" || type == "cHRM" || type == "pHYs" || type == "iTXt" ||
           type == "IDAT" || type == "IEND"));
    if (type == "IDAT") pixels_begun = true;
    if (type == "sRGB" || type == "pHYs") CHECK_FALSE(pixels_begun);
    CHECK(data.find("oiio") == std::string::npos);
  }
}

TEST_CASE("PNG keeps text beyond ASCII as UTF-8", "[plate][png]") {
  const std::string bytes = encode_png(stripes(3, 8), tags_at(600), "x.png");
  bool found = false;
  for (const auto& [type, data] : walk(bytes))
    found = found || (type == "iTXt" && data == std::string("Description\0\0\0\0\0Kühn's shell, 500 µm", 16 + 22));
  CHECK(found);
}

TEST_CASE("PNG gives back every sample, at 8 and 16 bits, and straight alpha untouched", "[plate][png]") {
  const support::ScratchFolder folder;
  for (const auto& [channels, bits] : {std::pair{3, 8}, std::pair{3, 16}, std::pair{4, 16}}) {
    const Picture picture = stripes(channels, bits);
    const auto path = folder.path() / "stripes.png";
    write_png(path, picture, tags_at(600));
    const support::ReadImage image = support::read_image(path);
    CHECK(image.width == picture.width);
    REQUIRE(image.values.size() == picture.samples.size());
    CHECK(image.types[0] == (bits == 16 ? "uint16" : "uint8"));
    bool same = true;
    for (std::size_t i = 0; i < image.values.size(); ++i) same = same && image.values[i] == static_cast<float>(picture.samples[i]);
    CHECK(same);
  }
}

TEST_CASE("The same picture gives the same PNG bytes", "[plate][png]") {
  CHECK(encode_png(stripes(4, 16), tags_at(600), "x.png") == encode_png(stripes(4, 16), tags_at(600), "y.png"));
}

TEST_CASE("pngcheck finds no fault in a PNG and reads 600 dpi", "[plate][png]") {
  const support::ScratchFolder folder;
  for (const int channels : {3, 4}) {
    const auto path = folder.path() / "figure.png";
    write_png(path, stripes(channels, channels == 4 ? 16 : 8), tags_at(600));
    const auto opinion = support::ask("pngcheck -v", path);
    if (!opinion) return;
    INFO(opinion->words);
    CHECK(opinion->code == 0);
    CHECK(opinion->words.find("No errors detected") != std::string::npos);
    CHECK(opinion->words.find("23622x23622 pixels/meter (600 dpi)") != std::string::npos);
    CHECK(opinion->words.find("relative colorimetric") != std::string::npos);
  }
}

TEST_CASE("A PNG that cannot be written is an error of files that names it, and leaves nothing behind", "[plate][png]") {
  try {
    write_png("/nowhere/at/all.png", stripes(3, 8), tags_at(600));
    FAIL("written into a folder that does not exist");
  } catch (const diagnostics::FileTrouble& trouble) {
    CHECK(std::string(trouble.what()).find("/nowhere/at") != std::string::npos);
  }
}

TEST_CASE("PNG chunks come apart and together again, and a damaged one is refused", "[plate][png]") {
  CHECK(png_crc("IEND") == 0xae426082u);  // the checksum that ends every PNG file
  const std::string bytes = encode_png(stripes(3, 8), tags_at(600), "x.png");
  CHECK(join_png(split_png(bytes)) == bytes);
  std::string damaged = bytes;
  damaged[bytes.size() / 2] = static_cast<char>(damaged[bytes.size() / 2] ^ 1);
  CHECK_THROWS_AS(split_png(damaged), std::runtime_error);
  CHECK_THROWS_AS(split_png(bytes.substr(0, bytes.size() - 3)), std::runtime_error);
  CHECK_THROWS_AS(split_png("GIF89a"), std::runtime_error);
}

}  // namespace whorl::plate
