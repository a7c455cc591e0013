// SPDX-License-Identifier: Apache-2.0
// Matt shell under a rough clear coat, or under nacre: what light does at one place of the shell's surface.
//
// f = F D G2 / (4 cos_i cos_o)  +  albedo (1 - E(cos_i)) (1 - E(cos_o)) / (pi (1 - E_mean)),
// E the coat's directional albedo. Light that the coat turns away never reaches the body, in either direction, so
// the sum is reciprocal and keeps energy: with albedo 1 it returns all light (the coupling of Kelemen &
// Szirmay-Kalos 2001, A Microfacet Based Coupled Specular-Matte BRDF Model, Eurographics short papers).
#pragma once

#include "math/vec.h"
#include "shaders_cpu/surface/coat_albedo.h"
#include "shaders_cpu/surface/nacre.h"

namespace whorl::shaders_cpu {

/// GGX roughness of the polished end: a highlight about one degree wide.
inline constexpr double kPolishedAlpha = 0.01;

/// GGX roughness for a gloss from 0 (matt) to 1 (polished). The square root of alpha runs evenly from 1 to 0.1, which
/// looks more even than alpha itself (Burley 2012, Physically Based Shading at Disney, SIGGRAPH course notes).
double alpha_of_gloss(double gloss);

struct CoatedDiffuse {
  Vec3f albedo{0.0f};                // of the body, linear, 0 .. 1
  const CoatAlbedo* coat = nullptr;  // none: a plain matt (Lambertian) surface
  const NacreCoat* nacre = nullptr;  // in place of the clear coat: F is that of the layers, and E and E_mean are colours
  float nacre_scale = 1.0f;          // thickness of the tablets, relative to the stated one
};

struct Reflection {
  Vec3f value{0.0f};  // BRDF without the cosine, 1/sr
  float pdf = 0.0f;   // with which `scatter` draws this direction, 1/sr
};

/// A drawn direction. pdf = 0 where the draw fell below the horizon: such a draw counts, with no light.
struct Scatter {
  Vec3f direction{0.0f, 0.0f, 1.0f};
  Reflection reflection;
};

/// The surface as seen from one direction. Directions are unit, in the frame of the surface (z = normal), pointing away
/// from it; `wo` must have z > 0. The coat must outlive the view.
class SurfaceView {
 public:
  SurfaceView(const CoatedDiffuse& surface, const Vec3f& wo) noexcept;

  /// The face of a translucent wall: what its coat does not reflect goes in. The albedo is that of a thin skin of pigment, which
  /// light passes on its way in and on its way out, each time losing the square root of it.
  static SurfaceView face(const CoatedDiffuse& surface, const Vec3f& wo) noexcept;
  /// The same face seen by light that comes out of the wall, spread as by frosted glass. With the white body's BRDF in its place it closes
  /// the balance: all light that leaves the wall leaves the coat.
  static SurfaceView leaving(const CoatedDiffuse& surface) noexcept;
  /// Whether a draw by `choice` goes into the wall, and the weight of one that does.
  bool enters(float choice) const noexcept { return body_chance_ == 0.0f && choice >= coat_chance_; }
  Vec3f entering() const noexcept { return inward_; }

  const Vec3f& wo() const noexcept { return wo_; }

  /// BRDF and sampling density; both zero for wi.z <= 0.
  Reflection reflect(const Vec3f& wi) const noexcept;
  /// Draws from about BRDF times cosine. `choice`, `u1`, `u2` uniform in [0, 1).
  Scatter scatter(float choice, float u1, float u2) const noexcept;

 private:
  Vec3f wo_, body_;                 // body_: everything of the body's BRDF that does not depend on wi
  const CoatAlbedo* coat_;
  const NacreCoat* nacre_;
  float nacre_scale_;
  float lambda_ = 0.0f;             // Smith's Lambda of wo
  Vec3f inward_{0.0f};              // weight of light that goes into the wall
  bool leaving_ = false;
  float body_chance_ = 1.0f;        // of drawing from the body
  float coat_chance_ = 0.0f;        // of drawing from the coat: its share of the light that leaves towards wo
};

}  // namespace whorl::shaders_cpu
