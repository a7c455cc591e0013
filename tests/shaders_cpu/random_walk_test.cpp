// SPDX-License-Identifier: Apache-2.0
// The random walk against published solutions of the slab.
#include "shaders_cpu/medium/random_walk.h"
#include "support/catch.h"
#include "support/slab.h"

#include <cmath>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

constexpr int kWalks = 400000;

double error_of(const test::Mean& mean) { return 4.0 * mean.standard_error(); }

}  // namespace

TEST_CASE("A slab with matched index reflects and passes what van de Hulst's tables say", "[shaders]") {
  // van de Hulst 1980, Multiple Light Scattering, vol. 2: optical thickness 2, albedo 0.9, g = 0.75, light along the normal:
  // reflectance 0.09739, transmittance 0.66096 (quoted in Wang, Jacques & Zheng 1995, Computer Methods and Programs in
  // Biomedicine 47: 131-146, table 1). tests/reference/slab_adding_doubling.py --check finds 0.097395 and 0.660958.
  const Medium medium{0.1f, Vec3f(0.9f), 0.75f, 1.0f};
  const test::SlabShares shares = test::shares_through(medium, 0.2f, false, kWalks);
  CHECK(shares.reflected[0].value() == Approx(0.09739).margin(error_of(shares.reflected[0]) + 5e-6));
  CHECK(shares.passed[0].value() == Approx(0.66096).margin(error_of(shares.passed[0]) + 5e-6));
}

TEST_CASE("A deep body of index 1.5 reflects what Giovanelli's solution says", "[shaders]") {
  // Giovanelli 1955, Optica Acta 2: 153-162: albedo 0.9, isotropic, light along the normal, index 1.5: total reflectance 0.2600
  // with the 4 % of the face (quoted in Wang, Jacques & Zheng 1995, table 2). slab_adding_doubling.py --check finds 0.25992.
  const Medium medium{0.1f, Vec3f(0.9f), 0.0f, 1.5f};
  const double face = fresnel_dielectric(1.0, 1.5);
  const test::Mean within = test::shares_through(medium, 1e4f, false, kWalks).reflected[0];
  CHECK(face + (1.0 - face) * within.value() == Approx(0.2600).margin(error_of(within) + 1e-4));
}

TEST_CASE("Without scattering a slab passes exp(-thickness / path), along the normal, and nothing comes back", "[shaders]") {
  const test::SlabShares shares = test::shares_through({0.5f, Vec3f(0.0f), 0.0f, 1.0f}, 0.75f, false, kWalks);
  CHECK(shares.passed[0].value() == Approx(std::exp(-1.5)).margin(error_of(shares.passed[0])));
  CHECK(shares.reflected[0].value() == 0.0);
}

TEST_CASE("Without absorption all light leaves, whatever the index, the phase function and the thickness", "[shaders]") {
  for (const float index : {1.0f, 1.63f})
    for (const float g : {-0.4f, 0.0f, 0.8f})
      for (const float thickness : {0.01f, 1.0f, 6.0f}) {
        const test::SlabShares shares = test::shares_through({0.2f, Vec3f(1.0f), g, index}, thickness, true, 20000);
        CHECK(shares.reflected[0].value() + shares.passed[0].value() == Approx(1.0).margin(1e-9));
      }
}

TEST_CASE("The phase function integrates to 1, and draws follow it: their mean cosine is g", "[shaders]") {
  for (const float g : {-0.5f, 0.0f, 0.6f, 0.9f}) {
    double sum = 0.0;
    constexpr int kSteps = 200000;
    for (int i = 0; i < kSteps; ++i)
      sum += static_cast<double>(henyey_greenstein(-1.0f + 2.0f * (static_cast<float>(i) + 0.5f) / kSteps, g)) * kTwoPi * 2.0 / kSteps;
    CHECK(sum == Approx(1.0).epsilon(1e-3));
    WalkNumbers numbers(3);
    double mean = 0.0;
    const Vec3f forward = Vec3f(0.2f, -0.5f, 0.7f).normalized();
    constexpr int kDraws = 200000;
    for (int i = 0; i < kDraws; ++i) {
      const float u1 = numbers.next(), u2 = numbers.next();
      mean += static_cast<double>(forward.dot(scattered(forward, g, u1, u2))) / kDraws;
    }
    CHECK(mean == Approx(static_cast<double>(g)).margin(0.007));
  }
}

TEST_CASE("The albedo of a stated colour gives a deep matched body of that colour in diffuse light", "[shaders]") {
  // Adding and doubling (tests/reference) finds the published fit itself off by 0.00172 at 0.3 without a mean direction, and by less
  // at the others.
  constexpr double kFit = 0.0018;
  for (const float colour : {0.3f, 0.6f, 0.85f})
    for (const float g : {0.0f, 0.6f}) {
      const Medium medium{0.1f, Vec3f(scattering_albedo_of(colour, g)), g, 1.0f};
      const test::Mean found = test::shares_through(medium, 1e4f, true, 60000).reflected[0];
      CHECK(found.value() == Approx(static_cast<double>(colour)).margin(error_of(found) + kFit));
    }
}
