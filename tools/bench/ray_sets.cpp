// SPDX-License-Identifier: Apache-2.0
// Camera rays over the solid's bounds, and what goes on from where they hit.
#include "ray_sets.h"

#include "math/basis3f.h"
#include "math/hash.h"
#include "math/hemisphere.h"
#include "plate/views.h"
#include "transport/camera.h"
#include "transport/lighting.h"

#include <algorithm>
#include <cmath>

namespace whorl::bench {
namespace {

transport::Camera camera_over(const Shape& shape, const plate::View& view, std::size_t pixels) {
  const Box3& box = shape.scene->bounds;
  Box3 page;
  for (int corner = 0; corner < 8; ++corner)
    page.extendBy(view.page_to_shell.to_frame({corner & 1 ? box.max.x : box.min.x, corner & 2 ? box.max.y : box.min.y,
                                               corner & 4 ? box.max.z : box.min.z}));
  const Vec3 size = page.size();
  transport::Camera camera;
  camera.page = view.page_to_shell;
  camera.mm_per_px = std::sqrt(size.x * size.y / static_cast<double>(pixels));
  camera.width_px = static_cast<int>(size.x / camera.mm_per_px);
  camera.height_px = static_cast<int>(size.y / camera.mm_per_px);
  camera.anchor_px = Vec2(-page.min.x, page.max.y) / camera.mm_per_px;
  camera.front_mm = 1.01 * page.max.z;
  return camera;
}

}  // namespace

RaySets make_ray_sets(const Shape& shape, const Contender& reference, std::size_t pixels, double offset_mm) {
  constexpr std::uint64_t kKey = 0x5e11;
  RaySets sets;
  const double lip = shape.scene->law.theta_lip;
  const float offset = static_cast<float>(offset_mm);
  for (const specimen::ViewName name :
       {specimen::ViewName::kApertural, specimen::ViewName::kRightLateral, specimen::ViewName::kApical}) {
    const plate::View view = plate::make_view(name, lip, shape.specimen.identity.coiling);
    const transport::Camera camera = camera_over(shape, view, pixels);
    const auto& light = shape.specimen.light;
    const double azimuth = radians(light.azimuth_deg), elevation = radians(light.elevation_deg);
    const Basis3f key(Vec3f(view.page_to_shell.to_world({std::cos(azimuth) * std::cos(elevation),
                                                         std::sin(azimuth) * std::cos(elevation), std::sin(elevation)})));
    const float disc = static_cast<float>(std::tan(radians(light.softness_deg)));
    for (int y = 0; y < camera.height_px; ++y)
      for (int x = 0; x < camera.width_px; ++x) {
        const trace::Ray ray = camera.ray(x + 0.5, y + 0.5);
        sets.camera.push_back(ray);
        Found found;
        if (!reference.closest(ray, found)) continue;
        const std::uint64_t a = hash_with(kKey, sets.camera.size()), b = hash_with(a, 1);
        const Vec3f start = ray.origin + ray.direction * found.t + found.normal * offset;
        sets.scattered.push_back({start, Basis3f(found.normal).to_world(cosine_direction(unit_float(low_word(a)),
                                                                                        unit_float(high_word(a))))});
        const float radius = disc * std::sqrt(unit_float(low_word(b)));
        const float angle = static_cast<float>(kTwoPi) * unit_float(high_word(b));
        const Vec3f to_light = unit(key.to_world({radius * std::cos(angle), radius * std::sin(angle), 1.0f}));
        if (to_light.dot(found.normal) > 0.0f) sets.shadow.push_back({start, to_light});
      }
  }
  return sets;
}

}  // namespace whorl::bench
