// SPDX-License-Identifier: Apache-2.0
// With the mouth as a portal a picture is the same as without, and what several lamps give is the sum of what each gives.
#include "compile/compile.h"
#include "plate/views.h"
#include "support/catch.h"
#include "support/shell_specimen.h"
#include "support/studio_light.h"
#include "trace/embree_solid.h"
#include "transport/path_tracer.h"

using namespace whorl;

namespace {

struct Mouthed {
  test::Shell shell{test::globose_plan()};
  trace::EmbreeSolid solid{shell.field, {1e-5 * shell.height(), false}};

  transport::RenderJob job(int samples) const {
    const scene::Mouth& mouth = shell.scene.mouth;
    const plate::View view = plate::make_view(specimen::ViewName::kApertural, shell.scene.law.theta_lip, specimen::Coiling::kDextral);
    transport::RenderJob job;
    job.shell = &solid;
    job.camera.page = view.page_to_shell;
    job.camera.width_px = job.camera.height_px = 20;
    job.camera.mm_per_px = 1.6 * std::max(mouth.half_u.length(), mouth.half_v.length()) / 20;
    job.camera.anchor_mm = mouth.centre;
    job.camera.anchor_px = Vec2(10.0);
    job.camera.front_mm = 2.0 * shell.height();
    job.materials = test::of_albedo(0.5f, 0.3);
    job.samples_per_pixel = samples;
    return job;
  }
};

double luminance_of(const transport::Film& film) {
  double sum = 0.0;
  for (const Vec3f& c : film.radiance) sum += static_cast<double>(c.y);
  return sum / static_cast<double>(film.size());
}

// Mean of pictures with different seeds, and its standard error.
test::Mean mean_light(transport::RenderJob job, int pictures) {
  test::Mean mean;
  for (int i = 0; i < pictures; ++i) {
    job.seed = static_cast<std::uint64_t>(100 + i);
    mean.add(luminance_of(render(job, transport::Silent())));
  }
  return mean;
}

}  // namespace

TEST_CASE("The mouth as a portal changes no picture", "[transport]") {
  const Mouthed mouthed;
  const scene::Mouth& mouth = mouthed.shell.scene.mouth;
  transport::RenderJob job = mouthed.job(64);
  job.lighting = test::white_dome();
  const test::Mean without = mean_light(job, 8);
  job.lighting.portal = shaders_cpu::Portal{mouth.centre, mouth.half_u, mouth.half_v, mouth.outwards};
  const test::Mean with = mean_light(job, 8);
  INFO(with.value() << " +- " << with.standard_error() << ", without " << without.value() << " +- " << without.standard_error());
  CHECK(std::abs(with.value() - without.value()) < 4.0 * std::hypot(with.standard_error(), without.standard_error()) + 1e-6);
  CHECK(with.standard_error() < 0.01 * with.value());
}

TEST_CASE("The mouth's rectangle holds the edge of the lumen, and looks out of it", "[compile]") {
  for (const double inclination : {0.0, 25.0, -25.0}) {
    test::ShellPlan plan = test::globose_plan();
    plan.inclination_deg = inclination;
    const test::Shell shell(plan);
    const scene::Mouth& mouth = shell.scene.mouth;
    CAPTURE(inclination);
    const double step = 0.2 * shell.scene.law.half_breadth;
    CHECK(shell.at(mouth.centre - step * mouth.outwards) == field::State::kLumen);
    CHECK(shell.at(mouth.centre + step * mouth.outwards) == field::State::kOutside);
    CHECK(mouth.half_u.dot(mouth.half_v) == Approx(0.0).margin(1e-9));
    // From within, every way out goes through it: rays to the air that miss the rectangle by a tenth meet shell.
    const Vec3 within = mouth.centre - 2.0 * step * mouth.outwards;
    REQUIRE(shell.at(within) == field::State::kLumen);
    for (int i = 0; i < 64; ++i) {
      const double turn = kTwoPi * i / 64;
      const double reach = 1.15 / std::max(std::abs(std::cos(turn)), std::abs(std::sin(turn)));  // on a rectangle 15 % larger
      const Vec3 target = mouth.centre + reach * (std::cos(turn) * mouth.half_u + std::sin(turn) * mouth.half_v);
      bool barred = false;
      for (double s = 0.0; s < 1.0 && !barred; s += 0.002) barred = shell.at(within + s * (target - within)) == field::State::kSolid;
      CAPTURE(turn);
      CHECK(barred);
    }
  }
}

TEST_CASE("Lamps that are chosen by chance add up to what each gives alone", "[transport]") {
  const Mouthed mouthed;
  const growth::CoilingLaw& law = mouthed.shell.scene.law;
  std::vector<shaders_cpu::SphereLamp> lamps;
  for (int i = 0; i < 5; ++i)
    lamps.push_back({Vec3f(test::in_tube(law, law.theta_lip - 0.4 - 0.25 * i, 1.2 * i, 0.35)), 0.15f + 0.1f * static_cast<float>(i),
                     Vec3f(4.0f + 3.0f * static_cast<float>(i))});
  transport::RenderJob job = mouthed.job(64);
  double sum = 0.0, error2 = 0.0;
  for (const shaders_cpu::SphereLamp& lamp : lamps) {
    // The others hang there dark, and bar the way as before.
    job.lighting.lamps = lamps;
    for (shaders_cpu::SphereLamp& other : job.lighting.lamps)
      if ((other.centre - lamp.centre).length() > 0.0f) other.radiance = Vec3f(0.0f);
    const test::Mean one = mean_light(job, 6);
    sum += one.value();
    error2 += one.standard_error() * one.standard_error();
  }
  job.lighting.lamps = lamps;
  const test::Mean all = mean_light(job, 6);
  INFO(all.value() << " +- " << all.standard_error() << ", one by one " << sum << " +- " << std::sqrt(error2));
  CHECK(std::abs(all.value() - sum) < 4.0 * std::hypot(all.standard_error(), std::sqrt(error2)));
  CHECK(all.standard_error() < 0.02 * all.value());
}
