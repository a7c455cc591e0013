// SPDX-License-Identifier: Apache-2.0
// Published measurements, fitted: what the sources print comes out.
#include "support/catch.h"

#include "fit/fit.h"
#include "fit/indices.h"
#include "fit/series_summary.h"
#include "support/table.h"

#include <algorithm>
#include <cmath>

using namespace whorl;
using fit::Parameter;

namespace {

fit::Fit fitted(const std::string& name) {
  const auto file = specimen::read_measurement_file(std::string(WHORL_SCENE_DIR) + "/measured/" + name);
  return fit::fit_specimen(file.specimens.at(0));
}

const fit::ParameterResult& parameter(const fit::Fit& fit, Parameter wanted) {
  return *std::find_if(fit.parameters.begin(), fit.parameters.end(), [&](const auto& p) { return p.parameter == wanted; });
}

const fit::IndexResult& index(const fit::Fit& fit, const std::string& name) {
  return *std::find_if(fit.indices.begin(), fit.indices.end(), [&](const auto& i) { return i.name == name; });
}

bool says(const fit::Fit& fit, const std::string& words) {
  return std::any_of(fit.remarks.begin(), fit.remarks.end(), [&](const auto& r) { return r.find(words) != std::string::npos; });
}

constexpr double kMinute = 1.0 / 60.0;

}  // namespace

TEST_CASE("Moseley's whorl widths give his characteristic number, within 0.002", "[fit]") {
  // Moseley 1838 in Thompson 1917 pp. 518-521: adopted 1.1804 (C08a); end to end 1.180510, least squares 1.182007 with an rms
  // residual of 0.004451 (C08b to C08d, computed from the printed widths).
  const fit::Fit fit = fitted("turbo_duplicatus.toml");
  CHECK(fit.verdict == fit::Verdict::kFits);
  CHECK(parameter(fit, Parameter::kW).value == Approx(1.1804).margin(0.002));
  CHECK(parameter(fit, Parameter::kW).low < 1.1804);
  CHECK(parameter(fit, Parameter::kW).high > 1.1804);
  CHECK(fit.series.at(0).end_to_end_W == Approx(1.180510).margin(1e-6));
  CHECK(fit.series.at(0).least_squares_W == Approx(1.182007).margin(1e-6));
  CHECK(fit.series.at(0).rms_of_ln == Approx(0.004451).margin(1e-6));
  CHECK(parameter(fit, Parameter::kT).state == fit::State::kAssumed);  // a series of widths says nothing of the spire
  CHECK(says(fit, "No length fixes the size"));
}

TEST_CASE("the first ammonite series has its printed spiral angle and is self-similar", "[fit]") {
  // Grabau in Thompson 1917 p. 539: mean spiral angle 86 deg 15' (C10a); W 1.530100, ratios 1.333, 1.252, spread 1.3851 (C10b to C10e).
  const fit::Fit fit = fitted("arcestes_intuslabiatus.toml");
  CHECK(fit.verdict == fit::Verdict::kFits);
  const fit::SeriesResult& s = fit.series.at(0);
  CHECK(s.mean_spiral_angle == Approx(86.25).margin(kMinute));
  CHECK(s.least_squares_W == Approx(1.5301).margin(1e-6));
  CHECK(s.first_ratio == Approx(1.333).margin(0.0005));
  CHECK(s.last_ratio == Approx(1.252).margin(0.0005));
  CHECK(s.spread_of_ratios == Approx(1.3851).margin(1e-4));
  CHECK(parameter(fit, Parameter::kW).value == Approx(1.5301).margin(2.0 * parameter(fit, Parameter::kW).error));
}

