// SPDX-License-Identifier: Apache-2.0
// The Sobol points, their scrambling, and the streams that pixels draw from.
#include "math/sobol.h"

#include "support/catch.h"
#include "support/statistics.h"
#include "support/table.h"

#include <cmath>
#include <set>

using namespace whorl;

namespace {

constexpr double kTwoTo32 = 4294967296.0;

std::vector<std::array<double, 4>> points_of(const SampleKey& key, std::uint32_t block, int log_count) {
  SobolStream stream(key);
  std::vector<std::array<double, 4>> points;
  for (std::uint32_t i = 0; i < (1u << log_count); ++i) {
    stream.set_point(i);
    const auto p = stream.block(block);
    points.push_back({p[0], p[1], p[2], p[3]});
  }
  return points;
}

/// Largest number of points in any elementary interval of area 2^-m over two dimensions; 1 for a (0, m, 2) net.
int fullest_interval(const std::vector<std::array<double, 4>>& points, int log_count, int a, int b) {
  int fullest = 0;
  for (int across = 0; across <= log_count; ++across) {
    const int down = log_count - across;
    std::vector<int> filled(points.size(), 0);
    for (const auto& p : points) {
      const auto column = static_cast<std::size_t>(std::ldexp(p[static_cast<std::size_t>(a)], across));
      const auto row = static_cast<std::size_t>(std::ldexp(p[static_cast<std::size_t>(b)], down));
      fullest = std::max(fullest, ++filled[(row << across) + column]);
    }
  }
  return fullest;
}

}  // namespace

TEST_CASE("Unscrambled Sobol points are those of Joe and Kuo's direction numbers", "[sobol]") {
  // tests/data/sobol_joe_kuo_4d.csv: scipy.stats.qmc.Sobol(4, scramble=False, bits=32) of SciPy 1.10.1, which uses
  // new-joe-kuo-6.21201 and counts in Gray code.
  const auto rows = test::read_table("sobol_joe_kuo_4d.csv");
  REQUIRE(rows.size() == 72);
  for (const auto& row : rows) {
    const auto i = static_cast<std::uint32_t>(std::stoul(row[0]));
    const auto point = sobol_point(i ^ (i >> 1));
    for (std::size_t d = 0; d < 4; ++d) CHECK(point[d] / kTwoTo32 == std::stod(row[d + 1]));
  }
}

TEST_CASE("The first two dimensions put one point into each elementary interval, scrambled too", "[sobol]") {
  for (int m = 0; m <= 10; ++m) {
    std::vector<std::array<double, 4>> plain;
    for (std::uint32_t i = 0; i < (1u << m); ++i) {
      const auto p = sobol_point(i);
      plain.push_back({p[0] / kTwoTo32, p[1] / kTwoTo32, p[2] / kTwoTo32, p[3] / kTwoTo32});
    }
    CHECK(fullest_interval(plain, m, 0, 1) == 1);
    for (std::uint32_t key = 0; key < 16; ++key)
      CHECK(fullest_interval(points_of({key, 3, 1, 0, 99}, key, m), m, 0, 1) == 1);
  }
}

TEST_CASE("Each of the four scrambled coordinates alone is perfectly stratified", "[sobol]") {
  constexpr int kLog = 9;
  for (std::uint32_t key = 0; key < 8; ++key) {
    const auto points = points_of({5, key, 0, 1, 7}, 2, kLog);
    for (std::size_t d = 0; d < 4; ++d) {
      std::set<int> cells;
      for (const auto& p : points) cells.insert(static_cast<int>(std::ldexp(p[d], kLog)));
      CHECK(cells.size() == points.size());
    }
  }
}

TEST_CASE("Owen scrambling keeps common prefixes and is a bijection", "[sobol]") {
  for (std::uint64_t s = 0; s < 64; ++s) {
    const std::uint64_t seed = mix64(s);
    for (unsigned k = 1; k < 32; ++k) {
      const auto a = static_cast<std::uint32_t>(mix64(1000 * s + k));
      const std::uint32_t b = a ^ (1u << (31 - k));  // the first k bits agree, the next differs
      const std::uint32_t differ = owen_scramble(a, seed) ^ owen_scramble(b, seed);
      CHECK(differ >> (31 - k) == 1u);
    }
  }
}

