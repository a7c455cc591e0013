// SPDX-License-Identifier: Apache-2.0
// The mouth as a portal: its solid angle in closed form, and samples spread evenly over it.
#include "shaders_cpu/light/portal.h"

#include "support/catch.h"

#include <cmath>
#include <random>
#include <vector>

using namespace whorl;
using shaders_cpu::Portal;
using shaders_cpu::PortalView;

namespace {

// Of a rectangle of sides a and b seen from the distance d over its corner (closed form of elementary geometry).
double over_corner(double a, double b, double d) { return std::atan(a * b / (d * std::sqrt(d * d + a * a + b * b))); }

}  // namespace

TEST_CASE("A portal is seen under the solid angle of its rectangle", "[light]") {
  const Portal portal{{1.0, 2.0, 3.0}, {2.0, 0.0, 0.0}, {0.0, 0.0, 0.75}, {0.0, 1.0, 0.0}};
  // From straight behind its middle: four quarters; from behind a corner: one of them twice as wide and high.
  for (const double d : {0.05, 0.5, 3.0, 40.0}) {
    CHECK(PortalView(portal, Vec3f(Vec3(1.0, 2.0 - d, 3.0))).solid_angle() == Approx(4.0 * over_corner(2.0, 0.75, d)).epsilon(1e-4));
    CHECK(PortalView(portal, Vec3f(Vec3(3.0, 2.0 - d, 3.75))).solid_angle() == Approx(over_corner(4.0, 1.5, d)).epsilon(1e-4));
  }
  CHECK(portal.behind({1.0f, 1.5f, 3.0f}));
  CHECK_FALSE(portal.behind({1.0f, 2.5f, 3.0f}));
}

TEST_CASE("Directions through a portal are spread evenly over its solid angle", "[light]") {
  const double c = std::cos(0.4), s = std::sin(0.4);
  const Portal portal{{1.0, 2.0, 3.0}, {2.0 * c, 0.0, 2.0 * s}, {-0.75 * s, 0.0, 0.75 * c}, {0.0, 1.0, 0.0}};
  std::mt19937_64 engine(4);
  std::uniform_real_distribution<float> uniform;
  for (const Vec3& from : {Vec3(1.2, 0.3, 2.8), Vec3(-3.0, 1.0, 3.5), Vec3(4.0, 1.9, 5.0)}) {
    const PortalView view(portal, Vec3f(from));
    // Strips of the rectangle along one side: each gets directions by its own solid angle.
    constexpr int kStrips = 8, kCount = 1 << 16;
    std::vector<double> counts(kStrips), expected;
    for (int i = 0; i < kStrips; ++i) {
      Portal strip = portal;
      strip.centre += portal.half_u * (2.0 * (i + 0.5) / kStrips - 1.0);
      strip.half_u = portal.half_u / kStrips;
      expected.push_back(kCount * PortalView(strip, Vec3f(from)).solid_angle() / view.solid_angle());
    }
    int outside = 0;
    for (int i = 0; i < kCount; ++i) {
      const Vec3f d = view.sample(uniform(engine), uniform(engine));
      outside += !view.contains(d);
      const double t = portal.outwards.dot(portal.centre - from) / portal.outwards.dot(Vec3(d));
      const Vec3 on = from + t * Vec3(d) - portal.centre;
      const double u = on.dot(portal.half_u) / portal.half_u.length2(), v = on.dot(portal.half_v) / portal.half_v.length2();
      CHECK((std::abs(u) < 1.001 && std::abs(v) < 1.001));
      counts[static_cast<std::size_t>(std::clamp(static_cast<int>((0.5 * u + 0.5) * kStrips), 0, kStrips - 1))] += 1.0;
    }
    CHECK(outside < kCount / 1000);  // rounding at its edges
    double chi2 = 0.0, sum = 0.0;
    for (int i = 0; i < kStrips; ++i) {
      const auto k = static_cast<std::size_t>(i);
      chi2 += (counts[k] - expected[k]) * (counts[k] - expected[k]) / expected[k];
      sum += expected[k];
    }
    CHECK(sum == Approx(kCount).epsilon(1e-3));
    CHECK(chi2 < 24.3);  // 7 degrees of freedom, one in a thousand
  }
}
