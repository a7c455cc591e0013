// SPDX-License-Identifier: Apache-2.0
// One light path, followed backwards from the eye.
#pragma once

#include "math/sobol.h"
#include "trace/surfaces.h"
#include "transport/lighting.h"
#include "transport/materials.h"

#include <cstdint>

namespace whorl::transport {

struct RayCounts {
  std::uint64_t camera = 0, scattered = 0, shadow = 0;
};

/// Paths are cut by chance alone (Russian roulette); this bound only ends a walk in a closed white cavity, which would
/// have no end. Of a cavity with mean path length M a bound of 10 M loses about 1e-4.
inline constexpr int kMaxBounces = 100000;

struct Glimpse {
  Vec3f radiance{0.0f};
  bool hit = false;  // shell or lamp; the sky is not part of the picture
};

/// Unidirectional path tracing with next-event estimation to key and lamps, joined with BSDF sampling by multiple
/// importance sampling (power heuristic, exponent 2; Veach & Guibas 1995, SIGGRAPH). The dome is even, so scattered rays
/// sample it perfectly as they are: shadow rays to it as well raised the noise by 2 to 9 % and the time by 15 % (measured
/// on an open sphere, with and without a lamp in it). The mouth as a portal does no better:
/// a scattered ray that finds it takes the place of one that gathers light from pale walls, and each makes up for the other. Unbiased. Keeps references: shell, lighting and materials must
/// outlive it.
class PathTracer {
 public:
  PathTracer(const trace::Surfaces& shell, const Lighting& lighting, const Materials& materials);

  /// Radiance that comes back along a camera ray. Draws the blocks of `stream` from `first_block` on.
  Glimpse look(const trace::Ray& ray, const SobolStream& stream, std::uint32_t first_block,
               RayCounts& counts) const noexcept;

 private:
  struct Vertex;
  Vec3f direct(const Vertex& v, const SobolStream& stream, std::uint32_t block, RayCounts& counts) const noexcept;
  Vec3f sky(const Vertex& v, const Vec3f& direction, float scatter_pdf) const noexcept;

  const trace::Surfaces& shell_;
  const Lighting& lighting_;
  const Materials& materials_;
  Vec3f section_radiance_;
  const shaders_cpu::Portal* portal_;  // none where nothing comes through it
};

}  // namespace whorl::transport
