// SPDX-License-Identifier: Apache-2.0
// A whole figure from films to files, measured in its own pixels.
#include "plate/figure.h"

#include "plate/ball_shell.h"
#include "plate/ink.h"
#include "support/catch.h"
#include "support/program.h"
#include "support/read_image.h"

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <map>
#include <string>

namespace whorl::plate {
namespace {

double linear(float eight_bits) {
  const double e = eight_bits / 255.0;
  return e <= 0.04045 ? e / 12.92 : std::pow((e + 0.055) / 1.055, 2.4);
}

RunFacts demo_run() {
  RunFacts run;
  run.version = "0.1.0";
  run.build = "test";
  return run;
}

struct Drawn {
  specimen::Specimen specimen;
  FigurePlan plan;
  std::vector<transport::Film> films;

  Drawn(specimen::Specimen s, const std::vector<test_plate::Ball>& balls) : specimen(std::move(s)) {
    const auto views = views_of(specimen);
    plan = plan_figure(specimen, views, test_plate::extents_of(balls, views));
    films = test_plate::films_of(balls, plan);
  }
  support::ReadImage png(const support::ScratchFolder& folder) const {
    write_figure(plan, specimen, films, demo_run(), folder.path(), "figure");
    return support::read_image(folder.path() / "figure.png");
  }
};

specimen::Specimen one_view(double ppi, double width_mm) {
  specimen::Specimen s = test_plate::demo_specimen(ppi);
  s.plate.panels.clear();
  test_plate::add_panel(s, specimen::ViewName::kApertural);
  s.plate.width_mm.value = width_mm;
  return s;
}

}  // namespace

TEST_CASE("The scale bar measured in the PNG's own pixels is as long as it says, to a hundredth of a pixel", "[plate][figure]") {
  for (const double width : {60.0, 61.3, 85.0}) {
    const support::ScratchFolder folder;
    const Drawn drawn(one_view(300.0, width), {{Vec3(0.0, 0.0, 6.0), 6.0}});
    const support::ReadImage png = drawn.png(folder);
    REQUIRE(drawn.plan.bars.size() == 1);
    const LayoutBar& bar = drawn.plan.bars[0];
    double ink = 0.0;
    for (int x = 0; x < png.width; ++x) ink += 1.0 - linear(png.at(x, bar.top + bar.thickness / 2, 0));
    CHECK(bar.length_mm == 2.0);
    // The ball is 12 mm wide: the bar is to the ball as 2 to 12, in pixels too.
    CHECK(std::abs(ink - bar.length_mm * drawn.plan.panels[0].paper_scale * 300.0 / 25.4) < 0.01);
    CHECK(std::abs(bar.thickness * 25.4 / 300.0 - 0.7) < 0.05);
  }
}

TEST_CASE("A ball of 12 mm measures 12 mm in the PNG by the scale bar beside it", "[plate][figure]") {
  const support::ScratchFolder folder;
  const Drawn drawn(one_view(300.0, 60.0), {{Vec3(0.0, 0.0, 6.0), 6.0}});
  const support::ReadImage png = drawn.png(folder);
  const FigurePanel& panel = drawn.plan.panels[0];
  // Across the equator: coverage, not ink, since a dark rim of the ball is no white.
  const int row = static_cast<int>(panel.pole_px.y + 6.0 / panel.mm_per_pixel);
  double pixels = 0.0;
  for (int x = 0; x < drawn.films[0].width; ++x) pixels += drawn.films[0].coverage[drawn.films[0].index(x, row)];
  CHECK(pixels * panel.mm_per_pixel == Approx(12.0).epsilon(0.002));
  int first = png.width, last = -1;
  for (int x = 0; x < png.width; ++x)
    if (png.at(x, panel.rect.y + row, 0) < 255.0f) first = std::min(first, x), last = x;
  CHECK(std::abs((last - first + 1) * panel.mm_per_pixel - 12.0) <= 2.0 * panel.mm_per_pixel);
  CHECK(std::abs(0.5 * (first + last + 1) - 0.5 * png.width) <= 1.0);  // the axis is on the cell's centre line
}

TEST_CASE("Letter and bar label measured in the PNG at 600 ppi are as high as 9 pt and 8 pt type is", "[plate][figure]") {
  const support::ScratchFolder folder;
  const Drawn drawn(one_view(600.0, 30.0), {{Vec3(0.0, 0.0, 6.0), 6.0}});
  const support::ReadImage png = drawn.png(folder);
  const auto inked_rows = [&png](int left, int right, int top, int bottom) {
    int rows = 0;
    for (int y = top; y < bottom; ++y) {
      bool ink = false;
      for (int x = left; x < right; ++x) ink = ink || png.at(x, y, 0) < 128.0f;
      rows += ink ? 1 : 0;
    }
    return rows;
  };
  const FigurePanel& panel = drawn.plan.panels[0];
  // Cap height 1409/2048 of the size (Liberation Sans): 51.6 pixels at 9 pt, 45.9 at 8 pt; figures overshoot a little.
  const int letter_rows = inked_rows(panel.letter_left, panel.letter_left + 60, panel.letter_top, panel.letter_top + 62);
  CHECK(std::abs(letter_rows - 51.6) <= 1.5);
  const LayoutBar& bar = drawn.plan.bars[0];
  const int middle = bar.left + static_cast<int>(bar.length_px / 2);
  CHECK(std::abs(inked_rows(middle - 90, middle + 90, bar.label_base - 60, bar.top - 4) - 45.9) <= 2.0);
}

TEST_CASE("White ground is 255 in every pixel that neither picture nor ink touches", "[plate][figure]") {
  const support::ScratchFolder folder;
  const specimen::Specimen s = test_plate::demo_specimen(100.0);
  const Drawn drawn(s, test_plate::coil_of_balls(s, 24.0));
  const support::ReadImage png = drawn.png(folder);
  std::vector<char> touched(static_cast<std::size_t>(png.width) * static_cast<std::size_t>(png.height), 0);
  const auto place = [&png](int x, int y) {
    return static_cast<std::size_t>(y) * static_cast<std::size_t>(png.width) + static_cast<std::size_t>(x);
  };
  const auto touch = [&](int x, int y) { touched[place(x, y)] = 1; };
  for (std::size_t p = 0; p < drawn.films.size(); ++p)
    for (int y = 0; y < drawn.films[p].height; ++y)
      for (int x = 0; x < drawn.films[p].width; ++x)
        if (drawn.films[p].coverage[drawn.films[p].index(x, y)] > 0.0f)
          touch(drawn.plan.panels[p].rect.x + x, drawn.plan.panels[p].rect.y + y);
  for (const Ink& ink : all_ink(drawn.plan))
    for (int y = ink.place.y; y < ink.place.bottom(); ++y)
      for (int x = ink.place.x; x < ink.place.right(); ++x) touch(x, y);
  std::size_t white = 0, ground = 0;
  for (int y = 0; y < png.height; ++y)
    for (int x = 0; x < png.width; ++x) {
      if (touched[place(x, y)] != 0) continue;
      ++ground;
      if (png.at(x, y, 0) == 255.0f && png.at(x, y, 1) == 255.0f && png.at(x, y, 2) == 255.0f) ++white;
    }
  CHECK(ground > touched.size() / 4);
  CHECK(white == ground);
}

TEST_CASE("In the printed apertural view the dark aperture is on the right, and on the left of a sinistral shell", "[plate][figure]") {
  for (const auto coiling : {specimen::Coiling::kDextral, specimen::Coiling::kSinistral}) {
    specimen::Specimen s = one_view(100.0, 60.0);
    s.identity.coiling.value = coiling;
    const Drawn drawn(s, test_plate::coil_of_balls(s, 24.0));
    const support::ScratchFolder folder;
    const support::ReadImage png = drawn.png(folder);
    const PixelRect& rect = drawn.plan.panels[0].rect;
    double left = 0.0, right = 0.0;  // red-brown of the aperture
    for (int y = rect.y + rect.height / 4; y < rect.bottom(); ++y)
      for (int x = 0; x < png.width; ++x)
        if (png.at(x, y, 0) < 150.0f && png.at(x, y, 0) > 1.4f * png.at(x, y, 1)) (x < png.width / 2 ? left : right) += 1.0;
    CHECK((coiling == specimen::Coiling::kDextral ? right > 3.0 * left : left > 3.0 * right));
    CHECK(left + right > 100.0);
  }
}

TEST_CASE("A figure is five files, the same bytes each time but for nothing in the record that changed", "[plate][figure]") {
  const specimen::Specimen s = test_plate::demo_specimen(72.0);
  const Drawn drawn(s, test_plate::coil_of_balls(s, 24.0));
  const support::ScratchFolder one, other;
  const auto files = write_figure(drawn.plan, s, drawn.films, demo_run(), one.path(), "tall");
  write_figure(drawn.plan, s, drawn.films, demo_run(), other.path(), "tall");
  REQUIRE(files.size() == 5);
  std::size_t entries = 0;
  for (const auto& entry : std::filesystem::directory_iterator(one.path())) {
    ++entries;
    CHECK(support::read_file(entry.path()) == support::read_file(other.path() / entry.path().filename()));
  }
  CHECK(entries == 5);  // and nothing unfinished beside them
  for (const char* name : {"tall.png", "tall.tif", "tall.exr", "tall.json", "tall.txt"})
    CHECK(std::filesystem::exists(one.path() / name));
}

TEST_CASE("PNG and TIFF of a figure have the same pixels on every ground", "[plate][figure]") {
  const specimen::Specimen s = test_plate::demo_specimen(72.0);
  Drawn drawn(s, test_plate::coil_of_balls(s, 24.0));
  for (const auto ground : {specimen::Background::kWhite, specimen::Background::kBlack, specimen::Background::kClear}) {
    drawn.specimen.plate.background.value = ground;
    const support::ScratchFolder folder;
    const support::ReadImage png = drawn.png(folder), tif = support::read_image(folder.path() / "figure.tif");
    CHECK(png.values == tif.values);
    CHECK(png.channels.size() == (ground == specimen::Background::kClear ? 4u : 3u));
  }
}

TEST_CASE("The camera of a panel puts the pole where the plan says and a millimetre where the scale says", "[plate][figure]") {
  const specimen::Specimen s = test_plate::demo_specimen(150.0);
  const Drawn drawn(s, {{Vec3(1.0, 2.0, 6.0), 6.0}});
  for (const FigurePanel& panel : drawn.plan.panels) {
    const transport::Camera camera = panel.camera(50.0);
    CHECK((camera.project(Vec3(0.0)) - panel.pole_px).length() < 1e-9);
    const Vec2 up = camera.project(panel.view.page_to_shell.y) - panel.pole_px;
    CHECK(up.y == Approx(-1.0 / panel.mm_per_pixel));
    CHECK(std::abs(up.x) < 1e-9);
    CHECK(camera.width_px == panel.rect.width);
  }
}

TEST_CASE("Files take their name from the scene file, or are called figure", "[plate][figure]") {
  CHECK(figure_stem("scenes/tall.toml") == "tall");
  CHECK(figure_stem("-") == "figure");
  CHECK(figure_stem("tall.v2.toml") == "tall.v2");
}

}  // namespace whorl::plate
