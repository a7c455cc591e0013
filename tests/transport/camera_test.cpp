// SPDX-License-Identifier: Apache-2.0
// The orthographic camera, its pixel filter, and the pixels that a box can reach.
#include "transport/camera.h"

#include "math/hash.h"
#include "support/catch.h"
#include "support/statistics.h"

using namespace whorl;
using namespace whorl::transport;

namespace {

/// A view from no special direction; `mirror` makes the page left-handed, as for sinistral shells.
Camera oblique(bool mirror) {
  Camera camera;
  camera.page = frame_around(Vec3(0.3, -0.6, 0.74).normalized());
  if (mirror) camera.page.x = -camera.page.x;
  camera.width_px = 320;
  camera.height_px = 200;
  camera.mm_per_px = 0.05;
  camera.anchor_mm = {1.0, -2.0, 3.0};
  camera.anchor_px = {150.5, 90.25};
  camera.front_mm = 7.0;
  return camera;
}

}  // namespace

TEST_CASE("A ray through a point's place on the picture passes the point at its depth", "[camera]") {
  for (const bool mirror : {false, true}) {
    const Camera camera = oblique(mirror);
    for (std::uint64_t i = 0; i < 200; ++i) {
      const auto unit = [&](std::uint64_t k) { return static_cast<double>(unit_float(high_word(mix64(3 * i + k)))) - 0.5; };
      const Vec3 point(10.0 * unit(0), 10.0 * unit(1), 10.0 * unit(2));
      const Vec2 place = camera.project(point);
      const trace::Ray ray = camera.ray(place.x, place.y);
      const double depth = camera.front_mm - camera.page.z.dot(point - camera.anchor_mm);
      const Vec3 reached = Vec3(ray.origin) + Vec3(ray.direction) * depth;
      CHECK((reached - point).length() < 1e-5);
      CHECK(static_cast<double>(ray.direction.length()) == Approx(1.0));
    }
  }
}

TEST_CASE("On the picture x runs right and y runs down", "[camera]") {
  const Camera camera = oblique(false);
  const Vec2 right = camera.project(camera.anchor_mm + camera.page.x), up = camera.project(camera.anchor_mm + camera.page.y);
  CHECK(right.x == Approx(150.5 + 20.0));
  CHECK(right.y == Approx(90.25));
  CHECK(up.x == Approx(150.5));
  CHECK(up.y == Approx(90.25 - 20.0));
}

TEST_CASE("The pixel filter is a Gaussian of the stated width, cut at the stated radius", "[camera]") {
  // Variance of one coordinate of the cut Gaussian: sigma^2 (1 - q e^-q / (1 - e^-q)), q = radius^2 / (2 sigma^2).
  const double q = 0.5 * std::pow(kFilterRadiusPx / kFilterSigmaPx, 2);
  const double variance = kFilterSigmaPx * kFilterSigmaPx * (1.0 - q * std::exp(-q) / (1.0 - std::exp(-q)));
  test::Mean x, y, xx, yy, xy;
  double farthest = 0.0;
  for (std::uint64_t i = 0; i < 200000; ++i) {
    const std::uint64_t word = mix64(i);
    const Vec2 d = filter_offset(unit_float(low_word(word)), unit_float(high_word(word)));
    x.add(d.x);
    y.add(d.y);
    xx.add(d.x * d.x);
    yy.add(d.y * d.y);
    xy.add(d.x * d.y);
    farthest = std::max(farthest, d.length());
  }
  CHECK(x.sigmas_from(0.0) < 4.0);
  CHECK(y.sigmas_from(0.0) < 4.0);
  CHECK(xy.sigmas_from(0.0) < 4.0);
  CHECK(xx.sigmas_from(variance) < 4.0);
  CHECK(yy.sigmas_from(variance) < 4.0);
  CHECK(farthest <= kFilterRadiusPx);
  CHECK(filter_offset(unit_float(0xffffffffu), 0.0f).x <= kFilterRadiusPx);
  CHECK(filter_offset(0.0f, 0.3f).length() == 0.0);
}

TEST_CASE("The pixels of a box hold all of its corners with the filter's reach, clipped to the picture", "[camera]") {
  const Camera camera = oblique(false);
  const Box3 box(Vec3(0.0, -3.0, 2.0), Vec3(2.0, -1.0, 4.0));
  const PixelRect rect = pixels_of(camera, box);
  for (int corner = 0; corner < 8; ++corner) {
    const Vec2 p = camera.project({corner & 1 ? 2.0 : 0.0, corner & 2 ? -1.0 : -3.0, corner & 4 ? 4.0 : 2.0});
    CHECK(rect.x0 + 0.5 + kFilterRadiusPx <= p.x);
    CHECK(rect.x1 - 0.5 - kFilterRadiusPx >= p.x);
    CHECK(rect.y0 + 0.5 + kFilterRadiusPx <= p.y);
    CHECK(rect.y1 - 0.5 - kFilterRadiusPx >= p.y);
  }
  CHECK(rect.x1 - rect.x0 < 120);  // 2 mm cubes are at most 70 pixels wide
  const PixelRect all = pixels_of(camera, {Vec3(-1e3), Vec3(1e3)});
  CHECK((all.x0 == 0 && all.y0 == 0 && all.x1 == 320 && all.y1 == 200));
  const PixelRect none = pixels_of(camera, Box3());
  CHECK(none.x0 == none.x1);
}
