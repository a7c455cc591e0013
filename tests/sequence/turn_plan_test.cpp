// SPDX-License-Identifier: Apache-2.0
// The plan of a turn: azimuths, parts, one frame size with the axis in one place.
#include "sequence/turn_plan.h"

#include "diagnostics/error.h"
#include "plate/studio.h"
#include "plate/views.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

#include <algorithm>
#include <numeric>

using namespace whorl;
using sequence::TurnPlan;

namespace {

TurnPlan plan_of(const support::SceneText& scene, int frames) {
  const specimen::Specimen specimen = specimen::parse_scene(scene.text(), "a.toml");
  return sequence::plan_turn(specimen, plate::Studio(specimen).surface_points(), frames);
}

support::SceneText small_scene() {
  support::SceneText scene;
  return scene.set("plate", "width", "40").set("plate", "resolution", "150").set("panel", "view", "\"apertural\"");
}

}  // namespace

TEST_CASE("Frames are 360 / N degrees apart, from the apertural view on, and the last is no repeat of the first", "[sequence]") {
  for (const int frames : {1, 24, 36, 72, 360}) {
    const TurnPlan plan = plan_of(small_scene(), frames);
    for (int i = 0; i < frames; ++i) {
      const double azimuth = plan.figure(i).panels[0].view.azimuth_deg;
      CHECK(azimuth == Approx(i * 360.0 / frames).margin(1e-12));
      CHECK(azimuth < 360.0);
    }
    const Frame first = plan.figure(0).panels[0].view.page_to_shell;
    const Frame apertural = plate::make_view(specimen::ViewName::kApertural, plan.lip_rad, plan.coiling).page_to_shell;
    CHECK((first.x - apertural.x).length() == 0.0);
    CHECK((first.y - apertural.y).length() == 0.0);
    CHECK((first.z - apertural.z).length() == 0.0);
  }
}

TEST_CASE("A quarter of a turn is the right lateral view: the reader walks to his right", "[sequence]") {
  const TurnPlan plan = plan_of(small_scene(), 4);
  const Frame quarter = plan.figure(1).panels[0].view.page_to_shell;
  const Frame right = plate::make_view(specimen::ViewName::kRightLateral, plan.lip_rad, plan.coiling).page_to_shell;
  CHECK((quarter.x - right.x).length() < 1e-15);
  CHECK((quarter.z - right.z).length() < 1e-15);
}

TEST_CASE("Every point of the axis stands on the same column in every frame, between two columns of an even width", "[sequence]") {
  for (const char* coiling : {"\"dextral\"", "\"sinistral\""}) {
    const TurnPlan plan = plan_of(small_scene().set("specimen", "coiling", coiling), 36);
    CHECK(plan.width % 2 == 0);
    CHECK(plan.height % 2 == 0);
    for (int i = 0; i < plan.frames; ++i)
      for (const double z_mm : {-1.0, 0.0, 7.5, 24.0})
        CHECK(plan.figure(i).panels[0].camera(50.0).project(Vec3(0.0, 0.0, z_mm)).x == Approx(plan.width / 2).margin(1e-9));
  }
}

TEST_CASE("The shell keeps clear of the frame's edge in every azimuth", "[sequence]") {
  const specimen::Specimen specimen = specimen::parse_scene(small_scene().text(), "a.toml");
  const plate::Studio studio(specimen);
  const TurnPlan plan = sequence::plan_turn(specimen, studio.surface_points(), 24);
  double nearest_px = 1e300;
  for (int i = 0; i < plan.frames; ++i) {
    const transport::Camera camera = plan.figure(i).panels[0].camera(studio.front_mm());
    for (const Vec3& point : studio.surface_points()) {
      const Vec2 at = camera.project(point);
      nearest_px = std::min({nearest_px, at.x, at.y, plan.width - at.x, plan.height - at.y});
    }
  }
  CHECK(nearest_px >= 3.0 - 1e-9);  // more than the pixel filter's reach
  CHECK(nearest_px < 6.0);          // and no more than that: the frame fits the shell
}

TEST_CASE("Neither scale nor size of the frames depends on their number, and the scale is the plate's", "[sequence]") {
  const TurnPlan few = plan_of(small_scene(), 5), many = plan_of(small_scene(), 180);
  CHECK(few.width == many.width);
  CHECK(few.height == many.height);
  CHECK(few.mm_per_pixel == many.mm_per_pixel);
  const specimen::Specimen specimen = specimen::parse_scene(small_scene().text(), "a.toml");
  const auto views = plate::views_of(specimen);
  const plate::FigurePlan figure =
      plate::plan_figure(specimen, views, {plate::extents_in(views[0], plate::Studio(specimen).surface_points())});
  CHECK(few.mm_per_pixel == Approx(figure.panels[0].mm_per_pixel).epsilon(1e-12));
}

TEST_CASE("The parts of a turn share no frame and miss none", "[sequence]") {
  for (const int frames : {1, 7, 36})
    for (const int of : {1, 2, 5, 40}) {
      std::vector<int> all;
      for (int part = 1; part <= of; ++part) {
        const std::vector<int> slice = sequence::frames_of_slice(frames, part, of);
        for (const int i : slice) CHECK(i % of == part - 1);
        all.insert(all.end(), slice.begin(), slice.end());
      }
      std::sort(all.begin(), all.end());
      std::vector<int> expected(static_cast<std::size_t>(frames));
      std::iota(expected.begin(), expected.end(), 0);
      CHECK(all == expected);
    }
}

TEST_CASE("Frames of more than 100 megapixels are refused, with the place of the plate's width", "[sequence]") {
  // The plate shows the tall shell along its axis only, so its scale is that of the narrow disc.
  support::SceneText scene;
  scene.set("growth", "T", "15").set("wall", "thickness", "0.05").set("plate", "width", "200").set("plate", "resolution", "1200");
  scene.set("panel", "view", "\"apical\"");
  try {
    plan_of(scene, 36);
    FAIL("accepted");
  } catch (const diagnostics::InvalidInput& refused) {
    CHECK(refused.code() == diagnostics::ExitCode::kInvalidInput);
    CHECK(refused.problems().front().where.line > 0);
    CHECK(std::string(refused.what()).find("megapixels") != std::string::npos);
  }
}
