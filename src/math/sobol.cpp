// SPDX-License-Identifier: Apache-2.0
// The Sobol generator matrices and the padded, scrambled stream built on them.
#include "math/sobol.h"

namespace whorl {
namespace {

using Point = std::array<std::uint32_t, kSobolDimensions>;

/// A primitive polynomial and its first direction integers, as listed for dimensions 2 to 4 in the file
/// new-joe-kuo-6.21201 of Joe & Kuo 2008, Constructing Sobol Sequences with Better Two-Dimensional Projections,
/// SIAM J. Sci. Comput. 30(5).
struct Direction {
  std::uint32_t degree, coefficients;
  std::uint32_t first[3];
};
constexpr Direction kDirections[] = {{1, 0, {1, 0, 0}}, {2, 1, {1, 3, 0}}, {3, 1, {1, 3, 1}}};

/// Column k of every dimension's generator matrix: the point of index 2^k.
constexpr std::array<Point, 32> generator_columns() {
  std::array<Point, 32> columns{};
  for (std::uint32_t k = 0; k < 32; ++k) columns[k][0] = 1u << (31u - k);
  for (std::uint32_t dimension = 1; dimension < kSobolDimensions; ++dimension) {
    const Direction& d = kDirections[dimension - 1];
    for (std::uint32_t k = 0; k < 32; ++k) {
      if (k < d.degree) {
        columns[k][dimension] = d.first[k] << (31u - k);
        continue;
      }
      std::uint32_t v = columns[k - d.degree][dimension];
      v ^= v >> d.degree;
      for (std::uint32_t j = 1; j < d.degree; ++j)
        if ((d.coefficients >> (d.degree - 1u - j)) & 1u) v ^= columns[k - j][dimension];
      columns[k][dimension] = v;
    }
  }
  return columns;
}

/// The sums of columns for each value of each of the four bytes of an index: a point costs four look-ups.
using ByteTables = std::array<std::array<Point, 256>, 4>;
constexpr ByteTables byte_tables() {
  const std::array<Point, 32> columns = generator_columns();
  ByteTables tables{};
  for (std::uint32_t byte = 0; byte < 4; ++byte)
    for (std::uint32_t value = 1; value < 256; ++value) {
      const std::uint32_t rest = value & (value - 1);
      std::uint32_t lowest = 0;
      while (!((value >> lowest) & 1u)) ++lowest;
      for (std::uint32_t d = 0; d < kSobolDimensions; ++d)
        tables[byte][value][d] = tables[byte][rest][d] ^ columns[8 * byte + lowest][d];
    }
  return tables;
}
constexpr ByteTables kTables = byte_tables();

}  // namespace

Point sobol_point(std::uint32_t index) noexcept {
  const Point& a = kTables[0][index & 255u];
  const Point& b = kTables[1][(index >> 8) & 255u];
  const Point& c = kTables[2][(index >> 16) & 255u];
  const Point& d = kTables[3][index >> 24];
  return {a[0] ^ b[0] ^ c[0] ^ d[0], a[1] ^ b[1] ^ c[1] ^ d[1], a[2] ^ b[2] ^ c[2] ^ d[2], a[3] ^ b[3] ^ c[3] ^ d[3]};
}

SobolStream::SobolStream(const SampleKey& key) noexcept
    : key_(hash_with(hash_with(hash_with(key.seed, key.panel), (std::uint64_t{key.y} << 32) | key.x), key.replicate)) {}

std::array<float, kSobolDimensions> SobolStream::block(std::uint32_t number) const noexcept {
  std::uint64_t seed = hash_with(key_, number);
  // Shuffling the index by a nested scramble moves aligned runs of 2^m points to aligned runs: still a net.
  const Point point = sobol_point(owen_scramble(index_, seed));
  std::array<float, kSobolDimensions> out;
  for (std::size_t d = 0; d < kSobolDimensions; ++d) {
    seed = mix64(seed + 0x9e3779b97f4a7c15ull);
    out[d] = unit_float(owen_scramble(point[d], seed));
  }
  return out;
}

}  // namespace whorl
