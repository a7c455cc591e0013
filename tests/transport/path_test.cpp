// SPDX-License-Identifier: Apache-2.0
// Single paths: the joint sampling of lights, what lamps hide, and hits that are not as they should be.
#include "transport/path.h"

#include "support/analytic_solids.h"
#include "support/catch.h"
#include "support/studio_light.h"

using namespace whorl;
using namespace whorl::transport;
using shaders_cpu::SurfaceView;

namespace {

/// Mean radiance along one ray, from independent scrambled nets.
test::Mean radiance_along(const trace::Surfaces& shell, const Lighting& lighting, const Materials& materials,
                          const trace::Ray& ray, RayCounts& counts) {
  const PathTracer paths(shell, lighting, materials);
  test::Mean mean;
  for (std::uint32_t key = 0; key < 64; ++key) {
    SobolStream stream({key, 1, 2, 0, 3});
    double sum = 0.0;
    for (std::uint32_t i = 0; i < 1024; ++i) {
      stream.set_point(i);
      sum += static_cast<double>(paths.look(ray, stream, 0, counts).radiance.y);
    }
    mean.add(sum / 1024.0);
  }
  return mean;
}

/// Down onto the origin at `angle_deg` from the vertical.
trace::Ray slanting(double angle_deg) {
  const Vec3f back(Vec3(std::sin(radians(angle_deg)), 0.0, std::cos(radians(angle_deg))));
  trace::Ray ray;
  ray.origin = back * 3.0f;
  ray.direction = -back;
  return ray;
}

/// Integral of BRDF times cosine over the cone round `axis`, by the midpoint rule: what light of radiance 1 from the cone
/// makes of the surface with normal z.
double reflected_cone(const SurfaceView& view, const Vec3& axis, double sine) {
  const Frame frame = frame_around(axis);
  const double drop_all = 1.0 - std::sqrt(1.0 - sine * sine);
  double sum = 0.0;
  constexpr int kRings = 1200, kSpokes = 720;
  for (int i = 0; i < kRings; ++i) {
    // Rings crowd towards the axis, where a smooth coat may have its peak.
    const double a = static_cast<double>(i) / kRings, b = static_cast<double>(i + 1) / kRings;
    const double share = b * b * b - a * a * a, drop = drop_all * std::pow(0.5 * (a + b), 3);
    const double s = std::sqrt(drop * (2.0 - drop));
    for (int j = 0; j < kSpokes; ++j) {
      const double turn = kTwoPi * (j + 0.5) / kSpokes;
      const Vec3f wi(frame.to_world({s * std::cos(turn), s * std::sin(turn), 1.0 - drop}));
      sum += static_cast<double>(view.reflect(wi).value.y * std::max(0.0f, wi.z)) * share * drop_all * kTwoPi / kSpokes;
    }
  }
  return sum;
}

}  // namespace

TEST_CASE("Lamp and key are gathered by lights and by scattering together without gain or loss", "[path]") {
  // The light source stands in the mirror direction, where the two ways to find it compete. Expected: quadrature.
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 50.0f);
  const Vec3 mirror(-std::sin(radians(50.0)), 0.0, std::cos(radians(50.0)));
  for (const double gloss : {-1.0, 0.0, 0.5, 0.8, 1.0}) {
    const Materials materials = test::of_albedo(0.3f, gloss);
    const SurfaceView view({Vec3f(0.3f), materials.outer.coat.get()}, -slanting(50.0).direction);
    RayCounts counts;

    Lighting lamp;
    const Vec3 start(0.0, 0.0, static_cast<double>(test::kSafeOffset));  // where shadow rays begin
    lamp.lamps = {{Vec3f(start + mirror * 4.0), 1.0f, Vec3f(5.0f)}};
    const test::Mean by_lamp = radiance_along(card, lamp, materials, slanting(50.0), counts);
    const double lamp_expected = 5.0 * reflected_cone(view, mirror, 0.25);
    INFO("gloss " << gloss << " lamp " << by_lamp.value() << " +- " << by_lamp.standard_error() << ", quadrature "
                  << lamp_expected);
    CHECK(std::abs(by_lamp.value() - lamp_expected) < 4.0 * by_lamp.standard_error() + 2e-4 * lamp_expected);

    Lighting key;
    key.key = {shaders_cpu::key_cone(mirror, 12.0), Vec3f(5.0f)};
    const test::Mean by_key = radiance_along(card, key, materials, slanting(50.0), counts);
    const double key_expected = 5.0 * reflected_cone(view, mirror, std::sin(radians(12.0)));
    INFO("key " << by_key.value() << " +- " << by_key.standard_error() << ", quadrature " << key_expected);
    CHECK(std::abs(by_key.value() - key_expected) < 4.0 * by_key.standard_error() + 2e-4 * key_expected);
  }
}

