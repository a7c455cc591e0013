// SPDX-License-Identifier: Apache-2.0
// Closed forms that hold for all light at once: white furnaces and integrating spheres.
#include "support/analytic_solids.h"
#include "support/catch.h"
#include "support/studio_light.h"

using namespace whorl;
using namespace whorl::transport;

namespace {

RenderJob job_on(const trace::Surfaces& shell, const Camera& camera, int samples) {
  RenderJob job;
  job.shell = &shell;
  job.camera = camera;
  job.samples_per_pixel = samples;
  job.seed = 4711;
  return job;
}

/// M of an integrating sphere: mean number of reflections of the light that lands on its wall (theory e.g. Goebel 1967,
/// Generalized Integrating-Sphere Theory, Applied Optics 6).
double multiplier(double albedo, double opening) { return albedo / (1.0 - albedo * (1.0 - opening)); }

}  // namespace

TEST_CASE("A white ball vanishes in a white dome, whatever its gloss", "[furnace]") {
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  for (const double gloss : {-1.0, 0.0, 0.35, 0.7, 1.0}) {
    RenderJob job = job_on(ball, test::camera_from_above(32, 2.2), 256);
    job.lighting = test::white_dome();
    job.materials = test::of_albedo(1.0f, gloss);
    const Film film = render(job, Silent());
    const test::Mean mean = test::mean_of_covered(film);
    INFO("gloss " << gloss << ": " << mean.value() << " +- " << mean.standard_error());
    // 4 standard errors, and 5e-5 for the table of the coat's albedo (its own test).
    CHECK(std::abs(mean.value() - 1.0) < 4.0 * mean.standard_error() + 5e-5);
    CHECK(mean.standard_error() < 2e-3);
    CHECK(film.non_finite == 0);
  }
}

TEST_CASE("A white hollow vanishes in a white dome: no light is lost over many bounces", "[furnace]") {
  const test::OpenSphere hollow(1.0f, 0.10);
  for (const double gloss : {-1.0, 0.0, 0.5, 1.0}) {
    RenderJob job = job_on(hollow, test::camera_from_above(24, 0.8), 128);
    job.lighting = test::white_dome();
    job.materials = test::of_albedo(1.0f, gloss);
    const test::Mean mean = test::mean_of_covered(render(job, Silent()));
    INFO("gloss " << gloss << ": " << mean.value() << " +- " << mean.standard_error());
    // Ten bounces on average, each with the table's error.
    CHECK(std::abs(mean.value() - 1.0) < 4.0 * mean.standard_error() + 5e-4);
    CHECK(mean.standard_error() < 4e-3);
  }
}

TEST_CASE("A body of albedo below 1 is darker than the dome", "[furnace]") {
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  for (const double gloss : {-1.0, 0.0, 0.5, 1.0}) {
    RenderJob job = job_on(ball, test::camera_from_above(24, 2.2), 64);
    job.lighting = test::white_dome();
    job.materials = test::of_albedo(0.5f, gloss);
    const test::Mean mean = test::mean_of_covered(render(job, Silent()));
    CHECK(mean.value() < 0.62);
    CHECK(mean.value() > 0.49);
    if (gloss < 0.0) CHECK(mean.value() == Approx(0.5).epsilon(1e-4));  // matt: exactly the albedo
  }
}

TEST_CASE("A hollow sphere lit through its opening shines as an integrating sphere", "[cavity]") {
  // The opening is a patch of radiance 1 on the sphere: wall radiance = f M, exactly and everywhere.
  const struct { float albedo; double opening; } cases[] = {{0.8f, 0.01}, {0.9f, 0.02}, {0.95f, 0.005}};
  for (const auto& c : cases) {
    const test::OpenSphere hollow(1.0f, c.opening);
    const double view = 1.2 * std::sqrt(c.opening);  // a square that lies within the opening
    RenderJob job = job_on(hollow, test::camera_from_above(40, view), 256);
    job.lighting = test::white_dome();
    job.materials = test::of_albedo(c.albedo);
    const test::Mean mean = test::mean_of_covered(render(job, Silent()));
    const double expected = c.opening * multiplier(static_cast<double>(c.albedo), c.opening);
    INFO("albedo " << c.albedo << " opening " << c.opening << ": " << mean.value() << " +- " << mean.standard_error()
                   << ", theory " << expected);
    CHECK(mean.sigmas_from(expected) < 4.0);
    CHECK(mean.standard_error() < 0.006 * expected);
  }
}

