// SPDX-License-Identifier: Apache-2.0
// From the words of the scene file to radiances.
#include "transport/lighting.h"

#include "shaders_cpu/light/blackbody.h"

#include <cmath>

namespace whorl::transport {

Lighting light_page(const specimen::Light& light, std::span<const PlacedLamp> lamps, const Frame& page_in_shell) {
  const double azimuth = radians(light.azimuth_deg), elevation = radians(light.elevation_deg);
  const Vec3 on_page(std::cos(elevation) * std::cos(azimuth), std::cos(elevation) * std::sin(azimuth), std::sin(elevation));
  const double fill = light.fill;
  const double key_irradiance = std::exp2(light.stops) * kPi / (1.0 + fill);

  Lighting lighting;
  lighting.key.cone = shaders_cpu::key_cone(page_in_shell.to_world(on_page), light.softness_deg);
  lighting.key.radiance = Vec3f(static_cast<float>(key_irradiance / shaders_cpu::facing_irradiance(light.softness_deg)));
  lighting.dome.radiance = Vec3f(static_cast<float>(fill * key_irradiance / kPi));
  for (const PlacedLamp& lamp : lamps)
    lighting.lamps.push_back({Vec3f(lamp.centre_mm), static_cast<float>(lamp.radius_mm),
                              Vec3f(shaders_cpu::blackbody_colour(lamp.temperature_k) * lamp.strength)});
  return lighting;
}

}  // namespace whorl::transport
