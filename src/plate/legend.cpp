// SPDX-License-Identifier: Apache-2.0
// Places swatches and words, and gives way to everything else.
#include "plate/legend.h"

#include "plate/text_mask.h"
#include "plate/unobserved.h"

#include <algorithm>
#include <array>
#include <cmath>

namespace whorl::plate {
namespace {

using specimen::Provenance;

/// Lengths on paper, mm.
constexpr double kSwatchWidth = 5.0, kSwatchHeight = 2.6, kAfterSwatch = 1.0, kBetween = 4.0, kMargin = 0.3, kClear = 0.6;

bool overlap(const PixelRect& a, const PixelRect& b) { return a.x < b.right() && b.x < a.right() && a.y < b.bottom() && b.y < a.bottom(); }

// Which of them the pictures show.
std::array<bool, specimen::kProvenances> shown(const FigurePlan& plan, const std::vector<transport::Film>& films) {
  std::array<bool, specimen::kProvenances> seen{};
  for (std::size_t i = 0; i < films.size(); ++i) {
    if (!tells_unobserved(plan, plan.panels[i])) continue;
    for (const transport::PixelFacts& facts : films[i].facts) seen[facts.provenance] = true;
  }
  return seen;
}

bool stands_free(const PixelRect& place, const FigurePlan& plan, const std::vector<transport::Film>& films) {
  for (const Ink& ink : all_ink(plan))
    if (overlap(place, ink.place)) return false;
  for (std::size_t i = 0; i < films.size(); ++i) {
    const PixelRect& rect = plan.panels[i].rect;
    if (films[i].size() == 0) continue;
    for (int y = std::max(place.y, rect.y); y < std::min(place.bottom(), rect.bottom()); ++y)
      for (int x = std::max(place.x, rect.x); x < std::min(place.right(), rect.right()); ++x)
        if (films[i].coverage[films[i].index(x - rect.x, y - rect.y)] > 0.0f) return false;
  }
  return true;
}

}  // namespace

std::vector<LegendEntry> legend_of(const FigurePlan& plan, const std::vector<transport::Film>& films) {
  const auto seen = shown(plan, films);
  const auto px = [&plan](double mm) { return static_cast<int>(std::lround(mm * plan.resolution_ppi / kMmPerInch)); };
  std::vector<LegendEntry> entries;
  int left = px(kMargin);
  const int base = plan.height - px(kMargin) - px(0.4);
  for (const Provenance one : {Provenance::kInterpolated, Provenance::kExtrapolated, Provenance::kAssumed}) {
    if (!seen[static_cast<std::size_t>(one)]) continue;
    LegendEntry entry;
    entry.provenance = one;
    entry.swatch = {left, base - px(kSwatchHeight) + px(0.3), px(kSwatchWidth), px(kSwatchHeight)};
    TextMask mask = text_mask(provenance_word(one), kLabelPoints, plan.resolution_ppi, Weight::kRegular);
    entry.words.place = {entry.swatch.right() + px(kAfterSwatch), base - mask.base, mask.width, mask.height};
    entry.words.coverage = std::move(mask.coverage);
    left = entry.words.place.right() + px(kBetween);
    entries.push_back(std::move(entry));
  }
  if (entries.empty()) return entries;
  const int top = entries.front().swatch.y - px(kClear), right = entries.back().words.place.right() + px(kClear);
  if (top < 0 || right > plan.width || !stands_free({0, top, right, plan.height - top}, plan, films)) return {};
  return entries;
}

}  // namespace whorl::plate
