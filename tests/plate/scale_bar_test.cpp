// SPDX-License-Identifier: Apache-2.0
// The scale bar's rule, its label and its exact length in ink.
#include "plate/scale_bar.h"

#include "plate/ink.h"
#include "support/catch.h"

#include <cmath>
#include <numeric>
#include <random>
#include <set>

namespace whorl::plate {

TEST_CASE("An automatic bar is 1, 2 or 5 x 10^n, at most 35 % of the view's width and always over 14 %", "[plate][bar]") {
  std::mt19937 rng(7);
  std::uniform_real_distribution<double> exponent(-3.0, 4.0);
  for (int trial = 0; trial < 20000; ++trial) {
    const double width = std::pow(10.0, exponent(rng));
    const double bar = automatic_bar_mm(width);
    const double mantissa = bar / std::pow(10.0, std::floor(std::log10(bar * 1.0000001)));
    REQUIRE((std::abs(mantissa - 1.0) < 1e-9 || std::abs(mantissa - 2.0) < 1e-9 || std::abs(mantissa - 5.0) < 1e-9));
    REQUIRE(bar <= 0.35 * width * (1.0 + 1e-9));
    REQUIRE(bar > 0.14 * width * (1.0 - 1e-9));
  }
}

TEST_CASE("Known widths get the bars that one would choose by hand", "[plate][bar]") {
  CHECK(automatic_bar_mm(11.0) == 2.0);
  CHECK(automatic_bar_mm(24.0) == 5.0);
  CHECK(automatic_bar_mm(100.0) == 20.0);
  CHECK(automatic_bar_mm(1.6) == 0.5);
  CHECK(automatic_bar_mm(10.0 / 3.5) == 1.0);  // the limit itself counts
  CHECK(automatic_bar_mm(2000.0) == 500.0);
  CHECK(automatic_bar_mm(0.004) == 0.001);
}

TEST_CASE("Labels are in millimetres, and in micrometres below one", "[plate][bar]") {
  CHECK(bar_label(5.0) == "5 mm");
  CHECK(bar_label(2.5) == "2.5 mm");
  CHECK(bar_label(0.5) == "500 µm");
  CHECK(bar_label(0.001) == "1 µm");
  CHECK(bar_label(200.0) == "200 mm");
}

TEST_CASE("A bar's ink adds up to its length on every line, whatever the fraction of a pixel", "[plate][bar]") {
  for (const double length : {472.440944, 100.0, 0.3, 41.99999}) {
    LayoutBar bar;
    bar.length_px = length;
    bar.left = 10, bar.top = 20, bar.thickness = 3;
    const Ink ink = bar_ink(bar);
    CHECK(ink.place.height == 3);
    const auto width = ink.place.width;
    for (int line = 0; line < 3; ++line) {
      const auto begin = ink.coverage.begin() + line * width;
      CHECK(std::accumulate(begin, begin + width, 0.0) == Approx(length).epsilon(1e-7));
    }
  }
}

}  // namespace whorl::plate
