// SPDX-License-Identifier: Apache-2.0
// The activator-inhibitor model against its linear theory. Closed forms: of the two equations of Meinhardt & Klinger 1987,
// J. theor. Biol. 126: 63-89, linearised at the even steady state (trace r_a - r_b, determinant r_a r_b for b_a = b_b = 0).
#include "compile/activator_inhibitor.h"
#include "math/vec.h"
#include "support/catch.h"

#include <cmath>

using namespace whorl;
using namespace whorl::compile;

namespace {

/// Amplitude of one cosine round the edge, relative to the mean.
double wave(const GrowingEdge& edge, int periods) {
  double sum = 0.0, mean = 0.0;
  const std::vector<double>& a = edge.activator();
  for (std::size_t i = 0; i < a.size(); ++i) {
    sum += a[i] * std::cos(kTwoPi * periods * static_cast<double>(i) / static_cast<double>(a.size()));
    mean += a[i];
  }
  return 2.0 * sum / mean;
}

void add_wave(GrowingEdge& edge, int periods, double amplitude) {
  std::vector<double>& a = edge.activator();
  for (std::size_t i = 0; i < a.size(); ++i)
    a[i] *= 1.0 + amplitude * std::cos(kTwoPi * periods * static_cast<double>(i) / static_cast<double>(a.size()));
}

}  // namespace

TEST_CASE("The steady state without basic production is r_b / r_a of activator and s r_b / r_a^2 of inhibitor", "[compile]") {
  // Inputs and values of rows C39a and C39b of the check values: both 2.
  const SteadyState s = steady_state({0.1, 0.2, 0.1, 0.0, 0.0, 0.0, 0.0});
  CHECK(s.activator == Approx(2.0).epsilon(1e-9));
  CHECK(s.inhibitor == Approx(2.0).epsilon(1e-9));
}

TEST_CASE("The steady state makes both rates of change vanish, with basic production of either kind", "[compile]") {
  for (const ReactionRates& r : {ReactionRates{60.0, 80.0, 50.0, 0.05, 0.0, 0.0, 0.0}, ReactionRates{60.0, 80.0, 50.0, 0.1, 9.0, 0.0, 0.0},
                                 ReactionRates{3.0, 1.0, 7.0, 0.02, 0.4, 0.0, 0.0}}) {
    const SteadyState x = steady_state(r);
    const double a2 = x.activator * x.activator;
    CHECK(r.source * (a2 / x.inhibitor + r.activator_base) == Approx(r.activator_decay * x.activator).epsilon(1e-9));
    CHECK(r.source * a2 + r.inhibitor_base == Approx(r.inhibitor_decay * x.inhibitor).epsilon(1e-9));
  }
}

TEST_CASE("An even edge stays at its steady state", "[compile]") {
  GrowingEdge edge({0.1, 0.2, 0.1, 0.0, 0.0, 0.01, 0.2}, 64, 0.0, 1);
  for (int i = 0; i < 2000; ++i) edge.step(0.1, 20.0);
  for (const double a : edge.activator()) CHECK(a == Approx(2.0).epsilon(1e-9));
}

TEST_CASE("An even disturbance dies out for r_b above r_a and grows for r_b below r_a", "[compile]") {
  const auto swing_after = [](double inhibitor_decay) {
    GrowingEdge edge({1.0, inhibitor_decay, 1.0, 0.0, 0.0, 0.0, 0.0}, 4, 0.0, 1);
    const double steady = inhibitor_decay;
    for (double& a : edge.activator()) a *= 1.001;
    double largest = 0.0;
    for (int i = 0; i < 60000; ++i) {
      edge.step(0.001, 1.0);
      if (i > 50000) largest = std::max(largest, std::abs(edge.activator()[0] / steady - 1.0));
    }
    return largest;
  };
  CHECK(swing_after(1.2) < 0.0001);
  CHECK(swing_after(0.8) > 0.1);
}

