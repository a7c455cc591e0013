// SPDX-License-Identifier: Apache-2.0
// Parts that were not observed, as they are printed: told apart in grey, at the stated spacing, and not at all where nothing is asked.
#include "plate/unobserved.h"

#include "plate/caption.h"
#include "plate/ball_shell.h"
#include "plate/compose.h"
#include "plate/image_exr.h"
#include "plate/legend.h"
#include "support/catch.h"
#include "support/program.h"
#include "support/read_image.h"

#include <cmath>
#include <map>
#include <string>

namespace whorl::plate {
namespace {

using specimen::Provenance;
using specimen::Unobserved;

constexpr double kPpi = 600.0, kSpacing = 1.2;

// One panel, a flat picture of one tone whose provenance changes from left to right.
struct Flat {
  FigurePlan plan;
  std::vector<transport::Film> films;

  explicit Flat(Unobserved how, double tone = 0.5) {
    plan.width = 400;
    plan.height = 100;
    plan.resolution_ppi = kPpi;
    plan.provenance = true;
    plan.unobserved = how;
    plan.hatch_mm = kSpacing;
    FigurePanel panel;
    panel.rect = {0, 0, 400, 100};
    plan.panels.push_back(panel);
    transport::Film film(400, 100);
    for (int y = 0; y < 100; ++y)
      for (int x = 0; x < 400; ++x) {
        const std::size_t at = film.index(x, y);
        film.radiance[at] = Vec3f(static_cast<float>(tone));
        film.coverage[at] = 1.0f;
        film.facts[at].part = 1;
        film.facts[at].provenance = static_cast<std::uint8_t>(1 + x / 100);
      }
    films.push_back(film);
  }

