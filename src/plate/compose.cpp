// SPDX-License-Identifier: Apache-2.0
// The order of work in which a figure is developed, row by row.
#include "plate/compose.h"

#include "math/parallel.h"
#include "plate/ink.h"
#include "plate/legend.h"
#include "plate/unobserved.h"
#include "shaders_cpu/tone/curve.h"
#include "shaders_cpu/tone/srgb.h"

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace whorl::plate {
namespace {

using specimen::Background;

/// Less coverage than this is none: half a step of 16 bits.
constexpr double kNoCoverage = 0.5 / 65535.0;
/// A pixel of a picture counts as covered for the letters' sake from here on.
constexpr float kSeenCoverage = 0.05f;

/// Display-linear colour, multiplied by alpha.
struct Light {
  Vec3 colour{0.0};
  double alpha = 0.0;

  void put_over(const Vec3& straight, double cover) {
    colour = colour * (1.0 - cover) + straight * cover;
    alpha = alpha * (1.0 - cover) + cover;
  }
};

Light ground_light(Background ground) {
  switch (ground) {
    case Background::kWhite: return {Vec3(1.0), 1.0};
    case Background::kBlack: return {Vec3(0.0), 1.0};
    case Background::kClear: break;
  }
  return {};
}

double positive(double value) { return value > 0.0 ? value : 0.0; }  // 0 for a value that is no number

/// The display-linear colour of the shell in a pixel: the tone curve acts on its own radiance, not on the share of the pixel
/// that it covers, so that an outline has the same tone on every ground.
Vec3 developed(const Vec3f& radiance, double cover) {
  const Vec3 own(positive(radiance.x) / cover, positive(radiance.y) / cover, positive(radiance.z) / cover);
  const Vec3 shown = shaders_cpu::tone(own);
  return {std::min(shown.x, 1.0), std::min(shown.y, 1.0), std::min(shown.z, 1.0)};
}

void put_film(const FigurePlan& plan, const FigurePanel& panel, const transport::Film& film, int y, std::vector<Light>& row) {
  if (film.size() == 0 || y < panel.rect.y || y >= panel.rect.bottom()) return;
  const UnobservedStyle style(plan, panel);
  for (int x = 0; x < panel.rect.width; ++x) {
    const std::size_t at = film.index(x, y - panel.rect.y);
    const double cover = std::min(1.0, positive(film.coverage[at]));
    if (cover < kNoCoverage) continue;
    const Vec3 seen = developed(film.radiance[at], cover);
    row[static_cast<std::size_t>(panel.rect.x + x)].put_over(style.drawn(seen, film.facts[at], panel.rect.x + x, y), cover);
  }
}

void put_swatch(const FigurePlan& plan, const LegendEntry& entry, int y, std::vector<Light>& row) {
  if (y < entry.swatch.y || y >= entry.swatch.bottom()) return;
  const UnobservedStyle style(plan, {});
  transport::PixelFacts facts;
  facts.provenance = static_cast<std::uint8_t>(entry.provenance);
  for (int x = entry.swatch.x; x < entry.swatch.right(); ++x)
    row[static_cast<std::size_t>(x)].put_over(style.drawn(Vec3(kSwatchTone), facts, x, y), 1.0);
}

void put_ink(const Ink& ink, const Vec3& colour, int y, std::vector<Light>& row) {
  if (y < ink.place.y || y >= ink.place.bottom()) return;
  const std::size_t from = static_cast<std::size_t>(y - ink.place.y) * static_cast<std::size_t>(ink.place.width);
  for (int x = 0; x < ink.place.width; ++x) {
    const int at = ink.place.x + x;
    if (at < 0 || at >= static_cast<int>(row.size())) continue;
    row[static_cast<std::size_t>(at)].put_over(colour, ink.coverage[from + static_cast<std::size_t>(x)]);
  }
}

void store(const std::vector<Light>& row, int y, Picture& picture) {
  const double top = picture.bits == 16 ? 65535.0 : 255.0;
  const auto quantised = [top](double value) { return static_cast<std::uint16_t>(std::lround(value * top)); };
  std::uint16_t* out = picture.samples.data() + picture.index(0, y);
  for (const Light& light : row) {
    const bool straighten = picture.channels == 4 && light.alpha > 0.0;
    const Vec3 straight = straighten ? light.colour / light.alpha : light.colour;
    for (int c = 0; c < 3; ++c) *out++ = quantised(shaders_cpu::srgb_encode(std::clamp(straight[c], 0.0, 1.0)));
    if (picture.channels == 4) *out++ = quantised(std::clamp(light.alpha, 0.0, 1.0));
  }
}

void check(const FigurePlan& plan, const std::vector<transport::Film>& films) {
  bool fits = films.size() == plan.panels.size();
  for (std::size_t i = 0; fits && i < films.size(); ++i)
    fits = films[i].size() == 0 ||
           (films[i].width == plan.panels[i].rect.width && films[i].height == plan.panels[i].rect.height);
  if (!fits) throw std::logic_error("compose: the films do not go with the plan's panels");
}

}  // namespace

Picture compose(const FigurePlan& plan, const std::vector<transport::Film>& films, Background ground) {
  check(plan, films);
  std::vector<Ink> inks = all_ink(plan);
  const std::vector<LegendEntry> legend = legend_of(plan, films);
  for (const LegendEntry& entry : legend) inks.push_back(entry.words);
  const Light paper = ground_light(ground);
  const Vec3 ink_colour(ground == Background::kBlack ? 1.0 : 0.0);

  Picture picture;
  picture.width = plan.width;
  picture.height = plan.height;
  picture.channels = ground == Background::kClear ? 4 : 3;
  picture.bits = ground == Background::kClear ? 16 : 8;
  picture.samples.resize(picture.index(0, plan.height));
  parallel_for(static_cast<std::size_t>(plan.height), 16, [&](std::size_t line) {
    const int y = static_cast<int>(line);
    std::vector<Light> row(static_cast<std::size_t>(plan.width), paper);
    for (std::size_t i = 0; i < films.size(); ++i) put_film(plan, plan.panels[i], films[i], y, row);
    for (const LegendEntry& entry : legend) put_swatch(plan, entry, y, row);
    for (const Ink& ink : inks) put_ink(ink, ink_colour, y, row);
    store(row, y, picture);
  });
  return picture;
}

std::vector<int> letters_over_pictures(const FigurePlan& plan, const std::vector<transport::Film>& films) {
  check(plan, films);
  const std::vector<Ink> letters = letter_ink(plan);
  std::vector<int> found;
  for (std::size_t i = 0; i < letters.size(); ++i) {
    const PixelRect& place = letters[i].place;
    const FigurePanel& panel = plan.panels[i];
    bool over = false;
    for (int y = place.y; y < place.bottom() && !over; ++y)
      for (int x = place.x; x < place.right() && !over; ++x) {
        const int film_x = x - panel.rect.x, film_y = y - panel.rect.y;
        const bool inside = film_x >= 0 && film_y >= 0 && film_x < films[i].width && film_y < films[i].height;
        over = inside && films[i].coverage[films[i].index(film_x, film_y)] > kSeenCoverage;
      }
    if (over) found.push_back(static_cast<int>(i));
  }
  return found;
}

}  // namespace whorl::plate
