// SPDX-License-Identifier: Apache-2.0
// Every finish that a scene file can name, and the whitened look: light is neither lost on white shell nor ever made.
#include "support/analytic_solids.h"
#include "support/catch.h"
#include "support/shell_specimen.h"
#include "support/studio_light.h"
#include "trace/embree_solid.h"

#include <array>

using namespace whorl;
using namespace whorl::transport;
using Kind = specimen::Finish;
using specimen::Mineral;

namespace {

constexpr std::array kFinishes = {Kind::kPlain, Kind::kPolished, Kind::kGlazed, Kind::kPeriostracum, Kind::kNacre};

/// What a scene file makes of a finish on shell of an even colour; `gloss` is that of plain shell.
Materials of_finish(Kind finish, Mineral mineral, double gloss, specimen::Colour body, specimen::Colour periostracum = {255, 255, 255}) {
  static const test::Shell shell{test::ShellPlan{}};
  specimen::Specimen s = test::specimen_of(shell.plan);
  s.identity.mineral.value = mineral;
  s.look.exterior.value = s.look.interior.value = body;
  s.look.exterior_finish.value = s.look.interior_finish.value = finish;
  s.look.gloss.value = gloss;
  s.look.periostracum.value = periostracum;
  Materials materials = make_materials(shell.field, s);
  materials.paint = nullptr;  // balls have no growth
  return materials;
}

RenderJob job_on(const trace::Surfaces& shell, const Camera& camera, const Materials& materials, int samples, std::uint64_t seed) {
  RenderJob job;
  job.shell = &shell;
  job.camera = camera;
  job.lighting = test::white_dome();
  job.materials = materials;
  job.samples_per_pixel = samples;
  job.seed = seed;
  return job;
}

}  // namespace

TEST_CASE("White shell under every finish vanishes in a white dome, on a ball and in a hollow", "[furnace]") {
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  const test::OpenSphere hollow(1.0f, 0.10);
  for (const Kind finish : kFinishes)
    for (const Mineral mineral : {Mineral::kAragonite, Mineral::kCalcite}) {
      if (mineral == Mineral::kCalcite && (finish == Kind::kPeriostracum || finish == Kind::kNacre)) continue;  // not of mineral
      const Materials materials = of_finish(finish, mineral, 0.3, {255, 255, 255});
      const test::Mean outside =
          test::mean_of_covered(render(job_on(ball, test::camera_from_above(24, 2.2), materials, 128, 1), Silent()));
      const test::Mean inside =
          test::mean_of_covered(render(job_on(hollow, test::camera_from_above(24, 0.8), materials, 64, 2), Silent()));
      INFO("finish " << static_cast<int>(finish) << " mineral " << static_cast<int>(mineral) << ": " << outside.value() << " +- "
                     << outside.standard_error() << ", in the hollow " << inside.value() << " +- " << inside.standard_error());
      // 4 standard errors, and the errors of the coats' tables: once outside, at each of ten bounces in the hollow.
      CHECK(std::abs(outside.value() - 1.0) < 4.0 * outside.standard_error() + 5e-5);
      CHECK(std::abs(inside.value() - 1.0) < 4.0 * inside.standard_error() + 5e-4);
    }
}

TEST_CASE("A coloured ball under every finish returns E + (1 - E) a of the dome's light, in each channel", "[furnace]") {
  // Seen from afar the disc holds all directions by their cosine, so its mean is that of Bond's albedo: E, the coat's mean albedo, and
  // of the rest the share a of the body.
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  const specimen::Colour body{240, 180, 60}, skin{150, 100, 40};
  for (const Kind finish : kFinishes) {
    const Materials materials = of_finish(finish, Mineral::kAragonite, 0.0, body, skin);
    const Vec3f a = materials.exterior * materials.outer.tint;
    const Vec3f e = materials.outer.nacre ? materials.outer.nacre->mean(1.0f) : Vec3f(materials.outer.coat->mean());
    std::array<test::Mean, 3> disc;
    for (std::uint64_t seed = 0; seed < 8; ++seed) {
      const Camera camera = test::camera_from_above(24, 2.4);
      const Film film = render(job_on(ball, camera, materials, 64, seed), Silent());
      Vec3 sum(0.0);
      for (const Vec3f& radiance : film.radiance) sum += Vec3(radiance);
      for (int c = 0; c < 3; ++c) disc[static_cast<std::size_t>(c)].add(sum[c] * camera.mm_per_px * camera.mm_per_px / kPi);
    }
    for (int c = 0; c < 3; ++c) {
      const test::Mean& found = disc[static_cast<std::size_t>(c)];
      const double wanted = static_cast<double>(e[c] + (1.0f - e[c]) * a[c]);
      INFO("finish " << static_cast<int>(finish) << " channel " << c << ": " << found.value() << " +- " << found.standard_error()
                     << ", closed form " << wanted);
      CHECK(std::abs(found.value() - wanted) < 4.0 * found.standard_error() + 5e-5);
      CHECK(found.value() < 1.0);
    }
  }
}

TEST_CASE("Whitened shell in a white dome is nowhere brighter than its coat", "[furnace]") {
  // A path over matt surfaces carries at most the greatest albedo: not only the mean, each pixel is bound by it.
  const test::Shell shell(test::globose_plan());
  const trace::EmbreeSolid solid(shell.field, {1e-3, false});
  const Materials materials = whitened(make_materials(shell.field, test::specimen_of(shell.plan)), shell.field);
  const double reach = 2.0 * shell.scene.bounds.max.length();
  const Film film = render(job_on(solid, test::camera_from_above(32, reach, reach), materials, 32, 1), Silent());
  int seen = 0;
  test::Mean mean;
  for (std::size_t i = 0; i < film.size(); ++i) {
    if (film.coverage[i] != 1.0f) continue;
    ++seen;
    mean.add(static_cast<double>(film.radiance[i].y));
    CHECK(film.radiance[i].x <= Whitening::kCoat * 1.00001f);
    CHECK(film.radiance[i].y <= Whitening::kCoat * 1.00001f);
    CHECK(film.radiance[i].z <= Whitening::kCoat * 1.00001f);
  }
  CHECK(seen > 100);
  CHECK(mean.value() > 0.5 * static_cast<double>(Whitening::kCoat));
}
