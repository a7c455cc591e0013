// SPDX-License-Identifier: Apache-2.0
// Expansion, of one W and by stages.
#include "growth/expansion.h"

#include "growth/coiling_law.h"
#include "support/catch.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using growth::Expansion;

namespace {

// k(theta) as the scene-file contract words it: between two stages ln W runs straight, before and after it stays.
double stated_rate(const specimen::Stages& stages, double theta) {
  const double whorl = theta / kTwoPi;
  if (whorl <= stages.front().whorl) return std::log(stages.front().W) / kTwoPi;
  for (std::size_t i = 1; i < stages.size(); ++i)
    if (whorl <= stages[i].whorl) {
      const double f = (whorl - stages[i - 1].whorl) / (stages[i].whorl - stages[i - 1].whorl);
      return ((1.0 - f) * std::log(stages[i - 1].W) + f * std::log(stages[i].W)) / kTwoPi;
    }
  return std::log(stages.back().W) / kTwoPi;
}

// Midpoint rule in pieces that end at the stages, where it is exact for a straight integrand.
double integral(const specimen::Stages& stages, double from, double to) {
  std::vector<double> ends{from};
  for (const specimen::Stage& stage : stages) {
    const double theta = kTwoPi * stage.whorl;
    if (theta > from && theta < to) ends.push_back(theta);
  }
  ends.push_back(to);
  double sum = 0.0;
  for (std::size_t i = 1; i < ends.size(); ++i)
    sum += (ends[i] - ends[i - 1]) * stated_rate(stages, 0.5 * (ends[i] + ends[i - 1]));
  return sum;
}

specimen::Stages random_stages(std::mt19937& engine) {
  const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
  specimen::Stages stages;
  double whorl = draw(0.0, 2.0);
  for (int i = 0; i < 5; ++i) {
    stages.push_back({whorl, draw(1.05, 4.0)});
    whorl += draw(0.05, 2.0);
  }
  return stages;
}

}  // namespace

TEST_CASE("One W grows every length by W to the number of turns", "[growth]") {
  for (const double W : {1.0001, 1.3, 2.0, 40.0, 1e6})
    for (const double lip : {0.5, 7.25, 40.0}) {
      const Expansion g({{0.0, W}}, kTwoPi * lip), alike({{0.0, W}, {1.5, W}, {4.0, W}}, kTwoPi * lip);
      CHECK(g.factor(kTwoPi * lip) == 1.0);
      CHECK(g.is_constant());
      for (const double turns : {-20.0, -3.3, -1.0, -0.25, 0.5}) {
        CAPTURE(W, lip, turns);
        const double expected = std::pow(W, turns);
        CHECK(g.factor(kTwoPi * (lip + turns)) == Approx(expected).epsilon(1e-12));
        CHECK(alike.factor(kTwoPi * (lip + turns)) == Approx(expected).epsilon(1e-12));
        CHECK(g.rate(kTwoPi * (lip + turns)) == Approx(std::log(W) / kTwoPi).epsilon(1e-15));
      }
    }
}

TEST_CASE("Stages integrate the stated rate exactly", "[growth]") {
  std::mt19937 engine(31);
  for (int i = 0; i < 200; ++i) {
    const specimen::Stages stages = random_stages(engine);
    const double lip = kTwoPi * std::uniform_real_distribution<double>(1.0, 9.0)(engine);
    const Expansion g(stages, lip);
    for (double theta = -6.0; theta < 70.0; theta += 1.37) {
      CAPTURE(i, theta, lip);
      const double log_g = theta < lip ? -integral(stages, theta, lip) : integral(stages, lip, theta);
      REQUIRE(g.factor(theta) == Approx(std::exp(log_g)).epsilon(1e-12));
      REQUIRE(g.rate(theta) == Approx(stated_rate(stages, theta)).epsilon(1e-12));
    }
  }
}

TEST_CASE("Growth by stages is continuous with its slope", "[growth]") {
  std::mt19937 engine(32);
  for (int i = 0; i < 100; ++i) {
    const specimen::Stages stages = random_stages(engine);
    const Expansion g(stages, 40.0);
    for (const specimen::Stage& stage : stages) {
      const double knot = kTwoPi * stage.whorl;
      constexpr double kStep = 1e-6;
      const double left = std::log(g.factor(knot) / g.factor(knot - kStep)) / kStep;
      const double right = std::log(g.factor(knot + kStep) / g.factor(knot)) / kStep;
      CAPTURE(i, stage.whorl);
      CHECK(left == Approx(g.rate(knot)).margin(1e-6));
      CHECK(right == Approx(g.rate(knot)).margin(1e-6));
      CHECK(g.factor(std::nextafter(knot, 1e3)) == Approx(g.factor(std::nextafter(knot, -1e3))).epsilon(1e-12));
    }
  }
}

TEST_CASE("Distance, depth and section each keep the expansion stated for them", "[growth]") {
  test::ShellPlan plan;
  plan.whorls = 6.0;
  plan.W = {{0.0, 2.0}};
  plan.W_distance = {{0.0, 1.9}};
  plan.W_depth = {{1.0, 1.5}, {4.0, 2.5}};
  plan.W_section = {{0.0, 2.1}};
  const auto law_of = [](const test::ShellPlan& p) {
    const specimen::Specimen s = test::specimen_of(p);
    return growth::coiling_law(s.growth, s.section);
  };
  const growth::CoilingLaw law = law_of(plan);
  CHECK_FALSE(law.one_expansion);
  const growth::Station lip = law.at(law.theta_lip), before = law.at(law.theta_lip - kTwoPi);
  CHECK(lip.distance / before.distance == Approx(1.9).epsilon(1e-12));
  CHECK(lip.half_breadth / before.half_breadth == Approx(2.1).epsilon(1e-12));
  CHECK(lip.depth / before.depth == Approx(std::exp(integral(plan.W_depth, law.theta_lip - kTwoPi, law.theta_lip))).epsilon(1e-12));
  // All three stated as W make the same law as W alone.
  test::ShellPlan alike = plan, plain = plan;
  alike.W_distance = alike.W_depth = alike.W_section = plan.W;
  plain.W_distance = plain.W_depth = plain.W_section = {};
  CHECK(law_of(alike).one_expansion);
  for (const double theta : {1.0, 17.0, 39.0}) {
    const growth::Station a = law_of(alike).at(theta), b = law_of(plain).at(theta);
    CHECK(a.distance == Approx(b.distance).epsilon(1e-13));
    CHECK(a.depth == Approx(b.depth).epsilon(1e-13));
    CHECK(a.half_breadth == Approx(b.half_breadth).epsilon(1e-13));
  }
  // One of the three alone replaces only its own; the others follow W.
  test::ShellPlan one = plain;
  one.W_depth = {{0.0, 3.0}};
  const growth::CoilingLaw mixed = law_of(one);
  const growth::Station a = mixed.at(mixed.theta_lip - kTwoPi);
  CHECK(mixed.distance / a.distance == Approx(2.0).epsilon(1e-12));
  CHECK(mixed.depth / a.depth == Approx(3.0).epsilon(1e-12));
  CHECK(mixed.half_breadth / a.half_breadth == Approx(2.0).epsilon(1e-12));
}
