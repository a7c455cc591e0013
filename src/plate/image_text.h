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
  int base = 0;  // rows from the top down to the base line; over `height` is possible ("'")
  std::vector<float> coverage;  // 0 .. 1
};

/// One line of UTF-8 text. The size is rounded to whole pixels. Throws FileTrouble where there is no typeface.
TextMask text_mask(const std::string& text, double points, double resolution_ppi, Weight weight);

}  // namespace whorl::plate
