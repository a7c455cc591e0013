// SPDX-License-Identifier: Apache-2.0
// TIFF 6.0 through OpenImageIO.
#include "plate/image_tiff.h"

#include "diagnostics/whole_file.h"
#include "plate/icc_profile.h"
#include "plate/image_library.h"

#include <algorithm>
#include <vector>

namespace whorl::plate {
namespace {

OIIO::ImageSpec tiff_spec(const Picture& picture, const PictureTags& tags) {
  OIIO::ImageSpec spec(picture.width, picture.height, picture.channels,
                       picture.bits == 16 ? OIIO::TypeDesc::UINT16 : OIIO::TypeDesc::UINT8);
  const float resolution = static_cast<float>(tags.resolution_ppi);
  spec.attribute("XResolution", resolution);
  spec.attribute("YResolution", resolution);
  // Without it the writer derives the second resolution from the first by an aspect of its own.
  spec.attribute("PixelAspectRatio", 1.0f);
  spec.attribute("ResolutionUnit", "in");
  spec.attribute("compression", "lzw");
  spec.attribute("DateTime", kNoDate);
  if (picture.channels == 4) spec.attribute("oiio:UnassociatedAlpha", 1);
  if (!tags.title.empty()) spec.attribute("DocumentName", tags.title);
  if (!tags.description.empty()) spec.attribute("ImageDescription", tags.description);
  if (!tags.copyright.empty()) spec.attribute("Copyright", tags.copyright);
  if (!tags.software.empty()) spec.attribute("Software", tags.software);
  const std::string profile = srgb_profile();
  spec.attribute("ICCProfile", OIIO::TypeDesc(OIIO::TypeDesc::UINT8, static_cast<int>(profile.size())), profile.data());
  return spec;
}

}  // namespace

void write_tiff(const std::filesystem::path& path, const Picture& picture, const PictureTags& tags) {
  diagnostics::WholeFile file(path);
  const auto output = image_output("tif", path);
  if (!output->open(file.working_path().string(), tiff_spec(picture, tags))) image_trouble(path, output->geterror());
  const std::size_t row = static_cast<std::size_t>(picture.width) * static_cast<std::size_t>(picture.channels);
  std::vector<unsigned char> narrow(picture.bits == 16 ? 0 : row);
  for (int y = 0; y < picture.height; ++y) {
    const std::uint16_t* samples = picture.samples.data() + picture.index(0, y);
    bool good = false;
    if (picture.bits == 16) {
      good = output->write_scanline(y, 0, OIIO::TypeDesc::UINT16, samples);
    } else {
      std::transform(samples, samples + row, narrow.begin(), [](std::uint16_t s) { return static_cast<unsigned char>(s); });
      good = output->write_scanline(y, 0, OIIO::TypeDesc::UINT8, narrow.data());
    }
    if (!good) image_trouble(path, output->geterror());
  }
  if (!output->close()) image_trouble(path, output->geterror());
  file.commit();
}

}  // namespace whorl::plate
