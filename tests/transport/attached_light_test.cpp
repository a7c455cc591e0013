// SPDX-License-Identifier: Apache-2.0
// Light on what stands on a shell: none is lost or made, each keeps its colour, and matter counts once in a radiograph.
#include "support/attached_scene.h"
#include "support/catch.h"
#include "support/studio_light.h"
#include "trace/united_solid.h"
#include "transport/materials.h"
#include "transport/path_tracer.h"
#include "transport/radiograph.h"

#include <cmath>

using namespace whorl;
using namespace whorl::transport;

namespace {

const char* const kOnIt =
    "[[spine]]\nper_whorl = 5\nlength = 6\nbreadth = 1.6\nat = 60\nbend = 50\nhollow = 0.6\nopen = 70\nbehind_lip = 0.06\ncolour = \"#ff0000\"\n"
    "[[stripe]]\nat = 0\nwidth = 9\nheight = 0.6\ncolour = \"#00ff00\"\n"
    "[[lamella]]\nper_whorl = 6\nheight = 1.2\nthickness = 0.3\nat = -40\nwidth = 70\nlean = 20\nbehind_lip = 0.02\ncolour = \"#0000ff\"\n"
    "[[attached]]\nshape = \"bead\"\nper_whorl = 20\nrows = 3\nheight = 0.7\nbreadth = 1.0\nat = 100\nwidth = 30\ncolour = \"#ffff00\"\nbehind_lip = 0.03\n";

struct Dressed {
  test::AttachedShell shell{test::open_coil_scene() + kOnIt};
  trace::EmbreeSolid bare{shell.field, {1e-4 * shell.scene.height_mm, false}};
  trace::UnitedSolid all{bare, &shell.attached};

  Camera camera(int pixels) const {
    const Box3& box = shell.scene.bounds;
    const Vec3 size = box.max - box.min;
    Camera c;
    c.page = {Vec3(1, 0, 0), Vec3(0, 0, -1), Vec3(0, 1, 0)};
    c.width_px = c.height_px = pixels;
    c.mm_per_px = 1.2 * std::max(size.x, size.z) / pixels;
    c.anchor_mm = 0.5 * (box.min + box.max);
    c.anchor_px = Vec2(0.5 * pixels);
    c.front_mm = 2.0 * size.length();
    return c;
  }
};

}  // namespace

TEST_CASE("A white furnace stays white with all that stands on the shell", "[furnace][attached]") {
  const Dressed dressed;
  RenderJob job;
  job.shell = &dressed.all;
  job.camera = dressed.camera(32);
  job.lighting = test::white_dome();
  job.materials = test::of_albedo(1.0f, 0.4);
  job.samples_per_pixel = 64;
  const test::Mean mean = test::mean_of_covered(render(job, Silent()));
  INFO(mean.value() << " +- " << mean.standard_error());
  CHECK(std::abs(mean.value() - 1.0) < 4.0 * mean.standard_error() + 5e-4);
}

TEST_CASE("What stands on the shell keeps the colour of its table, and is ornament", "[transport][attached]") {
  const Dressed dressed;
  const specimen::Specimen specimen = specimen::parse_scene(test::open_coil_scene() + kOnIt, "test");
  const Materials materials = make_materials(dressed.shell.field, specimen);
  int seen[4] = {};
  const Camera camera = dressed.camera(160);
  for (int y = 0; y < 160; ++y)
    for (int x = 0; x < 160; ++x) {
      trace::Hit hit;
      if (!dressed.all.closest(camera.ray(x + 0.5, y + 0.5), hit) || hit.part != trace::Part::kOrnament) continue;
      const Vec3f albedo = materials.surface(hit).albedo;
      REQUIRE(hit.series < 4);
      ++seen[hit.series];
      // Tables are taken kind by kind: stripes, lamellae, spines, attached.
      const Vec3f expected[4] = {{0, 1, 0}, {0, 0, 1}, {1, 0, 0}, {1, 1, 0}};
      CHECK((albedo - expected[hit.series]).length() < 1e-6f);
    }
  for (const int count : seen) CHECK(count > 20);
}

TEST_CASE("In a radiograph what reaches into the wall counts once", "[radiograph][attached]") {
  const Dressed dressed;
  const Camera camera = dressed.camera(20);
  RayScratch scratch;
  int both = 0;
  for (int y = 0; y < 20; ++y)
    for (int x = 0; x < 20; ++x) {
      const trace::Ray ray = camera.ray(x + 0.5, y + 0.5);
      const double length = wall_length(dressed.all, ray, scratch);
      both += !scratch.within.empty();
      // In steps of a fiftieth of a millimetre, by what holds each place.
      constexpr double kStep = 0.02;
      double sum = 0.0;
      for (double t = 0.5 * kStep; t < 2.0 * camera.front_mm; t += kStep) {
        const Vec3 p = Vec3(ray.origin) + t * Vec3(ray.direction);
        if (dressed.shell.field.place_at(p).state == field::State::kSolid || dressed.shell.attached.holds(p)) sum += kStep;
      }
      CHECK(length == Approx(sum).margin(0.2));
    }
  CHECK(both > 20);
}
