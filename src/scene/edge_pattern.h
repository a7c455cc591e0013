// SPDX-License-Identifier: Apache-2.0
// A colour pattern computed along the growing edge, as a picture over growth and the way round the section.
#pragma once

#include "math/vec.h"

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <vector>

namespace whorl::scene {

/// Activator over its steady level. Columns follow growth (whorls, along growth lines), rows the edge in equal lengths of arc from
/// the section angle 0 round the section.
struct EdgePattern {
  static constexpr int kAngles = 512;         // entries of `arc`
  static constexpr float kLargest = 8.0f;     // level that the largest stored number stands for

  double first_turn = 0.0, columns_per_turn = 1.0;
  int columns = 0, nodes = 0;
  std::vector<std::uint16_t> levels;  // columns x nodes
  std::vector<float> arc;             // share of the edge passed at section angle 2 pi i / kAngles, kAngles + 1 of them

  /// Between the nodes straight in both directions; before the first column and after the last one their values.
  float level(double turn, double around_rad) const {
    const double angle = around_rad / kTwoPi - std::floor(around_rad / kTwoPi);
    const double place = angle * kAngles;
    const auto i = static_cast<std::size_t>(std::clamp(place, 0.0, kAngles - 1e-9));
    const double share = arc[i] + (arc[i + 1] - arc[i]) * (place - static_cast<double>(i));
    const double x = std::clamp((turn - first_turn) * columns_per_turn, 0.0, static_cast<double>(columns - 1));
    const double y = share * nodes;
    const int c = std::min(static_cast<int>(x), std::max(0, columns - 2)), r = static_cast<int>(std::floor(y)) % nodes;
    const double fx = std::min(1.0, x - c), fy = y - std::floor(y);
    const auto at = [&](int column, int row) {
      const int kept = std::min(column, columns - 1);
      return levels[static_cast<std::size_t>(kept) * static_cast<std::size_t>(nodes) + static_cast<std::size_t>(row % nodes)] *
             (static_cast<double>(kLargest) / 65535.0);
    };
    const double low = at(c, r) + (at(c, r + 1) - at(c, r)) * fy, high = at(c + 1, r) + (at(c + 1, r + 1) - at(c + 1, r)) * fy;
    return static_cast<float>(low + (high - low) * fx);
  }
};

}  // namespace whorl::scene
