// SPDX-License-Identifier: Apache-2.0
// The record and the words: all that the contract asks for, and what may not be left unsaid.
#include "plate/caption.h"

#include "plate/ball_shell.h"
#include "plate/disclosure.h"
#include "plate/record.h"
#include "plate/sha256.h"
#include "support/catch.h"

#include <algorithm>
#include <string>
#include <utility>

namespace whorl::plate {
namespace {

struct Made {
  specimen::Specimen specimen = test_plate::demo_specimen(72.0);
  FigurePlan plan;
  std::vector<transport::Film> films;
  RunFacts run;

  explicit Made(double detail_scale = 1.0) {
    if (detail_scale != 1.0) specimen.plate.panels[2].scale = {detail_scale, {1, 1}, true};
    const auto views = views_of(specimen);
    plan = plan_figure(specimen, views, {{5.0, 6.0, 0.0, 24.0}, {6.0, 5.0, 0.0, 24.0}, {5.5, 6.0, 5.0, 6.0}});
    for (const FigurePanel& panel : plan.panels) films.emplace_back(panel.rect.width, panel.rect.height);
    films[0].rays_camera = 40, films[1].rays_camera = 2, films[2].non_finite = 3;
    films[0].mean_samples = 16.5, films[0].max_samples = 64.0, films[0].noise = 0.004;
    run.version = "0.1.0";
    run.build = "gcc 12";
    run.seed = 42;
    run.threads = 2;
    run.measurements = {{"units", "mm"}, {"shell_height", 24.0013}};
    run.counters = {{"cells", 37512}};
  }
};

int characters(const std::string& text) {
  return static_cast<int>(std::count_if(text.begin(), text.end(), [](char c) { return (c & 0xc0) != 0x80; }));
}

}  // namespace

TEST_CASE("The record holds everything that the contract of outputs asks for", "[plate][record]") {
  const Made made;
  const auto record = make_record(made.plan, made.specimen, made.films, made.run);
  CHECK(record["program"]["version"] == "0.1.0");
  CHECK(record["program"]["build"] == "gcc 12");
  CHECK(record["scene"]["sha256"] == sha256_hex("format = 1\n"));
  CHECK(record["scene"]["file"] == "tall.toml");
  CHECK(record["seed"] == 42);
  CHECK(record["threads"] == 2);
  CHECK(record["seconds"].contains("compile"));
  CHECK(record["seconds"].contains("render"));
  REQUIRE(record["panels"].size() == 3);
  const auto& panel = record["panels"][0];
  CHECK(panel["name"] == "apertural view");
  CHECK(panel["rectangle_px"]["width"] == made.plan.panels[0].rect.width);
  CHECK(panel["mm_per_pixel"] == made.plan.panels[0].mm_per_pixel);
  CHECK(panel["azimuth_deg"] == 0.0);
  CHECK(record["panels"][2]["elevation_deg"] == 90.0);
  CHECK(panel["samples_per_pixel"]["mean"] == 16.5);
  CHECK(panel["samples_per_pixel"]["max"] == 64.0);
  CHECK(panel["noise"] == 0.004);
  CHECK(record["scale_bars"][0]["length_mm"] == made.plan.bars[0].length_mm);
  CHECK(record["scale_bars"][0]["length_px"] == made.plan.bars[0].length_px);
  CHECK(record["measurements"]["shell_height"] == 24.0013);
  CHECK(record["counters"]["rays_camera"] == 42);
  CHECK(record["counters"]["non_finite_samples"] == 3);
  CHECK(record["counters"]["cells"] == 37512);
  CHECK(record["figure"]["azimuth"]["zero"] == "apertural view");
  CHECK(record["light"]["words"] == "lit from upper left");
  CHECK(record["tone_curve"]["up_to_1"] == "0.9 x");
  CHECK(record["tone_curve"]["above_1"] == "1 - 0.1 exp(-9 (x - 1))");
  CHECK(record["figure"]["background"] == "white");
}

TEST_CASE("A recorded bar obeys the truth test: its pixels are mm x print scale x ppi / 25.4", "[plate][record]") {
  // trade practice, section 3: 5 mm at print scale 4 and 600 dpi = 472.4 px.
  CHECK(5.0 * 4.0 * 600.0 / 25.4 == Approx(472.4).epsilon(1e-4));
  const Made made(2.0);
  const auto record = make_record(made.plan, made.specimen, made.films, made.run);
  REQUIRE(record["scale_bars"].size() == 2);
  for (const auto& bar : record["scale_bars"]) {
    const std::size_t panel = bar["panels"][0].get<std::size_t>() - 1;
    const double magnification = record["panels"][panel]["magnification"];
    CHECK(bar["length_px"].get<double>() ==
          Approx(bar["length_mm"].get<double>() * magnification * 72.0 / 25.4).epsilon(1e-12));
  }
}

TEST_CASE("The same figure gives the same record, key by key in the same order", "[plate][record]") {
  const Made one, other;
  CHECK(make_record(one.plan, one.specimen, one.films, one.run).dump() ==
        make_record(other.plan, other.specimen, other.films, other.run).dump());
}

TEST_CASE("The record tells what was stated from what was assumed", "[plate][record]") {
  const Made made;
  const auto record = make_record(made.plan, made.specimen, made.films, made.run);
  const auto has = [](const nlohmann::ordered_json& list, const char* key) {
    return std::find(list.begin(), list.end(), key) != list.end();
  };
  CHECK(has(record["disclosure"]["stated"], "growth.W"));
  CHECK(has(record["disclosure"]["stated"], "size.shell_height"));
  CHECK(has(record["disclosure"]["assumed"], "wall.columella"));
  CHECK_FALSE(has(record["disclosure"]["stated"], "wall.columella"));
}

TEST_CASE("The caption of the demo figure reads as it should", "[plate][caption]") {
  const Made made;
  CHECK(make_caption(made.plan, made.specimen, made.run) ==
        "Fig. 00. Cochlidion argutum, KSM 4471, Isle of Kess (author: Hallmer, 1871). Dextral shell of 7.25 whorls, 24 mm high. "
        "A, apertural view. B, abapertural view. C, apical view. Scale bar = 2 mm (magnification × 4.61) at a printed width of "
        "180 mm. Orthographic, lit from upper left.\n\n"
        "The figure shows a computed model from stated measurements (Whorlwright 0.1.0), no photograph of a specimen. It is an "
        "aid to comparison and never a name-bearing type: the International Code of Zoological Nomenclature decides on "
        "name-bearing types, and the institution that holds the specimen is the authority on it. Stated: sense of coiling, "
        "number of whorls, whorl expansion W, distance from the axis D, translation T, section ratio S, shell height and wall "
        "thickness. Assumed by default: end of the embryonic shell, roll of the section, growth of the wall, columella, "
        "inclination of the lip and thickness of the lip.");
}

TEST_CASE("A figure with several bars names the panels of each", "[plate][caption]") {
  const Made made(2.0);
  const std::string caption = make_caption(made.plan, made.specimen, made.run);
  CHECK(caption.find("Scale bars: C = 2 mm (magnification × ") != std::string::npos);
  CHECK(caption.find("; A and B = 2 mm (magnification × ") != std::string::npos);
}

TEST_CASE("The caption names the light's side as it was stated", "[plate][caption]") {
  specimen::Light light;
  light.elevation_deg.value = 45.0;
  for (const auto& [azimuth, words] : {std::pair{135.0, "upper left"}, std::pair{0.0, "the right"}, std::pair{-90.0, "below"},
                                       std::pair{350.0, "the right"}, std::pair{200.0, "the left"}}) {
    light.azimuth_deg.value = azimuth;
    CHECK(light_words(light) == words);
  }
  light.elevation_deg.value = 90.0;
  CHECK(light_words(light) == "the front");
}

TEST_CASE("The alt text is under 150 characters, however long the name and however many the views", "[plate][caption]") {
  Made made;
  CHECK(make_alt_text(made.plan, made.specimen, made.run) ==
        "Cochlidion argutum, dextral shell of 7.25 whorls, 24 mm high: apertural, abapertural and apical views; computed model.");
  for (const std::size_t length : {1u, 60u, 90u, 110u, 140u, 400u}) {
    made.specimen.identity.name.value.clear();
    for (std::size_t i = 0; i < length; ++i) made.specimen.identity.name.value += "ü";
    const std::string alt = make_alt_text(made.plan, made.specimen, made.run);
    CHECK(characters(alt) < 150);
    CHECK(alt.find("dextral shell") != std::string::npos);
    CHECK(alt.find("mage of") == std::string::npos);
  }
}

}  // namespace whorl::plate
