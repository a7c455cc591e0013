// SPDX-License-Identifier: Apache-2.0
// Views and lights that the tests of light transport share.
#pragma once

#include "support/statistics.h"
#include "transport/path_tracer.h"

namespace whorl::test {

/// Straight down the z axis on a square of `side_mm` round the origin; page axes = axes of the shell.
inline transport::Camera camera_from_above(int pixels, double side_mm, double front_mm = 10.0) {
  transport::Camera camera;
  camera.width_px = camera.height_px = pixels;
  camera.mm_per_px = side_mm / pixels;
  camera.anchor_px = Vec2(0.5 * pixels);
  camera.front_mm = front_mm;
  return camera;
}

/// A dome of radiance 1 and nothing else.
inline transport::Lighting white_dome() {
  transport::Lighting lighting;
  lighting.dome.radiance = Vec3f(1.0f);
  return lighting;
}

inline specimen::Light page_light(double azimuth_deg, double elevation_deg, double softness_deg, double fill) {
  specimen::Light light;
  light.azimuth_deg.value = azimuth_deg;
  light.elevation_deg.value = elevation_deg;
  light.softness_deg.value = softness_deg;
  light.fill.value = fill;
  return light;
}

/// Everything of one albedo, matt unless a gloss is given.
inline transport::Materials of_albedo(float albedo, double gloss = -1.0) {
  transport::Materials materials;
  materials.exterior = materials.interior = Vec3f(albedo);
  if (gloss >= 0.0)
    materials.outer.coat = materials.inner.coat = transport::make_coat(specimen::Mineral::kAragonite, gloss);
  return materials;
}

/// The green channel of each fully covered pixel: pixels are independent, so their scatter gives an honest error.
inline Mean mean_of_covered(const transport::Film& film) {
  Mean mean;
  for (std::size_t i = 0; i < film.size(); ++i)
    if (film.coverage[i] == 1.0f) mean.add(static_cast<double>(film.radiance[i].y));
  return mean;
}

}  // namespace whorl::test
