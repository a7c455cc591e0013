// SPDX-License-Identifier: Apache-2.0
// The page's light: directions, the white card, lamps.
#include "transport/lighting.h"

#include "math/basis3f.h"
#include "shaders_cpu/light/blackbody.h"
#include "support/analytic_solids.h"
#include "support/catch.h"
#include "support/studio_light.h"

using namespace whorl;
using namespace whorl::transport;

namespace {

/// A card on the origin that faces `towards`, seen straight on.
Film picture_of_card(const Vec3& towards, const Lighting& lighting, const Materials& materials, int samples) {
  const test::Card card(Vec3f(0.0f), Vec3f(towards), 5.0f);
  RenderJob job;
  job.shell = &card;
  job.camera = test::camera_from_above(16, 1.0);
  job.camera.page = frame_around(towards.normalized());
  job.lighting = lighting;
  job.materials = materials;
  job.samples_per_pixel = samples;
  job.seed = 3;
  return render(job, Silent());
}

}  // namespace

TEST_CASE("The key comes from the upper left of the page, towards the reader", "[lighting]") {
  const Lighting lighting = light_page(test::page_light(135.0, 45.0, 12.0, 0.35), {}, Frame{});
  const Vec3 axis(lighting.key.cone.axis);
  CHECK(axis.x == Approx(-0.5));
  CHECK(axis.y == Approx(0.5));
  CHECK(axis.z == Approx(std::sqrt(0.5)));
}

TEST_CASE("On a left-handed page, as for sinistral shells, the key stays at the upper left", "[lighting]") {
  Frame page = frame_around(Vec3(0.2, 0.9, 0.4).normalized());
  page.x = -page.x;
  const Lighting lighting = light_page(test::page_light(135.0, 45.0, 12.0, 0.35), {}, page);
  const Vec3 on_page = page.to_frame(Vec3(lighting.key.cone.axis));
  CHECK(on_page.x == Approx(-0.5).epsilon(1e-5));
  CHECK(on_page.y == Approx(0.5).epsilon(1e-5));
  CHECK(on_page.z == Approx(std::sqrt(0.5)).epsilon(1e-5));
}

TEST_CASE("A matt white card that faces the key has radiance 1, whatever softness and fill", "[lighting]") {
  for (const double softness_deg : {0.0, 2.0, 12.0, 60.0})
    for (const double fill : {0.0, 0.35, 2.0}) {
      const Lighting lighting = light_page(test::page_light(135.0, 45.0, softness_deg, fill), {}, Frame{});
      const Film film = picture_of_card(Vec3(-0.5, 0.5, std::sqrt(0.5)), lighting, test::of_albedo(1.0f), 64);
      const test::Mean mean = test::mean_of_covered(film);
      INFO("softness " << softness_deg << " fill " << fill << ": " << mean.value() << " +- " << mean.standard_error());
      CHECK(std::abs(mean.value() - 1.0) < 4.0 * mean.standard_error() + 1e-5);
    }
}

TEST_CASE("Fill and key irradiances on that card stand as stated", "[lighting]") {
  const double fill = 0.35;
  Lighting lighting = light_page(test::page_light(90.0, 90.0, 12.0, fill), {}, Frame{});
  lighting.key.radiance = Vec3f(0.0f);
  const test::Mean mean = test::mean_of_covered(picture_of_card(Vec3(0, 0, 1), lighting, test::of_albedo(1.0f), 16));
  CHECK(mean.value() == Approx(fill / (1.0 + fill)).epsilon(1e-5));
}

TEST_CASE("A card turned away from the key has only the fill", "[lighting]") {
  const Lighting lighting = light_page(test::page_light(90.0, 20.0, 12.0, 0.5), {}, Frame{});
  const test::Mean mean = test::mean_of_covered(picture_of_card(Vec3(0, -1, 0), lighting, test::of_albedo(1.0f), 16));
  CHECK(mean.value() == Approx(0.5 / 1.5).epsilon(1e-5));
}

TEST_CASE("A tilted card darkens with the cosine", "[lighting]") {
  const Lighting lighting = light_page(test::page_light(90.0, 90.0, 5.0, 0.0), {}, Frame{});
  const double tilt = radians(50.0);
  const Film film = picture_of_card(Vec3(std::sin(tilt), 0.0, std::cos(tilt)), lighting, test::of_albedo(0.6f), 256);
  const test::Mean mean = test::mean_of_covered(film);
  CHECK(std::abs(mean.value() - 0.6 * std::cos(tilt)) < 4.0 * mean.standard_error() + 1e-5);
}

TEST_CASE("Lamps keep place and size; their luminance is their strength", "[lighting]") {
  const PlacedLamp lamp{{1.0, 2.0, 3.0}, 0.5, 40.0, 3200.0};
  const Lighting lighting = light_page(test::page_light(135.0, 45.0, 12.0, 0.35), {&lamp, 1}, Frame{});
  REQUIRE(lighting.lamps.size() == 1);
  CHECK(lighting.lamps[0].centre == Vec3f(1.0f, 2.0f, 3.0f));
  CHECK(lighting.lamps[0].radius == 0.5f);
  CHECK(static_cast<double>(luminance(lighting.lamps[0].radiance)) == Approx(40.0));
  CHECK(lighting.lamps[0].radiance.x > lighting.lamps[0].radiance.z);
}

TEST_CASE("A ball lamp lights a matt card by pi L (r / d)^2", "[lighting]") {
  for (const float distance : {0.6f, 2.0f, 20.0f}) {
    Lighting lighting;
    lighting.lamps = {{Vec3f(0.0f, 0.0f, distance), 0.5f, Vec3f(2.0f)}};
    const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 50.0f);
    RenderJob job;
    job.shell = &card;
    job.camera = test::camera_from_above(8, 1e-4);  // as good as the foot point alone
    job.camera.front_mm = 1e-3;                     // the view starts below the lamp
    job.lighting = lighting;
    job.materials = test::of_albedo(0.7f);
    job.samples_per_pixel = 256;
    const test::Mean mean = test::mean_of_covered(render(job, Silent()));
    // The start of shadow rays lies kSafeOffset nearer to the lamp.
    const double d = static_cast<double>(distance - test::kSafeOffset);
    INFO("distance " << distance << ": " << mean.value() << " +- " << mean.standard_error());
    CHECK(std::abs(mean.value() - 0.7 * 2.0 * 0.25 / (d * d)) < 4.0 * mean.standard_error() + 1e-5 * mean.value());
  }
}

TEST_CASE("A lamp hides another lamp behind it", "[lighting]") {
  Lighting lighting;
  lighting.lamps = {{Vec3f(0.0f, 0.0f, 10.0f), 0.5f, Vec3f(3.0f)}, {Vec3f(0.0f, 0.0f, 4.0f), 1.0f, Vec3f(0.0f)}};
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 5.0f);
  RenderJob job;
  job.shell = &card;
  job.camera = test::camera_from_above(8, 0.01);
  job.camera.front_mm = 1.0;
  job.lighting = lighting;
  job.materials = test::of_albedo(0.7f);
  const test::Mean hidden = test::mean_of_covered(render(job, Silent()));
  CHECK(hidden.value() == 0.0);
  job.lighting.lamps[1].centre.x = 5.0f;
  CHECK(test::mean_of_covered(render(job, Silent())).value() > 0.0);
}
