// SPDX-License-Identifier: Apache-2.0
// The finished radiance of one panel with its layers: what the path tracer hands to the plate.
#pragma once

#include "math/vec.h"

#include <cstddef>
#include <cstdint>
#include <vector>

namespace whorl::transport {

/// Layers that are no light, one value a pixel: of the sample nearest to the pixel's centre, never filtered.
struct PixelFacts {
  float depth_mm = 0.0f;     // below the view's front plane
  Vec3f normal{0.0f};        // in the view's frame: x right, y up, z towards the reader
  Vec3f albedo{0.0f};
  float turn = 0.0f;         // whorls from the pole
  float around_deg = 0.0f;   // section angle
  std::uint8_t part = 0;     // trace::Part
  std::uint8_t provenance = 0;  // specimen::Provenance; 0 also where the specimen says nothing of it
};

/// Row-major, top row first. Radiance is scene-linear with sRGB primaries, premultiplied by coverage:
/// a matt white card that faces the key light has radiance 1.
struct Film {
  int width = 0, height = 0;
  std::vector<Vec3f> radiance;
  std::vector<float> coverage;     // 0 .. 1
  std::vector<PixelFacts> facts;
  double mean_samples = 0.0;       // samples a pixel that shows anything
  double max_samples = 0.0;
  double noise = 0.0;              // standard error of the radiance's mean over covered pixels, card = 1
  std::uint64_t rays_camera = 0, rays_scattered = 0, rays_shadow = 0;
  std::uint64_t non_finite = 0;    // samples thrown away because they were not finite

  Film() = default;
  Film(int w, int h)
      : width(w), height(h), radiance(size(), Vec3f(0.0f)), coverage(size()), facts(size()) {}
  std::size_t size() const { return static_cast<std::size_t>(width) * static_cast<std::size_t>(height); }
  std::size_t index(int x, int y) const {
    return static_cast<std::size_t>(y) * static_cast<std::size_t>(width) + static_cast<std::size_t>(x);
  }
};

}  // namespace whorl::transport
