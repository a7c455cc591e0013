// SPDX-License-Identifier: Apache-2.0
// The random walk in plane slabs against adding and doubling, a solution without chance.
#include "shaders_cpu/surface/fresnel.h"
#include "support/catch.h"
#include "support/slab.h"
#include "support/table.h"

#include <cmath>
#include <map>
#include <tuple>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

/// Of the reference: `slab_adding_doubling.py --check` finds its shares within 2e-5 of those with finer directions, of closed forms
/// and of published values. The walk is in single precision.
constexpr double kModelError = 5e-5;

struct Row {
  double albedo, reflected, passed;
};

/// index, anisotropy, thickness in free paths, spread: rows of one kind of walk, which carries three albedos at once.
using Kind = std::tuple<float, float, float, bool>;

/// tests/reference/slab_fluxes.csv, made by slab_adding_doubling.py beside it: method and citations stand there.
std::map<Kind, std::vector<Row>> reference() {
  std::map<Kind, std::vector<Row>> rows;
  for (const auto& cells : test::read_table("slab_fluxes.csv", "reference"))
    rows[{std::stof(cells[0]), std::stof(cells[1]), std::stof(cells[3]), cells[4] == "spread"}].push_back(
        {std::stod(cells[2]), std::stod(cells[5]), std::stod(cells[6])});
  return rows;
}

}  // namespace

TEST_CASE("Slabs of any index, thickness, albedo and phase function reflect and pass what adding and doubling says", "[shaders]") {
  constexpr float kPath = 0.3f;
  std::uint64_t kinds = 0;
  double bias = 0.0;
  std::size_t compared = 0;
  for (const auto& [kind, rows] : reference()) {
    const auto& [index, g, thickness, spread] = kind;
    REQUIRE(rows.size() == 4);
    const int walks = static_cast<int>(24000.0f / (1.0f + 0.5f * thickness));  // about as many events each
    Medium medium{kPath, Vec3f(0.0f), g, index};
    for (int c = 0; c < 3; ++c) medium.albedo[c] = static_cast<float>(rows[static_cast<std::size_t>(c)].albedo);
    const test::SlabShares coloured = test::shares_through(medium, thickness * kPath, spread, walks, ++kinds);
    medium.albedo = Vec3f(static_cast<float>(rows[3].albedo));
    const test::SlabShares white = test::shares_through(medium, thickness * kPath, spread, walks, kinds + 1000);
    for (std::size_t k = 0; k < 4; ++k) {
      const test::SlabShares& shares = k < 3 ? coloured : white;
      const test::Mean &reflected = shares.reflected[k % 3], &passed = shares.passed[k % 3];
      INFO("index " << index << " g " << g << " thickness " << thickness << (spread ? " spread" : " normal") << " albedo "
                    << rows[k].albedo << ": reflected " << reflected.value() << " +- " << reflected.standard_error() << ", reference "
                    << rows[k].reflected << "; passed " << passed.value() << " +- " << passed.standard_error() << ", reference "
                    << rows[k].passed);
      CHECK(std::abs(reflected.value() - rows[k].reflected) < 4.0 * reflected.standard_error() + kModelError);
      CHECK(std::abs(passed.value() - rows[k].passed) < 4.0 * passed.standard_error() + kModelError);
      bias += (reflected.value() - rows[k].reflected) / reflected.standard_error();
      ++compared;
    }
  }
  // All kinds together: their mean deviation is that of as many independent ones, for the four albedos at worst are one.
  CHECK(kinds == 144);
  INFO("mean deviation of what is reflected, in standard errors: " << bias / static_cast<double>(compared));
  CHECK(std::abs(bias / static_cast<double>(compared)) < 4.0 / std::sqrt(static_cast<double>(kinds)));
}
