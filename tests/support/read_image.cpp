// SPDX-License-Identifier: Apache-2.0
// Reads back through OpenImageIO, with alpha left as it stands in the file.
#include "support/read_image.h"

#include "support/catch.h"

#include <OpenImageIO/imageio.h>

#include <algorithm>
#include <cmath>

namespace whorl::support {

std::size_t ReadImage::channel(const std::string& name) const {
  const auto found = std::find(channels.begin(), channels.end(), name);
  INFO("channel " << name);
  REQUIRE(found != channels.end());
  return static_cast<std::size_t>(found - channels.begin());
}

ReadImage read_image(const std::filesystem::path& path) {
  INFO(path.string());
  OIIO::ImageSpec as_stored;
  as_stored.attribute("oiio:UnassociatedAlpha", 1);
  const auto input = OIIO::ImageInput::open(path.string(), &as_stored);
  REQUIRE(input);
  const OIIO::ImageSpec spec = input->spec();
  ReadImage image;
  image.width = spec.width;
  image.height = spec.height;
  float scale = 1.0f;
  for (int c = 0; c < spec.nchannels; ++c) {
    image.channels.push_back(spec.channelnames[static_cast<std::size_t>(c)]);
    image.types.emplace_back(spec.channelformat(c).c_str());
  }
  if (spec.format == OIIO::TypeDesc::UINT8) scale = 255.0f;
  if (spec.format == OIIO::TypeDesc::UINT16) scale = 65535.0f;
  image.values.resize(static_cast<std::size_t>(spec.image_pixels()) * static_cast<std::size_t>(spec.nchannels));
  REQUIRE(input->read_image(0, 0, 0, spec.nchannels, OIIO::TypeDesc::FLOAT, image.values.data()));
  if (scale != 1.0f)
    for (float& value : image.values) value = std::round(value * scale);
  return image;
}

}  // namespace whorl::support