TEST_CASE("A place inside a lamp is bathed in its light", "[path]") {
  // From inside an even ball the radiance is L from everywhere: a matt card shows albedo L.
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 50.0f);
  Lighting lighting;
  lighting.lamps = {{Vec3f(0.0f, 0.0f, 0.2f), 1.0f, Vec3f(3.0f)}};
  trace::Ray ray;
  ray.origin = {0.0f, 0.0f, 0.1f};  // the eye is inside too, and looks down at the card
  ray.direction = {0.0f, 0.0f, -1.0f};
  RayCounts counts;
  const test::Mean mean = radiance_along(card, lighting, test::of_albedo(0.4f), ray, counts);
  CHECK(std::abs(mean.value() - 1.2) < 4.0 * mean.standard_error() + 1e-5);
}

TEST_CASE("The eye sees a lamp as it is, and the shell in front of it", "[path]") {
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 1.0f);
  Lighting lighting;
  lighting.lamps = {{Vec3f(0.0f, 0.0f, 2.0f), 0.5f, Vec3f(7.0f)}, {Vec3f(0.5f, 0.0f, -2.0f), 0.4f, Vec3f(9.0f)}};
  const Materials materials = test::of_albedo(0.0f);
  const PathTracer paths(card, lighting, materials);
  const SobolStream stream(SampleKey{});
  RayCounts counts;
  trace::Ray ray;
  ray.direction = {0.0f, 0.0f, -1.0f};
  ray.origin = {0.0f, 0.0f, 5.0f};
  CHECK(paths.look(ray, stream, 0, counts).radiance.x == 7.0f);
  ray.origin.x = 0.7f;
  CHECK(paths.look(ray, stream, 0, counts).radiance.x == 0.0f);  // the second lamp lies behind the card
  CHECK(paths.look(ray, stream, 0, counts).hit);
  ray.origin.x = 3.0f;
  CHECK_FALSE(paths.look(ray, stream, 0, counts).hit);
}

namespace {

/// A ball whose hits carry faults: normals that look away or are no numbers.
class FaultyBall final : public trace::Surfaces {
 public:
  enum class Fault { kInwardNormal, kSidewaysNormal, kNoNumber };
  explicit FaultyBall(Fault fault) : fault_(fault) {}
  bool closest(const trace::Ray& ray, trace::Hit& hit) const noexcept override {
    if (!ball_.closest(ray, hit)) return false;
    if (fault_ == Fault::kInwardNormal) hit.normal = -hit.normal;
    if (fault_ == Fault::kSidewaysNormal) hit.normal = Vec3f(ray.direction.y, -ray.direction.x, 0.1f).normalized();
    if (fault_ == Fault::kNoNumber && hit.position.x > 0.0f) hit.normal = Vec3f(std::numeric_limits<float>::quiet_NaN());
    return true;
  }
  bool occluded(const trace::Ray& ray) const noexcept override { return ball_.occluded(ray); }
  trace::GrowthPlace growth_place(const trace::Hit& hit) const noexcept override { return ball_.growth_place(hit); }

 private:
  test::Ball ball_{Vec3f(0.0f), 1.0f};
  Fault fault_;
};

}  // namespace

TEST_CASE("Normals that look away from the eye never add light nor break a picture", "[path]") {
  for (const auto fault : {FaultyBall::Fault::kInwardNormal, FaultyBall::Fault::kSidewaysNormal}) {
    const FaultyBall ball(fault);
    RenderJob job;
    job.shell = &ball;
    job.camera = test::camera_from_above(16, 2.2);
    job.lighting = test::white_dome();
    job.materials = test::of_albedo(1.0f, 0.5);
    const Film film = render(job, Silent());
    CHECK(film.non_finite == 0);
    for (std::size_t i = 0; i < film.size(); ++i) {
      CHECK(std::isfinite(film.radiance[i].y));
      CHECK(film.radiance[i].y >= 0.0f);
      CHECK(film.radiance[i].y < 1.3f);  // 1 but for noise
    }
  }
}

TEST_CASE("A hit that is no number is counted or dark, and leaves its neighbours alone", "[path]") {
  const FaultyBall faulty(FaultyBall::Fault::kNoNumber);
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  RenderJob job;
  job.shell = &faulty;
  job.camera = test::camera_from_above(16, 2.2);
  job.lighting = test::white_dome();
  job.lighting.key = {shaders_cpu::key_cone(Vec3(0, 0, 1), 10.0), Vec3f(1.0f)};
  job.materials = test::of_albedo(0.5f);
  const Film film = render(job, Silent());
  job.shell = &ball;
  const Film sound = render(job, Silent());
  for (int y = 0; y < 16; ++y)
    for (int x = 0; x < 16; ++x) {
      const std::size_t i = film.index(x, y);
      CHECK(std::isfinite(film.radiance[i].y));
      if (x < 6) CHECK(film.radiance[i] == sound.radiance[i]);
    }
}

TEST_CASE("Samples that are not finite are thrown away and counted", "[path]") {
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 5.0f);
  RenderJob job;
  job.shell = &card;
  job.camera = test::camera_from_above(32, 8.0);
  job.lighting.lamps = {{Vec3f(0.0f, 0.0f, 4.0f), 1.0f, Vec3f(std::numeric_limits<float>::infinity())}};
  job.materials = test::of_albedo(0.0f);
  const Film film = render(job, Silent());
  CHECK(film.non_finite > 0);
  for (const Vec3f& c : film.radiance) CHECK(std::isfinite(c.x));
}
