// SPDX-License-Identifier: Apache-2.0
// Integer hashing: the only source of randomness, so that every number is a pure function of its key.
#pragma once

#include <cstdint>

namespace whorl {

/// A bijection of 64-bit words in which each input bit changes each output bit with a probability near one half.
/// Finaliser "Mix13" of Steele, Lea, Flood 2014, Fast Splittable Pseudorandom Number Generators, OOPSLA.
constexpr std::uint64_t mix64(std::uint64_t z) noexcept {
  z = (z ^ (z >> 30)) * 0xbf58476d1ce4e5b9ull;
  z = (z ^ (z >> 27)) * 0x94d049bb133111ebull;
  return z ^ (z >> 31);
}

/// Adds one word to a key; the order of words matters. 2^64 / golden ratio keeps zero words from being absorbed.
constexpr std::uint64_t hash_with(std::uint64_t key, std::uint64_t word) noexcept {
  return mix64(key + 0x9e3779b97f4a7c15ull + mix64(word));
}

constexpr std::uint32_t low_word(std::uint64_t v) noexcept { return static_cast<std::uint32_t>(v); }
constexpr std::uint32_t high_word(std::uint64_t v) noexcept { return static_cast<std::uint32_t>(v >> 32); }

/// The top 24 bits as a float in [0, 1): exact, so 1 is never reached.
constexpr float unit_float(std::uint32_t bits) noexcept { return static_cast<float>(bits >> 8) * 0x1p-24f; }

}  // namespace whorl
