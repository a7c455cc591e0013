// SPDX-License-Identifier: Apache-2.0
// How like things of a row differ from one another, from a stated seed.
#pragma once

#include "math/hash.h"

namespace whorl::growth {

/// At irregularity 1 places shift by up to kMostShift of their spacing and sizes vary by up to kMostVariation of themselves.
inline constexpr double kMostShift = 0.25, kMostVariation = 0.5;

struct Deviation {
  double shift;  // in spacings
  double scale;  // of the size
};

/// Of the thing of that number in its row; irregularity 0 .. 1.
inline Deviation deviation(std::uint64_t seed, std::int64_t number, double irregularity) {
  if (irregularity == 0.0) return {0.0, 1.0};
  const std::uint64_t word = hash_with(seed, static_cast<std::uint64_t>(number));
  const auto centred = [](std::uint32_t half) { return 2.0 * static_cast<double>(unit_float(half)) - 1.0; };
  return {kMostShift * irregularity * centred(low_word(word)), 1.0 + kMostVariation * irregularity * centred(high_word(word))};
}

}  // namespace whorl::growth
