// SPDX-License-Identifier: Apache-2.0
// Which stations carry a growth angle, and with which weights.
#pragma once

#include "scene/scene.h"

#include <algorithm>
#include <cmath>

namespace whorl::field {

/// The four stations around a growth angle and their cubic B-spline weights, which add up to one.
struct StationWeights {
  std::ptrdiff_t first;
  double weight[4];
};

inline StationWeights stations_at(const scene::Scene& scene, double theta) {
  const auto count = static_cast<std::ptrdiff_t>(scene.stations.size());
  const double x = std::clamp((theta - scene.first_station_theta) / scene::kStationSpacing, 1.0,
                              static_cast<double>(count - 3) + 0.999999);
  const double floor_x = std::floor(x), f = x - floor_x, g = 1.0 - f;
  return {static_cast<std::ptrdiff_t>(floor_x) - 1,
          {g * g * g / 6.0, (4.0 + f * f * (3.0 * f - 6.0)) / 6.0, (4.0 + g * g * (3.0 * g - 6.0)) / 6.0,
           f * f * f / 6.0}};
}

}  // namespace whorl::field