TEST_CASE("A small lamp in a hollow sphere lights its wall by the integrating-sphere multiplier", "[cavity]") {
  // Lamp at the centre: direct irradiance pi L r^2, even; with the indirect light the wall's radiance is L r^2 M. The lamp
  // itself is black and takes r^2 of all crossings: a part M r^2 of the answer, allowed for.
  const struct { float albedo; double opening; } cases[] = {{0.8f, 0.01}, {0.9f, 0.02}, {0.95f, 0.005}};
  for (const auto& c : cases) {
    const test::OpenSphere hollow(1.0f, c.opening);
    RenderJob job = job_on(hollow, test::camera_from_above(40, 1.2 * std::sqrt(c.opening)), 64);
    constexpr float kRadius = 0.002f;
    job.lighting.lamps = {{Vec3f(0.0f), kRadius, Vec3f(1.0f / (kRadius * kRadius))}};
    job.materials = test::of_albedo(c.albedo);
    const Film film = render(job, Silent());
    test::Mean mean;  // pixels that show the lamp, and those next to them, are left out
    for (int y = 0; y < film.height; ++y)
      for (int x = 0; x < film.width; ++x)
        if (std::hypot(x - 19.5, y - 19.5) > 6.0) mean.add(static_cast<double>(film.radiance[film.index(x, y)].y));
    const double m = multiplier(static_cast<double>(c.albedo), c.opening);
    INFO("albedo " << c.albedo << " opening " << c.opening << ": " << mean.value() << " +- " << mean.standard_error()
                   << ", theory " << m);
    CHECK(std::abs(mean.value() - m) < 4.0 * mean.standard_error() + m * m * 4e-6);
    CHECK(mean.standard_error() < 0.003 * m);
  }
}

TEST_CASE("A lamp anywhere in a hollow sphere gives the same even indirect light", "[cavity]") {
  // Off-centre lamp: mean radiance over the whole sphere is Phi_w M / (pi A); a camera above sees only its lower part, so
  // the direct light there is taken off in closed form: E = pi L (r/d)^2 cos at each place, radiance albedo E / pi.
  const float albedo = 0.9f;
  const double opening = 0.02;
  const test::OpenSphere hollow(1.0f, opening);
  const Vec3 lamp(0.5, 0.2, -0.1);
  constexpr double kRadius = 0.01;
  RenderJob job = job_on(hollow, test::camera_from_above(40, 1.2 * std::sqrt(opening)), 128);
  job.lighting.lamps = {{Vec3f(lamp), static_cast<float>(kRadius), Vec3f(static_cast<float>(1.0 / (kRadius * kRadius)))}};
  job.materials = test::of_albedo(albedo);
  const Film film = render(job, Silent());
  test::Mean indirect;
  for (int y = 0; y < film.height; ++y)
    for (int x = 0; x < film.width; ++x) {
      const double px = (x + 0.5 - 20.0) * job.camera.mm_per_px, py = (20.0 - y - 0.5) * job.camera.mm_per_px;
      const Vec3 place(px, py, -std::sqrt(1.0 - px * px - py * py)), to_lamp = lamp - place;
      const double d2 = to_lamp.dot(to_lamp), cosine = -place.dot(to_lamp) / std::sqrt(d2);
      indirect.add(static_cast<double>(film.radiance[film.index(x, y)].y) - 0.9 * cosine / d2);
    }
  // Phi = 4 pi^2 for L r^2 = 1; the share that the opening takes: the solid angle of its rim seen from the lamp, by
  // quadrature over the cap.
  double lost = 0.0;
  for (int i = 0; i < 200; ++i)
    for (int j = 0; j < 200; ++j) {
      const double z = 1.0 - 2.0 * opening * (i + 0.5) / 200, s = std::sqrt(1.0 - z * z), turn = kTwoPi * (j + 0.5) / 200;
      const Vec3 place(s * std::cos(turn), s * std::sin(turn), z), from = place - lamp;
      lost += from.dot(place) / std::pow(from.length(), 3) * 2.0 * opening * kTwoPi / (200.0 * 200.0);
    }
  const double wall_flux = 4.0 * kPi * kPi * (1.0 - lost / (4.0 * kPi)), m = multiplier(0.9, opening);
  const double expected = 0.9 * wall_flux * m / (4.0 * kPi) / kPi;  // albedo times Phi_w M / A over pi
  INFO(indirect.value() << " +- " << indirect.standard_error() << ", theory " << expected);
  CHECK(std::abs(indirect.value() - expected) < 4.0 * indirect.standard_error() + expected * m * kRadius * kRadius);
}
