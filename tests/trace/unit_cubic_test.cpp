// SPDX-License-Identifier: Apache-2.0
// Sign changes of a cubic on [0, 1], against the roots that it was built from.
#include "trace/unit_cubic.h"

#include "support/catch.h"

#include <algorithm>
#include <random>
#include <vector>

using namespace whorl;
using trace::UnitCubic;

namespace {

// Bernstein coefficients on [0, 1] of scale * (s - r0)(s - r1)(s - r2), by blossoming: b_k is the blossom with k ones.
UnitCubic with_roots(double scale, double r0, double r1, double r2) {
  const auto blossom = [&](double x, double y, double z) {
    const auto f = [](double u, double r) { return u - r; };
    return scale / 6.0 *
           (f(x, r0) * f(y, r1) * f(z, r2) + f(x, r0) * f(z, r1) * f(y, r2) + f(y, r0) * f(x, r1) * f(z, r2) +
            f(y, r0) * f(z, r1) * f(x, r2) + f(z, r0) * f(x, r1) * f(y, r2) + f(z, r0) * f(y, r1) * f(x, r2));
  };
  return {static_cast<float>(blossom(0, 0, 0)), static_cast<float>(blossom(1, 0, 0)), static_cast<float>(blossom(1, 1, 0)),
          static_cast<float>(blossom(1, 1, 1))};
}

std::vector<double> found(const UnitCubic& c) {
  float places[3];
  const int count = trace::sign_changes(c, places);
  return std::vector<double>(places, places + count);
}

}  // namespace

TEST_CASE("Sign changes are found at well parted roots, all of them and no others", "[trace]") {
  std::mt19937 engine(51);
  std::uniform_real_distribution<double> draw(-1.0, 2.0), size(-6.0, 6.0);
  int trials = 0, inside[4] = {};
  while (trials < 100000) {
    double r[3] = {draw(engine), draw(engine), draw(engine)};
    std::sort(r, r + 3);
    // Parted from one another and from the ends by more than the rounding of the coefficients moves a root.
    const auto near = [](double a, double b) { return std::abs(a - b) < 0.02; };
    if (near(r[0], r[1]) || near(r[1], r[2]) || std::any_of(r, r + 3, [&](double x) { return near(x, 0.0) || near(x, 1.0); }))
      continue;
    ++trials;
    const double scale = std::pow(10.0, size(engine)) * (trials % 2 == 0 ? 1.0 : -1.0);
    const std::vector<double> roots = found(with_roots(scale, r[0], r[1], r[2]));
    std::vector<double> expected;
    for (const double x : r)
      if (x > 0.0 && x < 1.0) expected.push_back(x);
    ++inside[expected.size()];
    CAPTURE(r[0], r[1], r[2], scale);
    REQUIRE(roots.size() == expected.size());
    for (std::size_t i = 0; i < roots.size(); ++i) REQUIRE(std::abs(roots[i] - expected[i]) < 2e-3);
    // The rounding of coefficients and of a value, some 2^-19 of the largest term, over the slope is what a root may be off by.
    const UnitCubic c = with_roots(scale, r[0], r[1], r[2]);
    const double rounding = 2e-6 * static_cast<double>(std::max({std::abs(c.b0), std::abs(c.b1), std::abs(c.b2), std::abs(c.b3)}));
    for (std::size_t i = 0; i < roots.size(); ++i) {
      double slope = std::abs(scale);
      for (const double x : r)
        if (x != expected[i]) slope *= std::abs(expected[i] - x);
      REQUIRE(std::abs(roots[i] - expected[i]) < 3e-7 + rounding / slope);
    }
  }
  for (const int count : inside) CHECK(count > 2000);
}

TEST_CASE("A cubic with one real root changes sign once, there", "[trace]") {
  std::mt19937 engine(52);
  std::uniform_real_distribution<double> draw(0.02, 0.98), part(-1.0, 2.0), apart(0.05, 3.0);
  for (int i = 0; i < 20000; ++i) {
    // (s - r)((s - a)^2 + b^2) from its values at 0, 1/3, 2/3, 1.
    const double r = draw(engine), a = part(engine), b = apart(engine);
    trace::Float4 v{};
    for (int k = 0; k < 4; ++k) {
      const double s = k / 3.0;
      v[k] = static_cast<float>((s - r) * ((s - a) * (s - a) + b * b));
    }
    const std::vector<double> roots = found(UnitCubic::through(v));
    CAPTURE(r, a, b);
    REQUIRE(roots.size() == 1);
    REQUIRE(roots[0] == Approx(r).margin(1e-5 * (1.0 + (1.0 + a * a) / (b * b))));
  }
}

TEST_CASE("A cubic passes through the values that it is made from, and touches no root where all are of one sign", "[trace]") {
  std::mt19937 engine(53);
  std::uniform_real_distribution<float> draw(-1.0f, 1.0f);
  int one_sign = 0;
  for (int i = 0; i < 20000; ++i) {
    const trace::Float4 v{draw(engine), draw(engine), draw(engine), draw(engine)};
    const UnitCubic c = UnitCubic::through(v);
    CHECK(c.value(0.0f) == v[0]);
    CHECK(c.value(1.0f) == v[3]);
    CHECK(c.value(1.0f / 3.0f) == Approx(v[1]).margin(1e-5));
    CHECK(c.value(2.0f / 3.0f) == Approx(v[2]).margin(1e-5));
    if (!c.one_sign()) continue;
    ++one_sign;
    const bool positive = c.b0 > 0.0f;
    bool kept = true;
    for (int k = 0; k <= 50; ++k) kept = kept && (c.value(0.02f * static_cast<float>(k)) > 0.0f) == positive;
    CHECK(kept);
    CHECK(found(c).empty());
  }
  CHECK(one_sign > 200);
}

TEST_CASE("Signs alternate from place to place, whatever the coefficients", "[trace]") {
  // Also with roots at the ends, double roots, coefficients of very different size, and quadratics and lines in disguise.
  std::mt19937 engine(54);
  std::uniform_real_distribution<double> draw(-1.0, 1.0), power(-30.0, 30.0);
  int odd = 0, even = 0;
  for (int i = 0; i < 200000; ++i) {
    float b[4];
    for (float& x : b) {
      const int kind = static_cast<int>(4.0 * (draw(engine) + 1.0) / 2.0);
      x = kind == 0 ? 0.0f : static_cast<float>(draw(engine) * (kind == 1 ? std::pow(2.0, power(engine)) : 1.0));
    }
    UnitCubic c{b[0], b[1], b[2], b[3]};
    if (i % 7 == 0) c = with_roots(draw(engine), 0.5, 0.5, draw(engine));          // a double root
    if (i % 11 == 0) c = {b[0], (2 * b[0] + b[3]) / 3, (b[0] + 2 * b[3]) / 3, b[3]};  // a line
    float places[3];
    const int count = trace::sign_changes(c, places);
    REQUIRE(count <= 3);
    REQUIRE(count >= 0);
    for (int k = 0; k < count; ++k) {
      REQUIRE(places[k] >= 0.0f);
      REQUIRE(places[k] <= 1.0f);
      if (k > 0) REQUIRE(places[k] >= places[k - 1]);
    }
    // From end to end the sign changes as often as places are found, or an even number of times fewer.
    const bool ends_differ = (c.b0 > 0.0f) != (c.b3 > 0.0f);
    REQUIRE((count % 2 == 1) == ends_differ);
    (count % 2 == 1 ? odd : even) += 1;
  }
  CHECK(odd > 10000);
  CHECK(even > 10000);
}
