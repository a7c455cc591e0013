// SPDX-License-Identifier: Apache-2.0
// Timing of contenders on the same rays, and the error of their hits.
#pragma once

#include "contender.h"
#include "field/field.h"
#include "ray_sets.h"

#include <array>
#include <vector>

namespace whorl::bench {

inline constexpr int kKinds = 3;
inline constexpr std::array<const char*, kKinds> kKindNames = {"camera", "scattered", "shadow"};

struct Result {
  /// By processor time, all threads together: what the rate is where nothing else runs. The best round.
  std::array<double, kKinds> rays_per_second{};
  std::array<double, kKinds> rays_per_wall_second{};  // of the same round
  std::array<double, kKinds> ratio{};            // to the first contender's, by processor time, the median of the rounds' own ratios
  std::array<double, kKinds> hit_share{};
  double error_median_mm = 0.0, error_99_mm = 0.0;
  std::size_t lost = 0;  // hits with no surface within a tenth of a half-breadth, left out of the error
};

/// Every round gives every contender all kinds of rays, one after the other, so that what else the machine does falls on all.
std::vector<Result> race(const std::vector<const Contender*>& contenders, const RaySets& rays, int rounds);

/// Distance from hits to the true surface along their normal, found by bisection on the field itself (an upper bound of the
/// distance). Half of the hits are of camera rays, half of scattered ones.
void measure_error(const field::Field& field, const Contender& contender, const RaySets& rays, std::size_t hits, Result& result);

}  // namespace whorl::bench
