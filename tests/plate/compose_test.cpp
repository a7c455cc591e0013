// SPDX-License-Identifier: Apache-2.0
// From films to printed samples: ground, tone, alpha, ink.
#include "plate/compose.h"

#include "plate/ball_shell.h"
#include "plate/ink.h"
#include "math/parallel.h"
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <stdexcept>
#include <utility>

namespace whorl::plate {
namespace {

using specimen::Background;
using specimen::ViewName;

/// One panel without letter, no ball in it: every pixel can be set by hand.
struct Bench {
  specimen::Specimen specimen = test_plate::demo_specimen(72.0);
  FigurePlan plan;
  std::vector<transport::Film> films;

  Bench() {
    specimen.plate.panels.clear();
    specimen.plate.letters.value = specimen::Letters::kNone;
    test_plate::add_panel(specimen, ViewName::kApertural);
    plan = plan_figure(specimen, views_of(specimen), {{10.0, 10.0, 0.0, 5.0}});
    films.emplace_back(plan.panels[0].rect.width, plan.panels[0].rect.height);
  }
  void set(int x, int y, Vec3f radiance, float coverage) {
    films[0].radiance[films[0].index(x, y)] = radiance;
    films[0].coverage[films[0].index(x, y)] = coverage;
  }
  int sample(Background ground, int x, int y, int channel) const {
    const Picture picture = compose(plan, films, ground);
    return picture.samples[picture.index(plan.panels[0].rect.x + x, plan.panels[0].rect.y + y) +
                           static_cast<std::size_t>(channel)];
  }
};

/// IEC 61966-2-1, written out here once more on purpose.
double encoded(double linear) { return linear <= 0.0031308 ? 12.92 * linear : 1.055 * std::pow(linear, 1 / 2.4) - 0.055; }

}  // namespace

TEST_CASE("A card that faces the key light prints as sRGB 243, twice its light as 255 at most, black as 0", "[plate][compose]") {
  Bench bench;
  bench.set(3, 3, Vec3f(1.0f), 1.0f);
  bench.set(4, 3, Vec3f(0.0f), 1.0f);
  bench.set(5, 3, Vec3f(1e30f, 0.5f, 0.0f), 1.0f);
  CHECK(bench.sample(Background::kWhite, 3, 3, 0) == 243);
  CHECK(bench.sample(Background::kWhite, 4, 3, 1) == 0);
  CHECK(bench.sample(Background::kWhite, 5, 3, 0) == 255);
  CHECK(bench.sample(Background::kWhite, 5, 3, 1) == static_cast<int>(std::lround(255.0 * encoded(0.45))));
}

TEST_CASE("The ground is pure: 255 on white, 0 on black, nothing at all on clear", "[plate][compose]") {
  const Bench bench;
  for (const auto& [ground, value] : {std::pair{Background::kWhite, 255}, std::pair{Background::kBlack, 0}}) {
    const Picture picture = compose(bench.plan, bench.films, ground);
    CHECK(picture.bits == 8);
    CHECK(picture.channels == 3);
    const std::size_t pure = static_cast<std::size_t>(std::count(picture.samples.begin(), picture.samples.end(), value));
    std::size_t ink = 0;
    for (const Ink& one : all_ink(bench.plan)) ink += one.coverage.size();
    CHECK(pure >= picture.samples.size() - 3 * ink);
    CHECK(bench.sample(ground, 0, 0, 0) == value);
  }
  const Picture clear = compose(bench.plan, bench.films, Background::kClear);
  CHECK(clear.bits == 16);
  CHECK(clear.channels == 4);
  CHECK(clear.samples[3] == 0);
}

TEST_CASE("An outline is blended in display-linear light and keeps its own tone on every ground", "[plate][compose]") {
  Bench bench;
  bench.set(3, 3, Vec3f(0.2f), 0.5f);  // half covered by a surface of radiance 0.4, which displays as 0.36
  CHECK(bench.sample(Background::kWhite, 3, 3, 0) == std::lround(255.0 * encoded(0.5 * 0.36 + 0.5)));
  CHECK(bench.sample(Background::kBlack, 3, 3, 0) == std::lround(255.0 * encoded(0.5 * 0.36)));
  CHECK(std::abs(bench.sample(Background::kClear, 3, 3, 0) - 65535.0 * encoded(0.36)) <= 1.0);
  CHECK(bench.sample(Background::kClear, 3, 3, 3) == 32768);
}

TEST_CASE("Coverage just above 1 or below 0 and samples that are no numbers do no harm", "[plate][compose]") {
  Bench bench;
  const float nan = std::numeric_limits<float>::quiet_NaN();
  bench.set(3, 3, Vec3f(1.0f), 1.0001f);
  bench.set(4, 3, Vec3f(0.5f), -0.01f);
  bench.set(5, 3, Vec3f(nan), 1.0f);
  bench.set(6, 3, Vec3f(1.0f), nan);
  CHECK(bench.sample(Background::kWhite, 3, 3, 0) == 243);
  CHECK(bench.sample(Background::kWhite, 4, 3, 0) == 255);
  CHECK(bench.sample(Background::kWhite, 5, 3, 0) == 0);
  CHECK(bench.sample(Background::kWhite, 6, 3, 0) == 255);
}

TEST_CASE("Ink is black on white and clear grounds and white on black", "[plate][compose]") {
  const Bench bench;
  REQUIRE(bench.plan.bars.size() == 1);
  const LayoutBar& bar = bench.plan.bars[0];
  for (const auto& [ground, value] : {std::pair{Background::kWhite, 0}, std::pair{Background::kBlack, 255}}) {
    const Picture picture = compose(bench.plan, bench.films, ground);
    CHECK(picture.samples[picture.index(bar.left + 2, bar.top)] == value);
  }
  const Picture clear = compose(bench.plan, bench.films, Background::kClear);
  CHECK(clear.samples[clear.index(bar.left + 2, bar.top)] == 0);
  CHECK(clear.samples[clear.index(bar.left + 2, bar.top) + 3] == 65535);
}

TEST_CASE("The figure of a sinistral shell is the dextral one in a mirror, but for the ink", "[plate][compose]") {
  specimen::Specimen dextral = test_plate::demo_specimen(72.0), sinistral = dextral;
  sinistral.identity.coiling.value = specimen::Coiling::kSinistral;
  const auto balls = test_plate::coil_of_balls(dextral, 24.0);
  for (std::size_t p = 0; p < 3; ++p) {
    const auto film_for = [&](const specimen::Specimen& s) {
      const auto views = views_of(s);
      const auto plan = plan_figure(s, views, test_plate::extents_of(balls, views));
      return test_plate::film_of(balls, plan.panels[p]);
    };
    const transport::Film d = film_for(dextral), s = film_for(sinistral);
    REQUIRE(d.width == s.width);
    double largest = 0.0;
    for (int y = 0; y < d.height; ++y)
      for (int x = 0; x < d.width; ++x)
        largest = std::max(largest, std::abs(static_cast<double>(d.coverage[d.index(x, y)]) -
                                             static_cast<double>(s.coverage[s.index(s.width - 1 - x, y)])));
    CHECK(largest < 0.1);  // a sub-sample on the very outline may fall either way
  }
}

TEST_CASE("One thread and many compose the same samples", "[plate][compose]") {
  const specimen::Specimen s = test_plate::demo_specimen(72.0);
  const auto balls = test_plate::coil_of_balls(s, 24.0);
  const auto views = views_of(s);
  const FigurePlan plan = plan_figure(s, views, test_plate::extents_of(balls, views));
  const auto films = test_plate::films_of(balls, plan);
  const Picture many = compose(plan, films, Background::kWhite);
  set_thread_count(1);
  const Picture one = compose(plan, films, Background::kWhite);
  set_thread_count(0);
  CHECK(many.samples == one.samples);
}

TEST_CASE("A letter over the picture is noticed, one beside it is not", "[plate][compose]") {
  Bench bench;
  bench.plan.panels[0].letter = "A";
  CHECK(letters_over_pictures(bench.plan, bench.films).empty());
  std::fill(bench.films[0].coverage.begin(), bench.films[0].coverage.end(), 1.0f);
  CHECK(letters_over_pictures(bench.plan, bench.films) == std::vector<int>{0});
}

TEST_CASE("Films that do not go with the plan are refused, and a film of no size leaves its panel empty", "[plate][compose]") {
  Bench bench;
  bench.films[0] = transport::Film();
  CHECK(bench.sample(Background::kWhite, 3, 3, 0) == 255);
  bench.films[0] = transport::Film(5, 5);
  CHECK_THROWS_AS(compose(bench.plan, bench.films, Background::kWhite), std::logic_error);
}

}  // namespace whorl::plate
