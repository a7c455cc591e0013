// SPDX-License-Identifier: Apache-2.0
// OpenEXR through OpenImageIO, a band of lines at a time so that a large plate needs no second copy.
#include "plate/image_exr.h"

#include "diagnostics/whole_file.h"
#include "plate/image_library.h"

#include <algorithm>
#include <array>
#include <cstddef>

namespace whorl::plate {
namespace {

using OIIO::TypeDesc;

struct Channel {
  const char* name;
  TypeDesc::BASETYPE type;
};

/// Half for what is seen and for small whole numbers (exact to 2048), float for what is measured.
constexpr std::array<Channel, 16> kChannels = {{
    {"R", TypeDesc::HALF},        {"G", TypeDesc::HALF},        {"B", TypeDesc::HALF},        {"A", TypeDesc::HALF},
    {"Z", TypeDesc::FLOAT},       {"N.X", TypeDesc::FLOAT},     {"N.Y", TypeDesc::FLOAT},     {"N.Z", TypeDesc::FLOAT},
    {"albedo.R", TypeDesc::HALF}, {"albedo.G", TypeDesc::HALF}, {"albedo.B", TypeDesc::HALF}, {"turn", TypeDesc::FLOAT},
    {"around", TypeDesc::FLOAT},  {"part", TypeDesc::HALF},     {"panel", TypeDesc::HALF},
    {"provenance", TypeDesc::HALF},  // only where the specimen states what is preserved
}};
constexpr int kBandLines = 64;         // a multiple of the 16 lines that zip packs together
constexpr float kLargestHalf = 65504.0f;

std::size_t channel_count(const FigurePlan& plan) { return kChannels.size() - (plan.provenance ? 0 : 1); }

OIIO::ImageSpec exr_spec(const FigurePlan& plan, const PictureTags& tags) {
  OIIO::ImageSpec spec(plan.width, plan.height, static_cast<int>(channel_count(plan)), TypeDesc::FLOAT);
  for (std::size_t c = 0; c < channel_count(plan); ++c) {
    spec.channelnames[c] = kChannels[c].name;
    spec.channelformats.emplace_back(kChannels[c].type);
  }
  spec.alpha_channel = 3;
  spec.z_channel = 4;
  // In inches, always: the writer converts centimetres the wrong way round.
  spec.attribute("XResolution", static_cast<float>(tags.resolution_ppi));
  spec.attribute("YResolution", static_cast<float>(tags.resolution_ppi));
  spec.attribute("ResolutionUnit", "in");
  spec.attribute("PixelAspectRatio", 1.0f);
  spec.attribute("compression", "zip:4");
  spec.attribute("DateTime", kNoDate);
  const std::array<float, 8> srgb = {0.64f, 0.33f, 0.30f, 0.60f, 0.15f, 0.06f, 0.3127f, 0.3290f};
  spec.attribute("chromaticities", TypeDesc(TypeDesc::FLOAT, 8), srgb.data());
  if (!tags.description.empty()) spec.attribute("ImageDescription", tags.description);
  if (!tags.copyright.empty()) spec.attribute("Copyright", tags.copyright);
  if (!tags.software.empty()) spec.attribute("Software", tags.software);
  return spec;
}

void fill(const transport::Film& film, std::size_t at, std::size_t panel_number, std::size_t channels, float* out) {
  const transport::PixelFacts& facts = film.facts[at];
  const auto storable = [](float value) { return std::clamp(value, -kLargestHalf, kLargestHalf); };
  const std::array<float, kChannels.size()> values = {
      storable(film.radiance[at].x), storable(film.radiance[at].y), storable(film.radiance[at].z), film.coverage[at],
      facts.depth_mm, facts.normal.x, facts.normal.y, facts.normal.z, facts.albedo.x, facts.albedo.y, facts.albedo.z,
      facts.turn, facts.around_deg, static_cast<float>(facts.part), static_cast<float>(panel_number),
      static_cast<float>(facts.provenance)};
  std::copy_n(values.begin(), channels, out);
}

}  // namespace

void write_exr(const std::filesystem::path& path, const FigurePlan& plan, const std::vector<transport::Film>& films,
               const PictureTags& tags) {
  diagnostics::WholeFile file(path);
  const auto output = image_output("exr", path);
  if (!output->open(file.working_path().string(), exr_spec(plan, tags))) image_trouble(path, output->geterror());
  const std::size_t channels = channel_count(plan), line = static_cast<std::size_t>(plan.width) * channels;
  std::vector<float> band;
  for (int top = 0; top < plan.height; top += kBandLines) {
    const int bottom = std::min(top + kBandLines, plan.height);
    band.assign(line * static_cast<std::size_t>(bottom - top), 0.0f);
    for (std::size_t p = 0; p < films.size(); ++p) {
      const PixelRect& rect = plan.panels[p].rect;
      if (films[p].size() == 0) continue;
      for (int y = std::max(top, rect.y); y < std::min(bottom, rect.bottom()); ++y)
        for (int x = 0; x < rect.width; ++x)
          fill(films[p], films[p].index(x, y - rect.y), p + 1, channels,
               band.data() + line * static_cast<std::size_t>(y - top) + channels * static_cast<std::size_t>(rect.x + x));
    }
    if (!output->write_scanlines(top, bottom, 0, TypeDesc::FLOAT, band.data())) image_trouble(path, output->geterror());
  }
  if (!output->close()) image_trouble(path, output->geterror());
  file.commit();
}

}  // namespace whorl::plate
