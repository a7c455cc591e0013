// SPDX-License-Identifier: Apache-2.0
// A plane slab for the random walk, and the shares of light that leave it on either side.
#pragma once

#include "math/hemisphere.h"
#include "shaders_cpu/medium/random_walk.h"
#include "support/statistics.h"

#include <array>
#include <limits>

namespace whorl::test {

/// All places with 0 <= z <= thickness.
struct Slab {
  float thickness;
  bool operator()(const Vec3f& p, const Vec3f& d, float limit, shaders_cpu::WallExit& exit) const noexcept {
    const float t = d.z > 0.0f ? (thickness - p.z) / d.z : d.z < 0.0f ? -p.z / d.z : std::numeric_limits<float>::infinity();
    if (!(t <= limit)) return false;
    exit.t = std::max(t, 0.0f);
    exit.normal = {0.0f, 0.0f, d.z > 0.0f ? 1.0f : -1.0f};
    exit.position = p + d * exit.t;
    exit.position.z = d.z > 0.0f ? thickness : 0.0f;
    return true;
  }
};

/// Of the light that has gone in, by channel.
struct SlabShares {
  std::array<Mean, 3> reflected, passed;
};

/// Light that has entered at z = 0, along the normal or evenly spread within the slab, as a frosted face sends it in. Walks of
/// different seeds are independent.
inline SlabShares shares_through(const shaders_cpu::Medium& medium, float thickness, bool spread, int walks, std::uint64_t seed = 0) {
  using namespace shaders_cpu;
  SlabShares shares;
  for (int i = 0; i < walks; ++i) {
    const std::uint64_t key = hash_with(mix64(seed), static_cast<std::uint64_t>(i));
    WalkNumbers start(hash_with(5, key));
    const float u1 = start.next(), u2 = start.next();
    const Vec3f direction = spread ? cosine_direction(u1, u2) : Vec3f(0.0f, 0.0f, 1.0f);
    const WalkEnd end = walk_in_wall(medium, Vec3f(0.0f), direction, WalkNumbers(hash_with(7, key)), Slab{thickness});
    const bool back = end.exit.normal.z < 0.0f;
    for (int c = 0; c < 3; ++c) {
      const auto k = static_cast<std::size_t>(c);
      const double weight = end.left ? static_cast<double>(end.weight[c]) : 0.0;
      shares.reflected[k].add(back ? weight : 0.0);
      shares.passed[k].add(back ? 0.0 : weight);
    }
  }
  return shares;
}

}  // namespace whorl::test