TEST_CASE("Owen scrambling flips each bit fairly, and neighbouring branches independently", "[sobol]") {
  // For a random prefix: the flip of bit k, and its agreement with the flip below the sibling branch at each level j < k,
  // are fair coins over seeds. 4.9 standard deviations: about 1e-6 a coin, 528 coins.
  constexpr int kSeeds = 1 << 14;
  const double limit = 4.9 * 0.5 * std::sqrt(kSeeds);
  const auto x = static_cast<std::uint32_t>(mix64(2024));
  for (unsigned k = 0; k < 32; ++k) {
    int flips = 0;
    std::vector<int> agree(k, 0);
    for (std::uint64_t s = 0; s < kSeeds; ++s) {
      const std::uint64_t seed = mix64(s + 77);
      const auto flip = [&](std::uint32_t v) { return ((owen_scramble(v, seed) ^ v) >> (31 - k)) & 1u; };
      const unsigned here = flip(x);
      flips += static_cast<int>(here);
      for (unsigned j = 0; j < k; ++j) agree[j] += flip(x ^ (1u << (31 - j))) == here;
    }
    INFO("bit " << k);
    CHECK(std::abs(flips - kSeeds / 2) < limit);
    for (unsigned j = 0; j < k; ++j) CHECK(std::abs(agree[j] - kSeeds / 2) < limit);
  }
}

TEST_CASE("Streams that differ in any part of their key are uncorrelated", "[sobol]") {
  const SampleKey base{10, 20, 1, 0, 5};
  std::vector<SampleKey> others(6, base);
  others[0].x = 11;
  others[1].y = 21;
  others[2].panel = 2;
  others[3].replicate = 1;
  others[4].seed = 6;
  std::swap(others[5].x, others[5].y);
  for (const SampleKey& other : others) {
    test::Mean product;
    SobolStream a(base), b(other);
    for (std::uint32_t block = 0; block < 20000; ++block) {
      const auto p = a.block(block), q = b.block(block);
      for (std::size_t d = 0; d < 4; ++d)
        product.add((static_cast<double>(p[d]) - 0.5) * (static_cast<double>(q[d]) - 0.5));
    }
    CHECK(product.sigmas_from(0.0) < 4.0);
    CHECK(product.variance() == Approx(1.0 / 144.0).epsilon(0.02));  // that of independent uniform numbers
  }
}

TEST_CASE("Blocks of one stream are independent of one another", "[sobol]") {
  SobolStream stream({1, 2, 3, 0, 4});
  test::Mean across_points, across_dimensions;
  for (std::uint32_t block = 0; block < 40000; ++block) {
    stream.set_point(block % 16);
    const auto p = stream.block(block), q = stream.block(block + 1);
    across_points.add((static_cast<double>(p[0]) - 0.5) * (static_cast<double>(q[0]) - 0.5));
    across_dimensions.add((static_cast<double>(p[0]) - 0.5) * (static_cast<double>(p[1]) - 0.5));
  }
  CHECK(across_points.sigmas_from(0.0) < 4.0);
  CHECK(across_dimensions.sigmas_from(0.0) < 4.0);
}

TEST_CASE("A smooth integral over four dimensions gains on independent sampling as true nested scrambling does", "[sobol]") {
  // f = product of (1 + a (x^2 - 1/3)): integral 1, variance (1 + 4 a^2 / 45)^4 - 1.
  constexpr double a = 1.0;
  const double variance = std::pow(1.0 + 4.0 * a * a / 45.0, 4) - 1.0;
  std::vector<double> error;
  for (const int log_count : {4, 6, 8, 10}) {
    test::Mean square, mean;
    for (std::uint32_t key = 0; key < 2000; ++key) {
      double sum = 0.0;
      const auto points = points_of({key, 0, 0, 0, 1}, 0, log_count);
      for (const auto& p : points) {
        double f = 1.0;
        for (const double x : p) f *= 1.0 + a * (x * x - 1.0 / 3.0);
        sum += f;
      }
      const double off = sum / static_cast<double>(points.size()) - 1.0;
      square.add(off * off);
      mean.add(off);
    }
    CHECK(mean.sigmas_from(0.0) < 4.0);  // unbiased
    const double independent = std::sqrt(variance / (1 << log_count));
    error.push_back(std::sqrt(square.value()) / independent);
  }
  // The same figures by an independent program: SciPy 1.10.1's unscrambled points, 2000 nested scramblings with a stored
  // random bit for every node. Both sides scatter by 1.6 %.
  const double nested[] = {0.2337, 0.0679, 0.0400, 0.00876};
  for (std::size_t i = 0; i < error.size(); ++i) CHECK(error[i] == Approx(nested[i]).epsilon(0.10));
}

TEST_CASE("Numbers lie in [0, 1)", "[sobol]") {
  CHECK(unit_float(0u) == 0.0f);
  CHECK(unit_float(0xffffffffu) < 1.0f);
}
