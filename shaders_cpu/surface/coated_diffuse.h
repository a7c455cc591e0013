// SPDX-License-Identifier: Apache-2.0
// Matt shell under a rough clear coat: what light does at one place of the shell's surface.
//
// f = F D G2 / (4 cos_i cos_o)  +  albedo (1 - E(cos_i)) (1 - E(cos_o)) / (pi (1 - E_mean)),
// E the coat's directional albedo. Light that the coat turns away never reaches the body, in either direction, so
// the sum is reciprocal and keeps energy: with albedo 1 it returns all light (the coupling of Kelemen &
// Szirmay-Kalos 2001, A Microfacet Based Coupled Specular-Matte BRDF Model, Eurographics short papers).
#pragma once

#include "math/vec.h"
#include "shaders_cpu/surface/coat_albedo.h"

namespace whorl::shaders_cpu {

/// GGX roughness of the polished end: a highlight about one degree wide.
inline constexpr double kPolishedAlpha = 0.01;

/// GGX roughness for a gloss from 0 (matt) to 1 (polished). The square root of alpha runs evenly from 1 to 0.1, which
/// looks more even than alpha itself (Burley 2012, Physically Based Shading at Disney, SIGGRAPH course notes).
double alpha_of_gloss(double gloss);

/// One surface, ready to be lit. Directions are unit, in the frame of the surface, pointing away from it.
struct CoatedDiffuse {
  Vec3f albedo;                      // of the body, linear, 0 .. 1
  const CoatAlbedo* coat = nullptr;  // none: a plain matt (Lambertian) surface
};

struct Reflection {
  Vec3f value{0.0f};  // BRDF without the cosine, 1/sr
  float pdf = 0.0f;   // with which sample() draws this direction, 1/sr
};

/// BRDF and sampling density for wo.z > 0; both zero for wi.z <= 0.
Reflection reflect(const CoatedDiffuse& surface, const Vec3f& wo, const Vec3f& wi) noexcept;

/// A direction drawn from about BRDF times cosine, with the same `reflect` values. pdf = 0 where the draw fell below the
/// horizon: such a draw counts, with no light. `choice`, `u1`, `u2` uniform in [0, 1).
struct Scatter {
  Vec3f direction{0.0f, 0.0f, 1.0f};
  Reflection reflection;
};
Scatter scatter(const CoatedDiffuse& surface, const Vec3f& wo, float choice, float u1, float u2) noexcept;

}  // namespace whorl::shaders_cpu
