// SPDX-License-Identifier: Apache-2.0
// PNG through OpenImageIO, with the chunks that it gets wrong put right.
#include "plate/image_png.h"

#include "diagnostics/whole_file.h"
#include "plate/image_library.h"
#include "plate/png_chunks.h"

#include <cmath>
#include <stdexcept>
#include <vector>

namespace whorl::plate {
namespace {

constexpr double kMetresPerInch = 0.0254;
/// zlib's own default, named so that the bytes do not hang on the library's.
constexpr int kCompressionLevel = 6;
/// sRGB rendering intent 1, relative colorimetric: white stays the paper's white. The library writes 3, absolute, which asks a
/// printer to tint the paper.
constexpr char kRelativeColorimetric = 1;

/// The writer's own hints as text, an offset of nought, whatever a later version adds: no business of the reader's.
bool is_wanted(const std::string& chunk_type) {
  for (const char* type : {"IHDR", "gAMA", "sRGB", "cHRM", "pHYs", "IDAT", "IEND"})
    if (chunk_type == type) return true;
  return false;
}

OIIO::ImageSpec png_spec(const Picture& picture, const PictureTags& tags) {
  OIIO::ImageSpec spec(picture.width, picture.height, picture.channels,
                       picture.bits == 16 ? OIIO::TypeDesc::UINT16 : OIIO::TypeDesc::UINT8);
  // In pixels a metre, since the writer truncates where it converts from inches: 96 ppi would become 3779, not 3780.
  const float per_metre = static_cast<float>(std::round(tags.resolution_ppi / kMetresPerInch));
  spec.attribute("XResolution", per_metre);
  spec.attribute("YResolution", per_metre);
  spec.attribute("ResolutionUnit", "m");
  spec.attribute("oiio:ColorSpace", "sRGB");
  spec.attribute("png:compressionLevel", kCompressionLevel);
  // The samples are straight already; the writer would otherwise divide by alpha after rounding.
  if (picture.channels == 4) spec.attribute("oiio:UnassociatedAlpha", 1);
  return spec;
}

std::vector<unsigned char> library_png(const Picture& picture, const PictureTags& tags, const std::filesystem::path& path) {
  const auto output = image_output("png", path);
  std::vector<unsigned char> bytes;
  OIIO::Filesystem::IOVecOutput memory(bytes);
  if (!output->set_ioproxy(&memory) || !output->open("any.png", png_spec(picture, tags)))
    image_trouble(path, output->geterror());
  std::vector<unsigned char> narrow;
  const std::size_t row = static_cast<std::size_t>(picture.width) * static_cast<std::size_t>(picture.channels);
  for (int y = 0; y < picture.height; ++y) {
    const std::uint16_t* samples = picture.samples.data() + picture.index(0, y);
    bool good = false;
    if (picture.bits == 16) {
      good = output->write_scanline(y, 0, OIIO::TypeDesc::UINT16, samples);
    } else {
      narrow.assign(row, 0);
      for (std::size_t i = 0; i < row; ++i) narrow[i] = static_cast<unsigned char>(samples[i]);
      good = output->write_scanline(y, 0, OIIO::TypeDesc::UINT8, narrow.data());
    }
    if (!good) image_trouble(path, output->geterror());
  }
  if (!output->close()) image_trouble(path, output->geterror());
  return bytes;
}

}  // namespace

std::string encode_png(const Picture& picture, const PictureTags& tags, const std::filesystem::path& path) {
  const std::vector<unsigned char> bytes = library_png(picture, tags, path);
  std::vector<PngChunk> chunks;
  try {
    bool texts_written = false;
    for (PngChunk& chunk : split_png({reinterpret_cast<const char*>(bytes.data()), bytes.size()})) {
      if (!is_wanted(chunk.type)) continue;
      if (chunk.type == "sRGB") chunk.data.assign(1, kRelativeColorimetric);
      if (chunk.type == "IDAT" && !texts_written) {
        texts_written = true;
        if (!tags.title.empty()) chunks.push_back(png_text("Title", tags.title));
        if (!tags.description.empty()) chunks.push_back(png_text("Description", tags.description));
        if (!tags.copyright.empty()) chunks.push_back(png_text("Copyright", tags.copyright));
        if (!tags.software.empty()) chunks.push_back(png_text("Software", tags.software));
      }
      chunks.push_back(std::move(chunk));
    }
  } catch (const std::runtime_error& error) {
    image_trouble(path, error.what());
  }
  return join_png(chunks);
}

void write_png(const std::filesystem::path& path, const Picture& picture, const PictureTags& tags) {
  diagnostics::write_whole_file(path, encode_png(picture, tags, path));
}

}  // namespace whorl::plate
