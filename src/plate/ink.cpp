// SPDX-License-Identifier: Apache-2.0
// Places text and bars on the figure.
#include "plate/ink.h"

#include "plate/text_mask.h"
#include "plate/scale_bar.h"

#include <algorithm>
#include <cmath>

namespace whorl::plate {
namespace {

Ink ink_of(TextMask&& mask, int left, int top) {
  return {{left, top, mask.width, mask.height}, std::move(mask.coverage)};
}

Ink label_ink(const FigurePlan& plan, const LayoutBar& bar) {
  TextMask mask = text_mask(bar_label(bar.length_mm), kLabelPoints, plan.resolution_ppi, Weight::kRegular);
  // Centred over the bar; a label longer than its bar ends with it, away from the figure's edge.
  const double middle = bar.left + 0.5 * bar.length_px;
  const int right_end = static_cast<int>(std::lround(bar.left + bar.length_px));
  const int left = mask.width <= bar.length_px ? static_cast<int>(std::lround(middle - 0.5 * mask.width))
                                               : std::max(0, right_end - mask.width);
  const int top = bar.label_base - mask.base;
  return ink_of(std::move(mask), left, top);
}

Ink words_ink(const FigurePlan& plan, const FigurePanel& panel) {
  TextMask mask = text_mask(panel.label, kLabelPoints, plan.resolution_ppi, Weight::kRegular);
  const int top = panel.label_base - mask.base;
  return ink_of(std::move(mask), panel.label_left, top);
}

}  // namespace

std::vector<Ink> letter_ink(const FigurePlan& plan) {
  std::vector<Ink> letters;
  for (const FigurePanel& panel : plan.panels) {
    if (panel.letter.empty()) {
      letters.emplace_back();
      continue;
    }
    letters.push_back(ink_of(text_mask(panel.letter, kLetterPoints, plan.resolution_ppi, Weight::kBold), panel.letter_left,
                             panel.letter_top));
  }
  return letters;
}

Ink bar_ink(const LayoutBar& bar) {
  Ink ink;
  const int columns = static_cast<int>(std::ceil(bar.length_px));
  ink.place = {bar.left, bar.top, columns, bar.thickness};
  for (int y = 0; y < bar.thickness; ++y)
    for (int x = 0; x < columns; ++x) ink.coverage.push_back(static_cast<float>(std::min(1.0, bar.length_px - x)));
  return ink;
}

std::vector<Ink> all_ink(const FigurePlan& plan) {
  std::vector<Ink> ink = letter_ink(plan);
  for (const FigurePanel& panel : plan.panels)
    if (!panel.label.empty()) ink.push_back(words_ink(plan, panel));
  for (const LayoutBar& bar : plan.bars) {
    ink.push_back(bar_ink(bar));
    ink.push_back(label_ink(plan, bar));
  }
  return ink;
}

}  // namespace whorl::plate