TEST_CASE("At r_b = r_a the edge swings with the angular frequency r_a", "[compile]") {
  constexpr double kRate = 0.1, kStep = 0.002;  // row C39g
  GrowingEdge edge({kRate, kRate, 0.1, 0.0, 0.0, 0.0, 0.0}, 4, 0.0, 1);
  for (double& a : edge.activator()) a *= 1.0001;
  std::vector<double> rises;  // times at which the activator passes its steady level upwards
  double before = edge.activator()[0] - 1.0;
  for (int i = 1; rises.size() < 4; ++i) {
    edge.step(kStep, 1.0);
    const double now = edge.activator()[0] - 1.0;
    if (before < 0.0 && now >= 0.0) rises.push_back(kStep * (i - now / (now - before)));
    before = now;
  }
  CHECK(kTwoPi / (rises[3] - rises[2]) == Approx(kRate).epsilon(2e-3));
}

TEST_CASE("Stripes arise where the ratio of the spreads passes 5.828427 r_b / r_a, at the critical wavenumber", "[compile]") {
  // Rows C39e and C39f: the ratio 11.656854 and k^2 = 4.142136 for these rates and D_a = 0.01.
  constexpr double kActivatorSpread = 0.01, kCriticalRatio = 11.656854, kCriticalSquare = 4.142136;
  constexpr int kPeriods = 8;
  const double length = kPeriods * kTwoPi / std::sqrt(kCriticalSquare);
  const auto growth = [&](double ratio, int periods) {
    GrowingEdge edge({0.1, 0.2, 0.1, 0.0, 0.0, kActivatorSpread, ratio * kActivatorSpread}, 1024, 0.0, 1);
    add_wave(edge, periods, 1e-5);
    for (int i = 0; i < 10000; ++i) edge.step(0.05, length);  // until fast modes are gone
    const double early = wave(edge, periods);
    for (int i = 0; i < 10000; ++i) edge.step(0.05, length);
    return wave(edge, periods) / early;
  };
  CHECK(growth(0.98 * kCriticalRatio, kPeriods) < 1.0);
  CHECK(growth(1.02 * kCriticalRatio, kPeriods) > 1.0);
  // Wavelengths a quarter off the critical one still die out there.
  CHECK(growth(1.02 * kCriticalRatio, kPeriods - 2) < 1.0);
  CHECK(growth(1.02 * kCriticalRatio, kPeriods + 2) < 1.0);
}

TEST_CASE("Spreading alone keeps the amount and damps a wave as the heat equation does", "[compile]") {
  constexpr double kSpread = 0.3, kLength = 5.0, kDt = 0.001;
  constexpr int kPeriods = 3, kSteps = 200;
  GrowingEdge edge({1e-12, 1e-12, 1e-12, 0.0, 0.0, kSpread, 0.0}, 512, 0.0, 1);
  for (double& a : edge.activator()) a = 1.0;
  add_wave(edge, kPeriods, 0.5);
  for (int i = 0; i < kSteps; ++i) edge.step(kDt, kLength);
  double sum = 0.0;
  for (const double a : edge.activator()) sum += a;
  CHECK(sum / 512 == Approx(1.0).epsilon(1e-9));
  const double k = kTwoPi * kPeriods / kLength;
  CHECK(wave(edge, kPeriods) == Approx(0.5 * std::exp(-kSpread * k * k * kDt * kSteps)).epsilon(0.003));
}

TEST_CASE("The source density differs by at most the variation, and by the seed alone", "[compile]") {
  const ReactionRates rates{60.0, 45.0, 60.0, 0.0, 0.0, 0.5, 0.1};
  const auto after = [&](std::uint64_t seed) {
    GrowingEdge edge(rates, 128, 0.1, seed);
    for (int i = 0; i < 2000; ++i) edge.step(0.0005, 10.0);
    return edge.activator();
  };
  CHECK(after(3) == after(3));
  CHECK(after(3) != after(4));
}
