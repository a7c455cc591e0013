// SPDX-License-Identifier: Apache-2.0
// Light through the wall of a shell against the plane slab: walks, faces and the solid's own crossings together.
#include "support/catch.h"
#include "support/shell_specimen.h"
#include "support/statistics.h"
#include "support/table.h"
#include "trace/embree_solid.h"
#include "transport/translucent_wall.h"

#include "math/hash.h"

#include <array>
#include <cmath>

using namespace whorl;
using test::Shell;
using test::ShellPlan;

namespace {

constexpr double kWall = 0.1;

ShellPlan plan() {
  ShellPlan plan;
  plan.whorls = 1.5;
  plan.W = {{0.0, 2.2}};
  plan.D = 0.1;
  plan.T = 1.0;
  plan.size_mm = 40.0;
  plan.wall_mm = kWall;
  plan.constant_wall = true;
  return plan;
}

/// By channel: what comes out by the face that it went in by, and by the other.
struct Shares {
  std::array<test::Mean, 3> reflected, passed;
};

void add_walks(const transport::TranslucentWall& wall, const trace::Hit& entry, int walks, std::uint64_t seed, Shares& shares) {
  for (int i = 0; i < walks; ++i) {
    const std::uint64_t key = hash_with(mix64(seed), static_cast<std::uint64_t>(i)), place = mix64(key);
    const auto out = wall.follow(entry, unit_float(low_word(place)), unit_float(high_word(place)), key);
    const bool back = out && out->hit.part == entry.part;
    for (int c = 0; c < 3; ++c) {
      const auto k = static_cast<std::size_t>(c);
      const double weight = out ? static_cast<double>(out->weight[c]) : 0.0;
      shares.reflected[k].add(back ? weight : 0.0);
      shares.passed[k].add(back ? 0.0 : weight);
    }
  }
}

}  // namespace

// tests/reference/slab_fluxes.csv: adding and doubling; method and citations in slab_adding_doubling.py beside it.
TEST_CASE("A thin wall of a shell reflects and passes light as a plane slab of its thickness", "[transport]") {
  const Shell shell(plan());
  const trace::EmbreeSolid solid(shell.field, {4e-4, false});
  const growth::CoilingLaw& law = shell.scene.law;
  const double theta = law.theta_lip - 1.0;
  const Vec3f middle(test::in_tube(law, theta, 0.0, 0.0)), without(test::in_tube(law, theta, 0.0, 3.0));
  trace::Ray ray;
  trace::Hit outside, inside;
  ray.origin = without;
  ray.direction = (middle - without).normalized();
  REQUIRE(solid.closest(ray, outside));
  ray.origin = middle;
  ray.direction = -ray.direction;
  REQUIRE(solid.closest(ray, inside));
  REQUIRE(outside.part == trace::Part::kExterior);
  REQUIRE(inside.part == trace::Part::kInterior);

  // Wall over radius of the whorl is 1 / 60: that light goes in from both sides takes the first order of the curvature away. Starting
  // clear of the faces costs 0.1 % of the wall at each.
  constexpr double kModelError = 0.002;
  constexpr int kWalks = 6000;
  int compared = 0;
  for (const float thickness : {0.625f, 2.5f}) {
    const shaders_cpu::Medium medium{static_cast<float>(kWall) / thickness, Vec3f(0.7f, 0.9f, 0.99f), 0.6f, 1.63f};
    const transport::TranslucentWall wall(solid, medium);
    Shares shares;
    add_walks(wall, outside, kWalks, 1, shares);
    add_walks(wall, inside, kWalks, 2, shares);
    for (const auto& row : test::read_table("slab_fluxes.csv", "reference")) {
      if (std::stof(row[0]) != medium.index || std::stof(row[1]) != medium.anisotropy || std::stof(row[3]) != thickness ||
          row[4] != "spread")
        continue;
      for (int c = 0; c < 3; ++c) {
        if (std::stof(row[2]) != medium.albedo[c]) continue;
        const auto k = static_cast<std::size_t>(c);
        const test::Mean &reflected = shares.reflected[k], &passed = shares.passed[k];
        INFO("thickness " << thickness << " albedo " << row[2] << ": reflected " << reflected.value() << " +- "
                          << reflected.standard_error() << ", reference " << row[5] << "; passed " << passed.value() << " +- "
                          << passed.standard_error() << ", reference " << row[6]);
        CHECK(std::abs(reflected.value() - std::stod(row[5])) < 4.0 * reflected.standard_error() + kModelError);
        CHECK(std::abs(passed.value() - std::stod(row[6])) < 4.0 * passed.standard_error() + kModelError);
        ++compared;
      }
    }
  }
  CHECK(compared == 6);
}