  Picture picture() const { return compose(plan, films, specimen::Background::kWhite); }
};

double grey(const Picture& picture, int x, int y) {
  const std::size_t at = picture.index(x, y);
  return (picture.samples[at] + picture.samples[at + 1] + picture.samples[at + 2]) / 3.0;
}

double mean_grey(const Picture& picture, Provenance one) {
  const int from = 100 * (static_cast<int>(one) - 1);
  double sum = 0.0;
  for (int y = 0; y < 100; ++y)
    for (int x = from; x < from + 100; ++x) sum += grey(picture, x, y);
  return sum / 1e4;
}

}  // namespace

TEST_CASE("a tint tells observed, interpolated, extrapolated and assumed parts apart in grey print", "[plate][provenance]") {
  for (const double tone : {0.05, 0.3, 0.7}) {
    const Picture picture = Flat(Unobserved::kTint, tone).picture();
    double before = 0.0;
    for (const Provenance one : {Provenance::kObserved, Provenance::kInterpolated, Provenance::kExtrapolated, Provenance::kAssumed}) {
      CAPTURE(tone, provenance_word(one), before);
      CHECK(mean_grey(picture, one) > before + 8.0);  // of 255: steps that print
      before = mean_grey(picture, one);
    }
  }
}

TEST_CASE("hatching lies at the stated spacing on paper and its lines run the way that the caption says", "[plate][provenance]") {
  const Picture picture = Flat(Unobserved::kHatch).picture();
  const double spacing_px = kSpacing * kPpi / 25.4;
  // Along a row a hatching at 45 degrees has its lines sqrt(2) spacings apart.
  const auto lines_in_row = [&](int from, int y) {
    std::vector<int> places;
    for (int x = from + 1; x + 1 < from + 100; ++x)
      if (grey(picture, x, y) < 60.0 && grey(picture, x - 1, y) >= 60.0) places.push_back(x);
    return places;
  };
  const std::vector<int> rising = lines_in_row(100, 50), above = lines_in_row(100, 45);
  REQUIRE(rising.size() >= 2);
  CHECK(rising[1] - rising[0] == Approx(std::sqrt(2.0) * spacing_px).margin(1.0));
  CHECK((above[0] - rising[0] == 5 || above[1] - rising[0] == 5));  // five rows up, five pixels to the right
  const std::vector<int> falling = lines_in_row(200, 50), falling_above = lines_in_row(200, 45);
  REQUIRE(falling.size() >= 2);
  CHECK((falling_above[0] - falling[0] == -5 || falling_above[1] - falling[0] == -5 || falling_above[0] - falling[1] == -5));
  CHECK(mean_grey(picture, Provenance::kAssumed) < mean_grey(picture, Provenance::kExtrapolated) - 5.0);
  CHECK(lines_in_row(0, 50).empty());
}

TEST_CASE("plain parts, radiographs and unstated provenance are printed bit for bit as ever", "[plate][provenance]") {
  Flat plain(Unobserved::kPlain), radiograph(Unobserved::kHatch), silent(Unobserved::kHatch), never(Unobserved::kPlain);
  radiograph.plan.panels[0].look = specimen::PanelLook::kRadiograph;
  silent.plan.provenance = false;
  for (transport::PixelFacts& facts : never.films[0].facts) facts.provenance = 0;
  CHECK(plain.picture().samples == never.picture().samples);
  CHECK(radiograph.picture().samples == never.picture().samples);
  CHECK(silent.picture().samples == never.picture().samples);
  CHECK(Flat(Unobserved::kHatch).picture().samples != never.picture().samples);
}

TEST_CASE("the EXR has a provenance layer where the specimen states what is preserved", "[plate][provenance]") {
  const Flat flat(Unobserved::kPlain);
  const support::ScratchFolder folder;
  PictureTags tags;
  write_exr(folder.path() / "a.exr", flat.plan, flat.films, tags);
  const support::ReadImage image = support::read_image(folder.path() / "a.exr");
  REQUIRE(image.channels.size() == 16);
  bool equal = true;
  for (int x = 0; x < 400; ++x) equal = equal && image.at(x, 50, "provenance") == static_cast<float>(1 + x / 100);
  CHECK(equal);
}

TEST_CASE("the caption says in words what was observed, how much that is and how the rest is drawn", "[plate][provenance]") {
  specimen::Specimen s = test_plate::demo_specimen(72.0);
  specimen::Preserved stretch;
  stretch.from = specimen::Stated<double>{3.0, {}, true};
  stretch.parts.value = specimen::PreservedParts::kOutside;
  s.preserved.push_back(stretch);
  s.plate.unobserved.value = Unobserved::kHatch;
  s.plate.hatch_mm.value = 1.2;
  const auto balls = test_plate::coil_of_balls(s, 24.0);
  const auto views = views_of(s);
  const FigurePlan plan = plan_figure(s, views, test_plate::extents_of(balls, views));
  RunFacts run;
  run.provenance.emplace();
  run.provenance->arc = {0.0, 0.704, 0.0, 0.248, 0.048};
  run.provenance->surface = {0.0, 0.9, 0.0, 0.098, 0.002};
  const std::string caption = make_caption(plan, s, run);
  const auto says = [&](const std::string& words) {
    INFO(caption);
    CHECK(caption.find(words) != std::string::npos);
  };
  says("Preserved: the outside from whorl 3 to the lip.");
  says("Of the length of the coil 70 % is observed, 25 % extrapolated and 5 % assumed;");
  says("of the outer surface 90 % is observed, 10 % extrapolated and under 1 % assumed.");
  says("interpolated ones with lines that rise to the right");
  says("It is an aid to comparison and never a name-bearing type");
  const auto record = make_record(plan, s, test_plate::films_of(balls, plan), run);
  CHECK(record.at("provenance").at("arc_share").at("extrapolated") == 0.248);
  CHECK(record.at("provenance").at("layer").at("2") == "interpolated");
  CHECK(record.at("provenance").at("preserved").at(0).at("from_whorl") == 3.0);
  CHECK(record.at("provenance").at("preserved").at(0).at("to_whorl") == 7.25);  // the lip
  CHECK(record.at("provenance").at("preserved").at(0).at("parts") == "outside");
  s.preserved.clear();
  const FigurePlan silent = plan_figure(s, views, test_plate::extents_of(balls, views));
  CHECK_FALSE(make_record(silent, s, test_plate::films_of(balls, silent), {}).contains("provenance"));
  CHECK(make_caption(silent, s, {}).find("observed") == std::string::npos);
}

TEST_CASE("the plate explains its hatching where there is room, each kind once, and never over a picture", "[plate][provenance]") {
  // The flat picture fills its figure: a strip below it has room for words, 25 mm of paper has none for three.
  const auto with_strip = [](int strip_px, int width_px) {
    Flat flat(Unobserved::kHatch);
    flat.plan.height += strip_px;
    flat.plan.width = width_px;
    return flat;
  };
  const Flat roomy = with_strip(90, 2200);
  const std::vector<LegendEntry> legend = legend_of(roomy.plan, roomy.films);
  REQUIRE(legend.size() == 3);
  CHECK(legend[0].provenance == Provenance::kInterpolated);
  CHECK(legend[2].provenance == Provenance::kAssumed);
  for (std::size_t i = 0; i < 3; ++i) {
    CHECK(legend[i].swatch.y >= 100);
    CHECK(legend[i].swatch.bottom() <= roomy.plan.height);
    CHECK(legend[i].words.place.x > legend[i].swatch.right());
    if (i > 0) CHECK(legend[i].swatch.x > legend[i - 1].words.place.right());
  }
  const Picture picture = roomy.picture();
  double darkest = 255.0, lightest = 0.0;  // of a swatch: lines on a shell's tone
  const PixelRect& swatch = legend[0].swatch;
  for (int x = swatch.x; x < swatch.right(); ++x) {
    darkest = std::min(darkest, grey(picture, x, swatch.y + swatch.height / 2));
    lightest = std::max(lightest, grey(picture, x, swatch.y + swatch.height / 2));
  }
  CHECK(darkest < 60.0);
  CHECK(lightest > 150.0);
  CHECK(legend_of(with_strip(90, 600).plan, roomy.films).empty());  // too narrow
  CHECK(legend_of(with_strip(20, 2200).plan, roomy.films).empty());  // too low
  Flat plain = roomy;
  plain.plan.unobserved = Unobserved::kPlain;
  CHECK(legend_of(plain.plan, plain.films).empty());
  Flat observed = roomy;
  for (transport::PixelFacts& facts : observed.films[0].facts) facts.provenance = facts.provenance == 4 ? 4 : 1;
  CHECK(legend_of(observed.plan, observed.films).size() == 1);
}

}  // namespace whorl::plate