TEST_CASE("the second ammonite series has its printed spiral angle and is reported as not self-similar", "[fit]") {
  // Grabau in Thompson 1917 p. 540: 83 deg 22' (C11a); W 2.095000, ratios 1.400, 2.546, spread 1.8389 (C11b to C11e).
  const fit::Fit fit = fitted("ammonites_tornatus.toml");
  CHECK(fit.verdict == fit::Verdict::kFitsWithTrend);
  CHECK(says(fit, "not self-similar"));
  const fit::SeriesResult& s = fit.series.at(0);
  CHECK(s.mean_spiral_angle == Approx(83.3667).margin(kMinute));
  CHECK(s.least_squares_W == Approx(2.095).margin(1e-6));
  CHECK(s.first_ratio == Approx(1.4).margin(0.0005));
  CHECK(s.last_ratio == Approx(2.546).margin(0.0005));
  CHECK(s.spread_of_ratios == Approx(1.8389).margin(1e-4));
  const fit::ParameterResult& trend = parameter(fit, Parameter::kTrend);
  CHECK(trend.low > 0.0);  // W rises for certain
  CHECK(fit.trial.values[static_cast<std::size_t>(Parameter::kTrend)] == Approx(trend.value));
}

TEST_CASE("an ammonoid's record gives its indices, and its umbilicus is told to disagree", "[fit]") {
  // GONIAT morphology record 7026; indices computed from it: WER 2.54, CWI 0.273, WWI 0.545, UWI 0.241, IZR 0.255, and an
  // umbilicus of 2.05 mm if the conch were isometric, where 2.65 was read.
  const fit::Fit fit = fitted("goniat_7026.toml");
  CHECK(fit.verdict == fit::Verdict::kDoesNotFit);
  CHECK(index(fit, "WER").read == Approx(2.54).margin(0.005));
  CHECK(index(fit, "CWI").read == Approx(0.273).margin(0.0005));
  CHECK(index(fit, "WWI").read == Approx(0.545).margin(0.0005));
  CHECK(index(fit, "UWI").read == Approx(0.241).margin(0.0005));
  CHECK(index(fit, "IZR").read == Approx(0.255).margin(0.0006));
  CHECK(index(fit, fit::kIsometricUmbilicus).read == Approx(2.05).margin(0.005));
  CHECK(says(fit, "The umbilicus was read as 2.65 mm"));
  // dm 11, ah 4.1, each off by 0.1 mm in opposite senses, moves WER by 4.1 %.
  CHECK(index(fit, "WER").read_step / index(fit, "WER").read == Approx(0.041).margin(0.0005));
  CHECK(parameter(fit, Parameter::kT).state == fit::State::kImplied);
}

TEST_CASE("apical and sutural angle of Terebra give the expansion of a regular spire", "[fit]") {
  // d'Orbigny in Thompson 1917 p. 529: 13 and 109 degrees; W = (sin sigma / sin(sigma + A))^2 = 1.243080 (C15a). Macalister
  // measured 1.28 on the same species (C15c, p. 557; 3 % is the agreement to be had).
  const fit::Fit fit = fitted("terebra_dimidiata.toml");
  CHECK(parameter(fit, Parameter::kW).value == Approx(1.243080).margin(1e-6));
  CHECK(parameter(fit, Parameter::kW).value == Approx(1.28).margin(0.04));
  CHECK(fit.verdict == fit::Verdict::kNotFixed);
  CHECK(says(fit, "No length was measured"));
  CHECK(fit::W_from_sutural_angle(109.0, 13.0) == Approx(1.243080).margin(1e-6));
  CHECK(fit::W_from_sutural_angle(111.9125, 13.0) == Approx(1.28).margin(1e-5));  // C15b
}

TEST_CASE("grouped readings give Moseley's ratio", "[fit]") {
  // Moseley 1838 in Thompson 1917 p. 520, rows C09a to C09e: W = (sum of m / sum of the smaller half - 1)^(2 / m).
  CHECK(fit::W_from_sums(2.645, 1.0, 6) == Approx(1.1804).margin(1e-4));
  CHECK(fit::W_from_sums(5.37, 2.03, 6) == Approx(1.180548).margin(1e-6));
  CHECK(fit::W_from_sums(4.55, 1.72, 6) == Approx(1.180554).margin(1e-6));
  CHECK(fit::W_from_sums(4.15, 1.74, 4) == Approx(1.176885).margin(1e-6));
  CHECK(fit::W_from_sums(3.52, 1.47, 4) == Approx(1.180914).margin(1e-6));
}

