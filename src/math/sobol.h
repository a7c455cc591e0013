// SPDX-License-Identifier: Apache-2.0
// Owen-scrambled Sobol points in padded blocks of four dimensions, keyed by place and purpose.
//
// Method: Burley 2020, Practical Hash-based Owen Scrambling, JCGT 9(4). Use a power of two of points and keep all of
// them, point 0 too: any part of the net is less even than the whole (Owen 2020, On Dropping the First Sobol' Point).
#pragma once

#include "math/hash.h"

#include <array>
#include <cstdint>

namespace whorl {

inline constexpr int kSobolDimensions = 4;

/// Point `index` of the four-dimensional Sobol sequence in natural (not Gray code) order, each coordinate times 2^32.
std::array<std::uint32_t, kSobolDimensions> sobol_point(std::uint32_t index) noexcept;

/// Reverses the order of the bits: bit 0 becomes bit 31.
constexpr std::uint32_t reverse_bits(std::uint32_t v) noexcept {
  v = (v >> 16) | (v << 16);
  v = ((v & 0xff00ff00u) >> 8) | ((v & 0x00ff00ffu) << 8);
  v = ((v & 0xf0f0f0f0u) >> 4) | ((v & 0x0f0f0f0fu) << 4);
  v = ((v & 0xccccccccu) >> 2) | ((v & 0x33333333u) << 2);
  return ((v & 0xaaaaaaaau) >> 1) | ((v & 0x55555555u) << 1);
}

/// Owen's nested uniform scrambling of a binary fraction (bit 31 = one half): whether a bit flips depends on all
/// higher bits and on the seed, on nothing else. A bijection for each seed.
constexpr std::uint32_t owen_scramble(std::uint32_t fraction, std::uint64_t seed) noexcept {
  // On reversed bits every step carries information upwards only: products with even constants, additions, odd factors.
  // The constants are digits of pi made 2 modulo 4; the test measures that flips are fair and independent.
  std::uint32_t v = reverse_bits(fraction);
  v ^= v * 0x243f6a8au;
  v += low_word(seed);
  v *= high_word(seed) | 1u;
  v ^= v * 0x85a308d2u;
  v ^= v * 0x13198a2eu;
  return reverse_bits(v);
}

/// What makes one stream of points differ from every other.
struct SampleKey {
  std::uint32_t x = 0, y = 0;       // pixel
  std::uint32_t panel = 0;          // number of the picture on the plate
  std::uint32_t replicate = 0;      // independent repetitions give an honest error estimate
  std::uint64_t seed = 0;
};

/// The points of one key. Blocks are independent of one another; within a block the four coordinates of the points
/// 0 .. 2^m - 1 form a scrambled Sobol net.
class SobolStream {
 public:
  explicit SobolStream(const SampleKey& key) noexcept;
  /// Chooses the point that later calls of `block` speak of.
  void set_point(std::uint32_t index) noexcept { index_ = index; }
  /// Four numbers in [0, 1).
  std::array<float, kSobolDimensions> block(std::uint32_t number) const noexcept;

 private:
  std::uint64_t key_;
  std::uint32_t index_ = 0;
};

}  // namespace whorl
