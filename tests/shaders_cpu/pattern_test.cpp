// SPDX-License-Identifier: Apache-2.0
// Stated patterns: counts, places and sizes measured back on the cover.
#include "shaders_cpu/surface/pattern.h"
#include "support/catch.h"

#include <vector>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

/// Stretches of a whorl in which the cover is over one half.
template <class CoverAt>
std::vector<std::pair<double, double>> stretches(CoverAt cover_at, double from, double to) {
  constexpr int kSteps = 200000;
  std::vector<std::pair<double, double>> found;
  bool in = false;
  for (int i = 0; i <= kSteps; ++i) {
    const double g = from + (to - from) * i / kSteps;
    const bool covered = cover_at(g) > 0.5f;
    if (covered && !in) found.emplace_back(g, g);
    if (covered) found.back().second = g;
    in = covered;
  }
  return found;
}

}  // namespace

TEST_CASE("A band covers its stated width about its stated direction, across the seam too", "[shaders]") {
  const BandShape band{170.0f, 40.0f, 0.0f};
  CHECK(band_cover(band, 189.0f) == 1.0f);
  CHECK(band_cover(band, -171.0f) == 1.0f);
  CHECK(band_cover(band, -169.0f) == 0.0f);
  CHECK(band_cover(band, 151.0f) == 1.0f);
  CHECK(band_cover(band, 149.0f) == 0.0f);
  CHECK(band_cover({0.0f, 360.0f, 0.5f}, 123.0f) == 1.0f);
}

TEST_CASE("A fading edge runs from whole to none over its share, halfway in the middle", "[shaders]") {
  CHECK(soft_cover(0.6f, 0.4f) == 1.0f);
  CHECK(soft_cover(0.8f, 0.4f) == Approx(0.5f));
  CHECK(soft_cover(1.0f, 0.4f) == 0.0f);
  CHECK(soft_cover(0.999f, 0.0f) == 1.0f);
}

TEST_CASE("Flames stand in their stated number in a whorl, each of its share of the spacing", "[shaders]") {
  FlameShape flame;
  flame.per_whorl = 14.0f;
  flame.breadth = 0.4f;
  flame.fade = 0.0f;
  const auto found = stretches([&](double g) { return flame_cover(flame, g, 0.0f); }, 2.03, 3.03);
  REQUIRE(found.size() == 14);
  for (const auto& [from, to] : found) CHECK(to - from == Approx(0.4 / 14.0).margin(2e-5));
}

TEST_CASE("Irregular flames keep their number over many whorls", "[shaders]") {
  FlameShape flame;
  flame.per_whorl = 9.0f;
  flame.breadth = 0.1f;
  flame.irregularity = 0.5f;
  const auto found = stretches([&](double g) { return flame_cover(flame, g, 0.0f); }, 1.0 / 18.0, 10.0 + 1.0 / 18.0);
  CHECK(found.size() == 90);
}

TEST_CASE("A tapered flame is whole at the end towards the apex and a point at the other", "[shaders]") {
  FlameShape flame;
  flame.per_whorl = 10.0f;
  flame.breadth = 0.6f;
  flame.taper = 1.0f;
  flame.fade = 0.0f;
  flame.width_deg = 120.0f;
  const auto breadth_at = [&](float around) {
    const auto found = stretches([&](double g) { return flame_cover(flame, g, around); }, 0.95, 1.05);
    return found.empty() ? 0.0 : found[0].second - found[0].first;
  };
  CHECK(breadth_at(30.0f) == Approx(0.06 * 0.75).margin(1e-4));
  CHECK(breadth_at(0.0f) == Approx(0.06 * 0.5).margin(1e-4));
  CHECK(breadth_at(-30.0f) == Approx(0.06 * 0.25).margin(1e-4));
  CHECK(breadth_at(61.0f) == 0.0);
}

TEST_CASE("A row of spots has its stated number, length, height and stagger", "[shaders]") {
  SpotShape spot;
  spot.per_whorl = 12.0f;
  spot.length = 0.5f;
  spot.width_deg = 10.0f;
  spot.at_deg = 40.0f;
  spot.stagger = 0.5f;
  spot.fade = 0.0f;
  const auto found = stretches([&](double g) { return spot_cover(spot, g, 40.0f); }, 3.0, 4.0);
  REQUIRE(found.size() == 12);
  CHECK(0.5 * (found[0].first + found[0].second) == Approx(3.0 + 0.5 / 12.0).margin(2e-5));
  CHECK(found[0].second - found[0].first == Approx(0.5 / 12.0).margin(2e-5));
  const double centre = 3.0 + 0.5 / 12.0;
  CHECK(spot_cover(spot, centre, 44.9f) == 1.0f);
  CHECK(spot_cover(spot, centre, 45.1f) == 0.0f);
}
