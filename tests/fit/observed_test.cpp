// SPDX-License-Identifier: Apache-2.0
// What readings tell of the growth that they were taken on.
#include "fit/observed.h"

#include "fit/scene_text.h"
#include "specimen/scene_file.h"
#include "support/catch.h"

#include <cmath>

using namespace whorl;
using specimen::Definition;
using specimen::GrowthStage;

namespace {

fit::Fit seven_whorls() {
  fit::Fit fit;
  fit::at(fit.trial.values, fit::Parameter::kWhorls) = 7.0;
  fit::at(fit.trial.values, fit::Parameter::kW) = std::log(1.5);
  fit::at(fit.trial.values, fit::Parameter::kD) = 0.05;
  fit::at(fit.trial.values, fit::Parameter::kT) = 2.0;
  return fit;
}

void read(fit::Fit& fit, Definition definition, GrowthStage stage = {}, int series = -1) {
  specimen::Reading reading;
  reading.definition = definition;
  reading.stage = stage;
  reading.series = series;
  fit.task.readings.push_back(reading);
  if (series >= 0) fit.task.scatter.resize(static_cast<std::size_t>(series) + 1);
}

}  // namespace

TEST_CASE("section widths from whorl 3 to whorl 6 in a series tell of all between, a single one of its whorl only", "[fit][provenance]") {
  fit::Fit series = seven_whorls();
  for (const double whorl : {3.0, 4.0, 5.0, 6.0}) read(series, Definition::kWhorlWidthSection, {GrowthStage::Kind::kAtWhorl, whorl}, 0);
  const auto one = fit::observed_stretches(series);
  REQUIRE(one.size() == 1);
  CHECK(one[0].from == Approx(3.0));
  CHECK(one[0].to == Approx(6.0));
  fit::Fit singles = seven_whorls();
  for (const double whorl : {3.0, 6.0}) read(singles, Definition::kWhorlWidthSection, {GrowthStage::Kind::kAtWhorl, whorl});
  const auto two = fit::observed_stretches(singles);
  REQUIRE(two.size() == 2);
  CHECK(two[0].to == Approx(3.0));
  CHECK(two[1].from == Approx(6.0));
}

TEST_CASE("a shell's height tells of apex and base, its count of whorls of all of them, and overlapping stretches are joined", "[fit][provenance]") {
  fit::Fit height = seven_whorls();
  read(height, Definition::kShellHeightAxial);
  const auto ends = fit::observed_stretches(height);
  REQUIRE(ends.size() == 2);
  CHECK(ends[0].from == Approx(0.75));  // the embryonic shell's end
  CHECK(ends[0].to == Approx(0.75));
  CHECK(ends[1].from == Approx(6.5));
  CHECK(ends[1].to == Approx(7.0));
  read(height, Definition::kAperturalHeightVenters);  // one whorl
  CHECK(fit::observed_stretches(height)[1].from == Approx(6.0));
  read(height, Definition::kWhorlsNucleusLine);
  const auto all = fit::observed_stretches(height);
  REQUIRE(all.size() == 1);
  CHECK(all[0].from == Approx(0.75));
  CHECK(all[0].to == Approx(7.0));
}

TEST_CASE("however many stretches readings tell of, a scene file takes them, the outermost kept", "[fit][provenance]") {
  fit::Fit many = seven_whorls();
  for (int i = 0; i <= 100; ++i) read(many, Definition::kWhorlWidthSection, {GrowthStage::Kind::kAtWhorl, 1.0 + 0.06 * i});
  const auto kept = fit::observed_stretches(many);
  CHECK(kept.size() == 64);
  CHECK(kept.front().from == Approx(1.0));
  CHECK(kept.back().to == Approx(7.0));
}

TEST_CASE("the fitted scene states what the file states as preserved, else what the readings tell, and what of the shell that is", "[fit][provenance]") {
  const std::string head = "format = 1\nstep = 0.1\n[specimen]\nname = \"x\"\ncoiling = \"dextral\"\n";
  std::string readings;
  const auto add = [&](const char* quantity, const char* definition, double value, const char* more = "") {
    readings += std::string("[[measurement]]\nquantity = \"") + quantity + "\"\ndefinition = \"" + definition + "\"\nvalue = " + std::to_string(value) +
                "\n" + more;
  };
  add("conch_diameter", "sum_of_radii", 55.8);
  add("whorl_height", "margin_to_venter", 22.1);
  add("whorl_width", "along_axis", 17.0);
  add("conch_diameter", "sum_of_radii", 26.6, "behind_lip = 1\n");
  add("conch_diameter", "sum_of_radii", 12.7, "behind_lip = 2\n");
  const auto scene_of = [&](const std::string& more) {
    const auto file = specimen::parse_measurements(head + readings + more, "m.toml");
    const fit::Fit fit = fit::fit_specimen(file.specimens.at(0));
    REQUIRE(fit.verdict == fit::Verdict::kFits);
    return specimen::parse_scene(fit::scene_text(fit, file.specimens.at(0), "m.toml"), "fitted");
  };
  const specimen::Specimen by_readings = scene_of("");
  REQUIRE(by_readings.preserved.size() == 3);  // half a whorl before each stage
  CHECK(*by_readings.preserved[0].from == Approx(2.5));
  CHECK(*by_readings.preserved[0].to == Approx(2.0));
  CHECK(by_readings.preserved[0].from_lip);
  CHECK(by_readings.preserved[0].parts == specimen::PreservedParts::kOutside);
  const specimen::Preservation law(by_readings);
  const double lip = by_readings.growth.whorls;
  CHECK(law.of(specimen::ShellPart::kOutside, lip - 0.2) == specimen::Provenance::kObserved);
  CHECK(law.of(specimen::ShellPart::kOutside, lip - 0.7) == specimen::Provenance::kInterpolated);
  CHECK(law.of(specimen::ShellPart::kOutside, lip - 2.9) == specimen::Provenance::kExtrapolated);
  CHECK(law.of(specimen::ShellPart::kInside, lip - 0.2) == specimen::Provenance::kAssumed);
  const specimen::Specimen stated = scene_of("[[preserved]]\nfrom = 1.5\ncounted = \"from the lip\"\n");
  REQUIRE(stated.preserved.size() == 1);
  CHECK(*stated.preserved[0].from == 1.5);
  CHECK_FALSE(stated.preserved[0].to);
  CHECK(stated.preserved[0].parts == specimen::PreservedParts::kWhole);
  add("wall_thickness", "wall", 0.6);
  CHECK(scene_of("").preserved[0].parts == specimen::PreservedParts::kWall);
}
