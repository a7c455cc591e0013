// SPDX-License-Identifier: Apache-2.0
// The scene of Moseley's shell measures as he measured it.
#include "support/catch.h"

#include "compile/compile.h"
#include "measure/whorl_section.h"
#include "specimen/scene_file.h"

#include <fstream>
#include <string>
#include <vector>

using namespace whorl;

namespace {

// Moseley 1838, in Thompson 1917, pp. 518-521: successive whorl widths in inches, the last whorl but one first.
std::vector<double> published_widths_mm() {
  std::ifstream file(std::string(WHORL_TEST_DIR) + "/data/moseley_turbo_duplicatus.csv");
  std::string line;
  std::getline(file, line);
  std::vector<double> widths;
  while (std::getline(file, line)) widths.push_back(std::stod(line.substr(line.find(',') + 1)) * kMmPerInch);
  return widths;
}

// Across the axis from the outer margin of a whorl to that half a turn before, at one azimuth.
double whorl_width(const field::Field& field, double theta) {
  return measure::whorl_section(field, theta).rho_max +
         measure::whorl_section(field, theta - kPi).rho_max;
}

}  // namespace

TEST_CASE("successive whorl widths of Moseley's Turbo duplicatus stand at his ratio", "[measure][published]") {
  const specimen::Specimen specimen =
      specimen::read_scene_file(std::string(WHORL_SCENE_DIR) + "/published/moseley_turbo_duplicatus.toml");
  const scene::Scene scene = compile::compile_scene(specimen);
  const field::Field field(scene);
  const std::vector<double> published = published_widths_mm();
  REQUIRE(published.size() == 8);
  const double theta = scene.law.theta_lip - 0.25 * kPi;
  double before = whorl_width(field, theta);
  for (std::size_t i = 0; i < published.size(); ++i) {
    const double width = whorl_width(field, theta - kTwoPi * static_cast<double>(i + 1));
    CHECK(before / width == Approx(1.18).margin(0.002));
    before = width;
  }
  // The widths themselves, the last whorl's being that of the shell as the scene states it. His readings are given to
  // 0.01 inch and scatter by 0.45 % (C08d) about one ratio; the series is read at one place of the whorl.
  const double last = whorl_width(field, theta), stated = specimen.size.mm;
  for (std::size_t i = 0; i < published.size(); ++i) {
    const double width = whorl_width(field, theta - kTwoPi * static_cast<double>(i + 1)) * stated / last;
    CHECK(width == Approx(published[i]).epsilon(0.01).margin(0.005 * kMmPerInch));
  }
}
