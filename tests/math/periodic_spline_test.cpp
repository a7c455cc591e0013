// SPDX-License-Identifier: Apache-2.0
// Periodic cubic splines: interpolation, smoothness, order of convergence, bounds.
#include "math/periodic_spline.h"

#include "math/vec.h"
#include "support/catch.h"

#include <random>

using namespace whorl;

namespace {

std::vector<double> random_samples(std::size_t count, unsigned seed) {
  std::mt19937 engine(seed);
  std::uniform_real_distribution<double> draw(0.5, 1.5);
  std::vector<double> samples(count);
  for (double& s : samples) s = draw(engine);
  return samples;
}

double error_on_bell(std::size_t count) {
  const auto bell = [](double a) { return std::exp(std::cos(a - 0.3)); };
  std::vector<double> samples(count);
  for (std::size_t i = 0; i < count; ++i) samples[i] = bell(kTwoPi * static_cast<double>(i) / static_cast<double>(count));
  const PeriodicSpline spline(samples);
  double worst = 0.0;
  for (int i = 0; i < 5000; ++i) {
    const double a = 0.001257 * i;
    worst = std::max(worst, std::abs(spline.value(a) - bell(a)));
  }
  return worst;
}

}  // namespace

TEST_CASE("A periodic spline passes through its samples at every turn", "[spline]") {
  for (const std::size_t count : {4u, 5u, 7u, 128u, 1024u}) {
    const auto samples = random_samples(count, static_cast<unsigned>(count));
    const PeriodicSpline spline(samples);
    for (std::size_t i = 0; i < count; ++i)
      for (const double turn : {-7.0, -1.0, 0.0, 1.0, 12.0}) {
        CAPTURE(count, i, turn);
        const double angle = kTwoPi * (static_cast<double>(i) / static_cast<double>(count) + turn);
        REQUIRE(spline.value(angle) == Approx(samples[i]).margin(2e-14 * static_cast<double>(count)));
      }
  }
}

TEST_CASE("A periodic spline's stated slope is that of its values, without a jump at knots or at a whole turn", "[spline]") {
  const auto samples = random_samples(32, 5);
  const PeriodicSpline spline(samples);
  constexpr double kStep = 1e-5;
  for (int i = -200; i < 400; ++i) {
    const double angle = 0.03271 * i;  // and at every knot
    for (const double a : {angle, kTwoPi * i / 32.0}) {
      double value, slope, before, after, unused;
      spline.value_and_slope(a, value, slope);
      REQUIRE(value == spline.value(a));
      CHECK(slope == Approx((spline.value(a + kStep) - spline.value(a - kStep)) / (2 * kStep)).margin(2e-7));
      // C1 and C2: one-sided slopes and their rates of change agree.
      spline.value_and_slope(a - kStep, unused, before);
      spline.value_and_slope(a + kStep, unused, after);
      CHECK(std::abs(after - before) < 0.01);
      CHECK((after - slope) / kStep == Approx((slope - before) / kStep).margin(0.05));
      CHECK(std::abs(slope) <= spline.slope_bound());
    }
  }
}

TEST_CASE("A periodic spline's error falls with the fourth power of the spacing", "[spline]") {
  // Hall & Meyer 1976, J. Approx. Theory 16: at most 5/384 h^4 of the fourth derivative, which for exp(cos) is 4 e at most.
  const double coarse = error_on_bell(16), fine = error_on_bell(32), finest = error_on_bell(64);
  CHECK(coarse / fine > 14.0);
  CHECK(fine / finest > 14.0);
  CHECK(finest < 5.0 / 384.0 * std::pow(kTwoPi / 64.0, 4) * 4.0 * std::exp(1.0));
}

TEST_CASE("A periodic spline's bounds hold its values over any stretch and its slope bound its slopes", "[spline]") {
  std::mt19937 engine(3);
  const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
  for (const std::size_t count : {4u, 9u, 128u}) {
    const PeriodicSpline spline(random_samples(count, 40 + static_cast<unsigned>(count)));
    for (int i = 0; i < 3000; ++i) {
      const double from = draw(-30.0, 30.0), span = std::exp(draw(-8.0, 2.5));
      const Interval range = spline.bounds(from, span), all = spline.bounds();
      CAPTURE(count, from, span);
      for (int k = 0; k < 8; ++k) {
        const double angle = from + (k == 0 ? 0.0 : k == 1 ? span : draw(0.0, span));
        double value, slope;
        spline.value_and_slope(angle, value, slope);
        REQUIRE(range.lo <= value + 1e-14);
        REQUIRE(value <= range.hi + 1e-14);
        REQUIRE(all.lo <= value + 1e-14);
        REQUIRE(value <= all.hi + 1e-14);
        REQUIRE(std::abs(slope) <= spline.slope_bound() * (1.0 + 1e-12));
        REQUIRE(std::abs(slope) <= spline.slope_bound(from, span) * (1.0 + 1e-12));
        REQUIRE(spline.slope_bound(from, span) <= spline.slope_bound());
      }
    }
  }
}

TEST_CASE("Samples that are all alike make a constant that is given back exactly", "[spline]") {
  const PeriodicSpline spline(std::vector<double>(16, 0.1));
  CHECK(spline.is_constant());
  for (int i = 0; i < 100; ++i) REQUIRE(spline.value(0.77 * i) == 0.1);
  CHECK(spline.slope_bound() == 0.0);
  CHECK(spline.bounds(1.0, 2.0).width() == 0.0);
  CHECK(spline == PeriodicSpline(0.1));
  const PeriodicSpline other({1.0, 1.0, 1.0, 1.0 + 1e-9});
  CHECK_FALSE(other.is_constant());
  CHECK(other.close_to(PeriodicSpline({1.0, 1.0, 1.0, 1.0 + 1.001e-9}), 1e-10));
  CHECK_FALSE(other.close_to(spline, 1.0));
}
