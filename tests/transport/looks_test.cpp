// SPDX-License-Identifier: Apache-2.0
// Radiograph and whitening on compiled shells.
#include "measure/integrals.h"
#include "shaders_cpu/tone/curve.h"
#include "support/catch.h"
#include "support/shell_specimen.h"
#include "transport/materials.h"
#include "transport/radiograph.h"

#include <cmath>

using namespace whorl;
using test::Shell;
using test::ShellPlan;

namespace {

transport::RadiographJob job_of(const trace::EmbreeSolid& solid, const Shell& shell, int width) {
  const Box3& box = shell.scene.bounds;
  const double reach = 1.01 * std::max(box.min.length(), box.max.length());
  transport::RadiographJob job;
  job.solid = &solid;
  job.camera.page = {{1.0, 0.0, 0.0}, {0.0, 0.0, -1.0}, {0.0, 1.0, 0.0}};
  job.camera.width_px = job.camera.height_px = width;
  job.camera.mm_per_px = 2.0 * reach / width;
  job.camera.anchor_px = Vec2(0.5 * width);
  job.camera.front_mm = reach;
  return job;
}

ShellPlan sculptured() {
  ShellPlan plan;
  plan.whorls = 3.5;
  plan.D = 0.15;
  plan.lobes = {{30.0, 0.12, 16.0}, {-20.0, -0.10, 16.0}};
  return plan;
}

}  // namespace

TEST_CASE("The minus logarithm of a radiograph, summed over the picture, is attenuation times the volume of the wall",
          "[transport]") {
  ShellPlan plan = test::self_similar_plan();
  const Shell shell(plan);
  const trace::EmbreeSolid solid(shell.field, {1e-3, false});
  transport::RadiographJob job = job_of(solid, shell, 160);
  job.attenuation_per_mm = 0.01;  // so thin that the mean of the transmission over a pixel is the transmission of the mean
  job.samples_per_pixel = 16;
  const transport::Film film = radiograph(job, transport::Silent());
  double sum = 0.0;
  for (std::size_t i = 0; i < film.size(); ++i) {
    if (film.coverage[i] == 0.0f) continue;
    const double cover = static_cast<double>(film.coverage[i]);
    const double passed = shaders_cpu::tone(static_cast<double>(film.radiance[i].x) / cover);
    sum += -std::log(passed) * cover;
  }
  const double volume = sum * job.camera.mm_per_px * job.camera.mm_per_px / job.attenuation_per_mm;
  const measure::Integrals measured = measure::integrate(solid, {1 << 18, 1});
  CHECK(volume == Approx(measured.wall_volume.value).epsilon(0.01).margin(3.0 * measured.wall_volume.error));
}

TEST_CASE("On black ground a radiograph shows one minus what it shows on white", "[transport]") {
  const Shell shell(test::self_similar_plan());
  const trace::EmbreeSolid solid(shell.field, {1e-3, false});
  transport::RadiographJob job = job_of(solid, shell, 48);
  job.attenuation_per_mm = 1.669;
  const transport::Film dark = radiograph(job, transport::Silent());
  job.bright_shell = true;
  const transport::Film bright = radiograph(job, transport::Silent());
  int seen = 0;
  for (std::size_t i = 0; i < dark.size(); ++i) {
    CHECK(dark.coverage[i] == bright.coverage[i]);
    if (dark.coverage[i] == 0.0f) continue;
    const double cover = static_cast<double>(dark.coverage[i]);
    const double a = shaders_cpu::tone(static_cast<double>(dark.radiance[i].x) / cover);
    const double b = shaders_cpu::tone(static_cast<double>(bright.radiance[i].x) / cover);
    CHECK(a + b == Approx(1.0).margin(1e-5));
    ++seen;
  }
  CHECK(seen > 200);
}

TEST_CASE("The coat is thicker on a keel than on the flank, and thinner in a groove and in the suture", "[transport]") {
  const Shell shell(sculptured());
  const transport::Whitening coat(shell.field);
  const double theta = shell.scene.law.theta_lip - 2.0;
  const PeriodicSpline& reach = shell.scene.outlines[shell.scene.stations.front().outer].reach;
  const auto at = [&](double psi_deg) {
    trace::Hit hit;
    hit.position = Vec3f(test::in_tube(shell.scene.law, theta, radians(psi_deg), reach.value(radians(psi_deg))));
    hit.part = trace::Part::kExterior;
    return hit;
  };
  const auto relief = [&](double psi_deg) { return coat.relief(Vec3(at(psi_deg).position), false); };
  CHECK(relief(30.0) > relief(70.0));
  CHECK(relief(70.0) > 0.0);
  CHECK(relief(-20.0) < 0.0);
  CHECK(coat.albedo(at(30.0)).x > coat.albedo(at(70.0)).x);
  CHECK(coat.albedo(at(70.0)).x > coat.albedo(at(-20.0)).x);
  // The suture: where the whorl meets the one before, coming from above.
  double low = 90.0, high = 180.0;  // outside of all other shell, and within it
  for (int i = 0; i < 60; ++i) {
    const double middle = 0.5 * (low + high);
    const field::Place place = shell.field.place_at(Vec3(at(middle).position) + Vec3(0.0, 0.0, -1e-3));
    (place.state == field::State::kOutside ? low : high) = middle;
  }
  CHECK(relief(low) < relief(70.0));
}

TEST_CASE("Whitened shell is grey, matt and the same whatever its colours", "[transport]") {
  const Shell shell(sculptured());
  specimen::Specimen one = test::specimen_of(sculptured()), other = one;
  other.look.exterior.value = {10, 120, 30};
  other.look.interior.value = {200, 0, 0};
  other.look.gloss.value = 1.0;
  const transport::Materials a = transport::whitened(transport::make_materials(shell.field, one), shell.field);
  const transport::Materials b = transport::whitened(transport::make_materials(shell.field, other), shell.field);
  for (double psi = -3.0; psi < 3.0; psi += 0.25) {
    trace::Hit hit;
    hit.position = Vec3f(test::in_tube(shell.scene.law, 12.0, psi, 1.0));
    for (const trace::Part part : {trace::Part::kExterior, trace::Part::kInterior, trace::Part::kOrnament}) {
      hit.part = part;
      const shaders_cpu::CoatedDiffuse x = a.surface(hit), y = b.surface(hit);
      CHECK(x.albedo == y.albedo);
      CHECK((x.albedo.x == x.albedo.y && x.albedo.y == x.albedo.z));
      CHECK((x.coat == nullptr && y.coat == nullptr));
    }
  }
}
