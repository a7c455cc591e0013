// SPDX-License-Identifier: Apache-2.0
// Text as a mask of how much of each pixel its ink covers.
#pragma once

#include "plate/font.h"

#include <string>
#include <vector>

namespace whorl::plate {

/// Cropped to the ink. Row-major, top row first.
struct TextMask {
  int width = 0, height = 0;
  int base = 0;  // rows from the top down to the base line
  std::vector<float> coverage;  // 0 .. 1
};

/// One line of UTF-8 text at its exact size, unhinted, so that it has the same proportions at every resolution.
/// Throws FileTrouble where the typeface is missing, cannot be read or lacks a character.
TextMask text_mask(const std::string& text, double points, double resolution_ppi, Weight weight);

}  // namespace whorl::plate
