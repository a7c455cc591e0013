// SPDX-License-Identifier: Apache-2.0
// Shell that lets light into its wall and out again elsewhere.
#pragma once

#include "shaders_cpu/medium/random_walk.h"
#include "specimen/specimen.h"
#include "trace/embree_solid.h"

#include <cstdint>
#include <optional>

namespace whorl::transport {

/// Safe for several threads at once. Keeps a reference to the solid.
class TranslucentWall {
 public:
  TranslucentWall(const trace::EmbreeSolid& solid, const shaders_cpu::Medium& medium) : solid_(solid), medium_(medium) {}

  struct Emergence {
    trace::Hit hit;       // where the light leaves
    Vec3f weight{0.0f};
  };
  /// Light that has gone in at a hit, spread by the face as by frosted glass, followed to where it leaves; nothing where it is absorbed.
  std::optional<Emergence> follow(const trace::Hit& entry, float u1, float u2, std::uint64_t key) const noexcept;

 private:
  const trace::EmbreeSolid& solid_;
  shaders_cpu::Medium medium_;
};

/// The medium that a scene file states; nothing for opaque shell.
std::optional<shaders_cpu::Medium> make_medium(const specimen::Specimen& specimen);

}  // namespace whorl::transport
