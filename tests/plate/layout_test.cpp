// SPDX-License-Identifier: Apache-2.0
// What must hold of every plate, and sizes against the trade's tables.
#include "plate/layout.h"

#include "diagnostics/error.h"
#include "math/vec.h"
#include "plate/figure_plan.h"
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <random>
#include <string>

namespace whorl::plate {
namespace {

LayoutRequest request_of(std::vector<LayoutView> views, int columns) {
  LayoutRequest request;
  request.views = std::move(views);
  request.columns = columns;
  request.source = "shell.toml";
  request.plate_where = {31, 9};
  request.bar_where = {37, 7};
  return request;
}

LayoutRequest random_request(std::mt19937& rng) {
  const auto pick = [&rng](double low, double high) { return std::uniform_real_distribution<double>(low, high)(rng); };
  const auto whole = [&rng](int low, int high) { return std::uniform_int_distribution<int>(low, high)(rng); };
  std::vector<LayoutView> views(static_cast<std::size_t>(whole(1, 9)));
  const double size = std::pow(10.0, pick(-0.7, 2.3));  // shells of 0.2 to 200 mm
  for (LayoutView& view : views) {
    view.extents_mm = {size * pick(0.3, 0.7), size * pick(0.3, 0.7), size * pick(-0.05, 0.3), size * pick(0.5, 2.0)};
    view.stance = static_cast<Stance>(whole(0, 2));
    view.scale = whole(0, 4) == 0 ? pick(0.7, 2.5) : 1.0;
  }
  LayoutRequest request = request_of(std::move(views), whole(1, 4));
  request.width_mm = pick(85.0, 190.0);
  request.resolution_ppi = pick(72.0, 300.0);
  request.gap_mm = pick(0.0, 6.0);
  request.letter_room_mm = whole(0, 1) == 1 ? 3.2 : 0.0;
  return request;
}

bool overlap(const PixelRect& a, const PixelRect& b) {
  return a.x < b.right() && b.x < a.right() && a.y < b.bottom() && b.y < a.bottom();
}

PixelRect rect_of(const LayoutBar& bar) {
  return {bar.left, bar.top, static_cast<int>(std::ceil(bar.length_px)), bar.thickness};
}

bool inside(const PixelRect& inner, int width, int height) {
  return inner.x >= 0 && inner.y >= 0 && inner.right() <= width && inner.bottom() <= height;
}

std::string refusal_of(const LayoutRequest& request) {
  try {
    lay_out(request);
  } catch (const diagnostics::InvalidInput& error) {
    return error.what();
  }
  return "";
}

const LayoutView kTall{{5.0, 6.0, 0.2, 24.0}, Stance::kUpright, 1.0};

}  // namespace

TEST_CASE("Widths in pixels are those of the trade's table, to the nearest pixel", "[plate][layout]") {
  // trade practice, section 4, "Pixels": its table rounds up, so that it may be one above.
  const double widths[] = {84, 89, 90, 170, 176, 180, 183, 190.5};
  const int table[][5] = {{993, 1489, 1985, 3308, 3969},  {1052, 1577, 2103, 3504, 4205}, {1063, 1595, 2126, 3544, 4252},
                          {2008, 3012, 4016, 6693, 8032}, {2079, 3119, 4158, 6930, 8315}, {2126, 3189, 4252, 7087, 8504},
                          {2162, 3243, 4323, 7205, 8646}, {2250, 3375, 4500, 7500, 9000}};
  const double resolutions[] = {300, 450, 600, 1000, 1200};
  for (std::size_t w = 0; w < 8; ++w)
    for (std::size_t r = 0; r < 5; ++r) {
      const int pixels = pixels_across(widths[w], resolutions[r]);
      CHECK((pixels == table[w][r] || pixels == table[w][r] - 1));
      CHECK(std::abs(pixels - widths[w] / 25.4 * resolutions[r]) <= 0.5);
    }
  CHECK(pixels_across(180.0, 600.0) == 4252);
  CHECK(lay_out(request_of({kTall}, 1)).width == 4252);
}

TEST_CASE("Whatever the views, panels keep apart and inside, axes on centre lines, pictures inside their panels",
          "[plate][layout]") {
  std::mt19937 rng(20240611);
  int laid_out = 0;
  for (int trial = 0; trial < 400; ++trial) {
    const LayoutRequest request = random_request(rng);
    Layout layout;
    try {
      layout = lay_out(request);
    } catch (const diagnostics::InvalidInput&) {
      continue;
    }
    ++laid_out;
    const int count = std::min(request.columns, static_cast<int>(request.views.size()));
    const double margin = 2.0;  // pixels that the filter may reach into
    REQUIRE(layout.panels.size() == request.views.size());
    REQUIRE(layout.width == pixels_across(request.width_mm, request.resolution_ppi));
    for (std::size_t i = 0; i < layout.panels.size(); ++i) {
      const LayoutPanel& panel = layout.panels[i];
      const LayoutView& view = request.views[i];
      CHECK(inside(panel.rect, layout.width, layout.height));
      CHECK(panel.pole_x == panel.rect.x + 0.5 * panel.rect.width);
      CHECK(panel.paper_scale == Approx(layout.common_scale * view.scale));
      CHECK(panel.mm_per_pixel * panel.paper_scale == Approx(kMmPerInch / request.resolution_ppi).epsilon(1e-12));
      const double per_mm = 1.0 / panel.mm_per_pixel;
      CHECK(panel.pole_x - view.extents_mm.left * per_mm >= panel.rect.x + margin);
      CHECK(panel.pole_x + view.extents_mm.right * per_mm <= panel.rect.right() - margin);
      CHECK(panel.pole_y - view.extents_mm.above * per_mm >= panel.rect.y + margin);
      CHECK(panel.pole_y + view.extents_mm.below * per_mm <= panel.rect.bottom() - margin);
      if (view.stance == Stance::kAlongAxis) CHECK(panel.pole_y == panel.rect.y + 0.5 * panel.rect.height);
      for (std::size_t j = 0; j < i; ++j) {
        const LayoutPanel& other = layout.panels[j];
        CHECK_FALSE(overlap(panel.rect, other.rect));
        const int row_i = static_cast<int>(i) / count, row_j = static_cast<int>(j) / count;
        if (row_i == row_j) {
          CHECK(panel.rect.y == other.rect.y);
          CHECK(panel.letter_top == other.letter_top);
          const auto common = [](const LayoutView& v) { return v.stance == Stance::kUpright && v.scale == 1.0; };
          if (common(view) && common(request.views[j])) CHECK(panel.pole_y == other.pole_y);
        }
        if (i % static_cast<std::size_t>(count) == j % static_cast<std::size_t>(count)) CHECK(panel.pole_x == other.pole_x);
      }
      for (const LayoutBar& bar : layout.bars)
        CHECK_FALSE(overlap(panel.rect, rect_of(bar)));
    }
    for (const LayoutBar& bar : layout.bars)
      for (const LayoutBar& other : layout.bars)
        if (&bar != &other) CHECK_FALSE(overlap(rect_of(bar), rect_of(other)));
    for (const LayoutBar& bar : layout.bars) {
      CHECK(inside(rect_of(bar), layout.width, layout.height));
      CHECK(bar.length_px * bar.mm_per_pixel == Approx(bar.length_mm).epsilon(1e-12));
    }
  }
  CHECK(laid_out > 300);
}

TEST_CASE("The common scale is the largest that fits: the columns fill the width to the pixel", "[plate][layout]") {
  const Layout layout = lay_out(request_of({kTall, {{8.0, 9.0, 8.0, 9.0}, Stance::kAlongAxis, 1.0}}, 2));
  CHECK(layout.panels[0].rect.x == 0);
  CHECK(layout.panels[1].rect.right() == layout.width);
  CHECK(layout.panels[1].rect.x - layout.panels[0].rect.right() == 94);  // 4 mm at 600 ppi
  // 180 mm less the gap and four margins of 8 px hold 2 x 6 mm and 2 x 9 mm of shell.
  CHECK(layout.common_scale == Approx((180.0 - 4.0 - 4 * 8 * 25.4 / 600.0) / 30.0).epsilon(5e-4));
  CHECK(layout.panels[0].mm_per_pixel == layout.panels[1].mm_per_pixel);
}

TEST_CASE("A panel with a scale of its own gets a bar of its own and leaves the common bar to the others", "[plate][layout]") {
  LayoutView detail{{1.0, 1.0, 0.1, 2.0}, Stance::kUpright, 3.0};
  const Layout layout = lay_out(request_of({kTall, kTall, detail}, 3));
  REQUIRE(layout.bars.size() == 2);
  CHECK(layout.bars[0].panel == 2);
  CHECK(layout.bars[0].length_mm == 0.5);  // at most 35 % of 2 mm
  CHECK(layout.bars[0].mm_per_pixel == Approx(layout.panels[0].mm_per_pixel / 3.0));
  CHECK(layout.bars[1].panel == -1);
  CHECK(layout.bars[1].length_mm == 2.0);  // at most 35 % of 11 mm
}

TEST_CASE("A bar finds its place in the empty cells of the last row, else below the group at the right", "[plate][layout]") {
  const Layout below = lay_out(request_of({kTall, kTall}, 2));
  CHECK(below.bars[0].top > below.panels[1].rect.bottom());
  CHECK(below.bars[0].left + below.bars[0].length_px <= below.width);
  CHECK(below.bars[0].left + below.bars[0].length_px > below.width - 12);
  const Layout beside = lay_out(request_of({kTall, kTall, kTall}, 2));
  CHECK(beside.bars[0].left > beside.panels[2].rect.right());
  CHECK(beside.height == beside.panels[2].rect.bottom());
}

TEST_CASE("The common bar keeps to the panels it belongs to where another scale stands beside them", "[plate][layout]") {
  const LayoutView detail{{5.0, 5.0, 5.0, 5.0}, Stance::kAlongAxis, 1.5};
  const Layout layout = lay_out(request_of({kTall, kTall, kTall, kTall, kTall, detail}, 3));
  REQUIRE(layout.bars.size() == 2);
  const LayoutBar& common = layout.bars[1];
  CHECK(common.panel == -1);
  CHECK(common.left >= layout.panels[4].rect.x);
  CHECK(common.left + common.length_px <= layout.panels[4].rect.right());
  CHECK(common.top == layout.bars[0].top);
}

TEST_CASE("A letter gets a strip of its own only where a picture would reach into the corner", "[plate][layout]") {
  const LayoutView flat{{10.0, 10.0, 0.1, 4.0}, Stance::kUpright, 1.0};
  LayoutView cone = kTall;  // slender at the apex: nothing of it is farther to the upper left than its base is
  cone.extents_mm.upper_left = 0.5;
  LayoutRequest small = request_of({cone, cone}, 2);
  small.width_mm = 60.0;
  CHECK(lay_out(small).panels[0].rect.y == 0);
  for (LayoutView& view : small.views) view.extents_mm.upper_left = 5.0;  // a flat top
  CHECK(lay_out(small).panels[0].rect.y > 0);
  const Layout tall = lay_out(request_of({kTall}, 1));
  CHECK(tall.panels[0].letter_top > tall.panels[0].rect.y);
  LayoutRequest narrow = request_of({flat, flat, flat}, 3);
  narrow.width_mm = 60.0;
  const Layout lifted = lay_out(narrow);
  CHECK(lifted.panels[0].rect.y > lifted.panels[0].letter_top);
  narrow.letter_room_mm = 0.0;
  CHECK(lay_out(narrow).panels[0].rect.y == 0);
}

TEST_CASE("Plates that cannot be printed are refused with the place in the scene file and a way out", "[plate][layout]") {
  LayoutRequest narrow = request_of({kTall, kTall, kTall}, 3);
  narrow.width_mm = 12.0;
  CHECK(refusal_of(narrow).rfind("shell.toml:31:9: the plate is too narrow: 3 columns", 0) == 0);

  LayoutView speck = kTall;
  speck.scale = 0.008;
  CHECK(refusal_of(request_of({kTall, speck}, 2)).find("panel 2 would be only") != std::string::npos);

  LayoutRequest huge = request_of({kTall}, 1);
  huge.resolution_ppi = 2400.0;
  CHECK(refusal_of(huge).find("megapixels, and at most 100 are allowed") != std::string::npos);

  LayoutRequest long_bar = request_of({kTall}, 1);
  long_bar.bar_mm = 50.0;
  CHECK(refusal_of(long_bar).rfind("shell.toml:37:7: a scale bar of 50 mm", 0) == 0);
}

TEST_CASE("Letters run on after Z and wear their brackets", "[plate][layout]") {
  CHECK(panel_letter(0, specimen::Letters::kUpper) == "A");
  CHECK(panel_letter(25, specimen::Letters::kUpper) == "Z");
  CHECK(panel_letter(26, specimen::Letters::kUpper) == "AA");
  CHECK(panel_letter(27, specimen::Letters::kLower) == "ab");
  CHECK(panel_letter(2, specimen::Letters::kLowerInBrackets) == "(c)");
  CHECK(panel_letter(2, specimen::Letters::kNone).empty());
}

}  // namespace whorl::plate