TEST_CASE("spiral angles in the plane and on a cone are those of Thompson's sound cells", "[fit]") {
  // Thompson 1917 p. 534 and p. 558; only cells within a unit of their last place of the formula.
  for (const auto& row : test::read_table("thompson_ratio_angle.csv")) {
    if (row[3] != "yes") continue;
    CAPTURE(row[0]);
    CHECK(fit::spiral_angle(std::stod(row[0])) == Approx(std::stod(row[1]) + kMinute * std::stod(row[2])).margin(kMinute));
  }
  for (const auto& row : test::read_table("thompson_cone_angle.csv")) {
    if (row[6] != "yes") continue;
    CAPTURE(row[0], row[1]);
    CHECK(fit::spiral_angle_on_cone(std::stod(row[0]), std::stod(row[1])) ==
          Approx(std::stod(row[2]) + kMinute * std::stod(row[3])).margin(1.0001 * kMinute));
  }
  // Worked examples of p. 559, rows C14a to C14e.
  CHECK(fit::spiral_angle_on_cone(1.43, 16.0) == Approx(78.0).margin(0.5));
  CHECK(fit::spiral_angle_on_cone(1.56, 26.0) == Approx(81.0).margin(0.5));
  CHECK(fit::spiral_angle_on_cone(1.5, 53.0) == Approx(85.0).margin(0.5));
  CHECK(fit::spiral_angle_on_cone(2.0, 70.0) == Approx(83.0).margin(0.5));
  CHECK(fit::spiral_angle_on_cone(2.0, 90.0) == Approx(84.0).margin(0.5));
}

TEST_CASE("conch dimensions of an isometric planispiral give back W and D", "[fit]") {
  // Closed forms of a self-similar planispiral, rows C16a to C16i and C17 (ah/dm = 0.3, the tendency of Mesozoic ammonites in
  // Parent, Greco & Bejas 2010, is W = 2.040816).
  struct Row {
    double ah, wh, uw, W, D;
  };
  const double W_of_03 = 1.0 / (0.7 * 0.7);
  for (const Row& row : {Row{0.292893, 0.410051, 0.3, 2.0, 0.3}, Row{0.333333, 0.36, 0.4, 2.25, 0.4},
                         Row{0.422650, 0.602276, 0.05, 3.0, 0.05}, Row{0.3, 0.7 / (1.0 + 0.7), 0.3, W_of_03, 0.3}}) {
    CAPTURE(row.W, row.D);
    specimen::MeasuredSpecimen measured;
    const auto add = [&](specimen::Definition definition, double value) {
      measured.readings.push_back({definition, {}, value, 0.0, 1e-4, -1, {}});
    };
    const double dm = 50.0;
    add(specimen::Definition::kDiameterSumOfRadii, dm);
    add(specimen::Definition::kAperturalHeightVenters, row.ah * dm);
    add(specimen::Definition::kWhorlHeightMargin, row.wh * dm);
    add(specimen::Definition::kWhorlWidthAlongAxis, 20.0);
    const bool consistent = std::abs(row.W - W_of_03) > 1e-9;
    if (consistent) add(specimen::Definition::kUmbilicusMargins, row.uw * dm);
    const fit::Fit fit = fit::fit_specimen(measured);
    CHECK(parameter(fit, Parameter::kW).value == Approx(row.W).margin(1e-4));
    if (consistent) CHECK(parameter(fit, Parameter::kD).value == Approx(row.D).margin(1e-4));
  }
}

TEST_CASE("quarter-turn ratios of Nautilus give its expansion", "[fit]") {
  // Bartlett 2018 (Nexus Network Journal, abstract): 1.310 for 80 shells, 1.356 for the crusty nautilus; rows C12b and C12c.
  for (const auto& [ratio, W] : {std::pair{1.310, 2.945}, std::pair{1.356, 3.381}}) {
    specimen::MeasuredSpecimen measured;
    specimen::Series series{specimen::Definition::kWhorlWidthProportional, 0.25, 0.0, {}, {}};
    for (int i = 0; i < 6; ++i) {
      const double value = 10.0 * std::pow(ratio, i);
      series.values.push_back(value);
      measured.readings.push_back({series.definition, {specimen::GrowthStage::Kind::kBehindLip, 0.25 * (5 - i)}, value, 0.0, 1e-3, 0, {}});
    }
    measured.series.push_back(series);
    CHECK(parameter(fit::fit_specimen(measured), Parameter::kW).value == Approx(W).margin(0.0005));
  }
}
