// SPDX-License-Identifier: Apache-2.0
// The random walk against published solutions of the slab.
#include "math/hemisphere.h"
#include "shaders_cpu/medium/random_walk.h"
#include "support/catch.h"

#include <cmath>
#include <limits>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

/// All places with 0 <= z <= thickness.
struct Slab {
  float thickness;
  bool operator()(const Vec3f& p, const Vec3f& d, float limit, WallExit& exit) const noexcept {
    const float t = d.z > 0.0f ? (thickness - p.z) / d.z : d.z < 0.0f ? -p.z / d.z : std::numeric_limits<float>::infinity();
    if (!(t <= limit)) return false;
    exit.t = std::max(t, 0.0f);
    exit.normal = {0.0f, 0.0f, d.z > 0.0f ? 1.0f : -1.0f};
    exit.position = p + d * exit.t;
    exit.position.z = d.z > 0.0f ? thickness : 0.0f;
    return true;
  }
};

struct Shares {
  double reflected = 0.0, passed = 0.0;
};

/// Light that has entered at z = 0: along the normal, or as a diffuse face sends it in.
Shares through(const Medium& medium, float thickness, bool diffuse, int walks) {
  Shares shares;
  const Slab slab{thickness};
  for (int i = 0; i < walks; ++i) {
    WalkNumbers start(hash_with(5, static_cast<std::uint64_t>(i)));
    const float u1 = start.next(), u2 = start.next();
    const Vec3f direction = diffuse ? cosine_direction(u1, u2) : Vec3f(0.0f, 0.0f, 1.0f);
    const WalkEnd end = walk_in_wall(medium, Vec3f(0.0f), direction, WalkNumbers(hash_with(7, static_cast<std::uint64_t>(i))), slab);
    if (end.left) (end.exit.normal.z < 0.0f ? shares.reflected : shares.passed) += static_cast<double>(end.weight.y);
  }
  return {shares.reflected / walks, shares.passed / walks};
}

constexpr int kWalks = 400000;

/// Four standard errors of a share that is estimated from so many walks, at most.
double margin(double share) { return 4.0 * std::sqrt(share * (1.0 - share) / kWalks); }

}  // namespace

TEST_CASE("A slab with matched index reflects and passes what van de Hulst's tables say", "[shaders]") {
  // van de Hulst 1980, Multiple Light Scattering, vol. 2: optical thickness 2, albedo 0.9, g = 0.75, light along the normal:
  // reflectance 0.09739, transmittance 0.66096 (quoted in Wang, Jacques & Zheng 1995, Computer Methods and Programs in
  // Biomedicine 47: 131-146, table 1).
  const Medium medium{0.1f, Vec3f(0.9f), 0.75f, 1.0f};
  const Shares shares = through(medium, 0.2f, false, kWalks);
  CHECK(shares.reflected == Approx(0.09739).margin(margin(0.09739)));
  CHECK(shares.passed == Approx(0.66096).margin(margin(0.66096)));
}

TEST_CASE("A deep body of index 1.5 reflects what Giovanelli's solution says", "[shaders]") {
  // Giovanelli 1955, Optica Acta 2: 153-162: albedo 0.9, isotropic, light along the normal, index 1.5: total reflectance 0.2600
  // with the 4 % of the face (quoted in Wang, Jacques & Zheng 1995, table 2).
  const Medium medium{0.1f, Vec3f(0.9f), 0.0f, 1.5f};
  const double face = fresnel_dielectric(1.0, 1.5);
  const double total = face + (1.0 - face) * through(medium, 1e4f, false, kWalks).reflected;
  CHECK(total == Approx(0.2600).margin(margin(0.26)));
}

TEST_CASE("Without scattering a slab passes exp(-thickness / path), along the normal, and nothing comes back", "[shaders]") {
  const Shares shares = through({0.5f, Vec3f(0.0f), 0.0f, 1.0f}, 0.75f, false, kWalks);
  CHECK(shares.passed == Approx(std::exp(-1.5)).margin(margin(std::exp(-1.5))));
  CHECK(shares.reflected == 0.0);
}

TEST_CASE("Without absorption all light leaves, whatever the index, the phase function and the thickness", "[shaders]") {
  for (const float index : {1.0f, 1.63f})
    for (const float g : {-0.4f, 0.0f, 0.8f})
      for (const float thickness : {0.01f, 1.0f, 6.0f}) {
        const Shares shares = through({0.2f, Vec3f(1.0f), g, index}, thickness, true, 20000);
        CHECK(shares.reflected + shares.passed == Approx(1.0).margin(1e-9));
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
  for (const float colour : {0.3f, 0.6f, 0.85f})
    for (const float g : {0.0f, 0.6f}) {
      const Medium medium{0.1f, Vec3f(scattering_albedo_of(colour, g)), g, 1.0f};
      CHECK(through(medium, 1e4f, true, 60000).reflected == Approx(static_cast<double>(colour)).margin(0.02));
    }
}
