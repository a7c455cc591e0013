// SPDX-License-Identifier: Apache-2.0
// The ink on a figure: its letters, scale bars and labels as masks with their places.
#pragma once

#include "plate/figure_plan.h"

#include <vector>

namespace whorl::plate {

/// How much of each pixel is inked, 0 .. 1; row-major, `place` in the figure's pixels.
struct Ink {
  PixelRect place;
  std::vector<float> coverage;
};

/// The letter of each panel, in the panels' order; of no size where it has none.
std::vector<Ink> letter_ink(const FigurePlan& plan);

/// A bar with exact coverage: its inked width, summed along a row, is its length in pixels.
Ink bar_ink(const LayoutBar& bar);

/// Everything: letters, bars, their labels and those of panels.
std::vector<Ink> all_ink(const FigurePlan& plan);

}  // namespace whorl::plate
