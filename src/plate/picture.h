// SPDX-License-Identifier: Apache-2.0
// The composed figure as it is printed, and what its file says beside the pixels.
#pragma once

#include <cstddef>
#include <cstdint>
#include <string>
#include <vector>

namespace whorl::plate {

/// sRGB-encoded, top row first, channels interleaved; alpha, if any, is linear and straight (colours are not multiplied by it).
struct Picture {
  int width = 0, height = 0;
  int channels = 3;                    // 3, or 4 with alpha
  int bits = 8;                        // 8 or 16 of each sample are used
  std::vector<std::uint16_t> samples;  // 0 .. 2^bits - 1

  std::size_t index(int x, int y) const {
    return (static_cast<std::size_t>(y) * static_cast<std::size_t>(width) + static_cast<std::size_t>(x)) *
           static_cast<std::size_t>(channels);
  }
};

/// UTF-8 throughout; an empty text is left out of the file.
struct PictureTags {
  double resolution_ppi = 600.0;
  std::string title, description, copyright, software;
};

}  // namespace whorl::plate
