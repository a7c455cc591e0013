// SPDX-License-Identifier: Apache-2.0
// Reflection at a smooth clear surface against the minerals' tabulated values.
#include "shaders_cpu/surface/fresnel.h"

#include "math/vec.h"
#include "support/catch.h"
#include "support/table.h"

using namespace whorl;
using namespace whorl::shaders_cpu;

TEST_CASE("Reflectance at normal incidence and Brewster angle are those of aragonite and calcite", "[fresnel]") {
  // tests/data/check_values_optics.csv: R = ((n-1)/(n+1))^2 and arctan n from the principal indices of the two minerals.
  int rows = 0;
  for (const auto& row : test::read_table("check_values_optics.csv")) {
    const double index = std::stod(row[2].substr(2)), value = std::stod(row[3]), tolerance = std::stod(row[5]);
    INFO(row[0]);
    ++rows;
    if (row[4] == "deg") {
      double low = 0.0, high = 90.0;  // the p reflectance falls to its only zero and rises again: search its least value
      while (high - low > 1e-6) {
        const double a = low + (high - low) / 3.0, b = high - (high - low) / 3.0;
        const bool left = fresnel_polarised(std::cos(radians(a)), index).p < fresnel_polarised(std::cos(radians(b)), index).p;
        (left ? high : low) = left ? b : a;
      }
      CHECK(std::abs(low - value) <= tolerance);
      CHECK(fresnel_polarised(std::cos(radians(low)), index).p < 1e-12);
    } else {
      CHECK(std::abs(fresnel_dielectric(1.0, index) - value) <= tolerance);
      CHECK(std::abs(fresnel_dielectric(1.0f, static_cast<float>(index)) - static_cast<float>(value)) <= tolerance);
    }
  }
  CHECK(rows == 10);
}

TEST_CASE("At grazing incidence everything is reflected", "[fresnel]") {
  for (const double index : {1.33, 1.53, kAragoniteIndex, kCalciteIndex}) {
    CHECK(fresnel_dielectric(0.0, index) == Approx(1.0));
    CHECK(fresnel_dielectric(-0.1, index) == Approx(1.0));
    CHECK(fresnel_dielectric(1.0 + 1e-7, index) == Approx(fresnel_dielectric(1.0, index)));
  }
}

TEST_CASE("An index of 1 reflects nothing", "[fresnel]") {
  for (const double cosine : {0.05, 0.3, 0.7, 1.0}) CHECK(fresnel_dielectric(cosine, 1.0) == Approx(0.0).margin(1e-15));
}

TEST_CASE("Single precision follows double precision to a millionth", "[fresnel]") {
  for (int i = 0; i <= 1000; ++i) {
    const double c = i / 1000.0;
    CHECK(std::abs(static_cast<double>(fresnel_dielectric(static_cast<float>(c), 1.632f)) - fresnel_dielectric(c, 1.632)) < 2e-6);
  }
}
