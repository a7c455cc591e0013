// SPDX-License-Identifier: Apache-2.0
// Cubics of a cell: fit, value, gradient, range.
#include "trace/cubic.h"

#include "math/vec.h"
#include "support/catch.h"

#include <random>

using namespace whorl;

namespace {

constexpr std::size_t kNodes = trace::kFitNodes;
using Values = std::array<double, kNodes * kNodes * kNodes>;

// A polynomial of degree at most three in each coordinate; in all of them together at most `degree`.
struct Polynomial {
  double c[4][4][4] = {};

  static Polynomial random(std::mt19937& engine, int degree) {
    std::uniform_real_distribution<double> draw(-1.0, 1.0);
    Polynomial p;
    for (int i = 0; i < 4; ++i)
      for (int j = 0; j < 4; ++j)
        for (int k = 0; k < 4; ++k)
          if (i + j + k <= degree) p.c[i][j][k] = draw(engine);
    return p;
  }
  double operator()(const Vec3& v) const {
    double sum = 0.0;
    for (int i = 0; i < 4; ++i)
      for (int j = 0; j < 4; ++j)
        for (int k = 0; k < 4; ++k) sum += c[i][j][k] * std::pow(v.x, i) * std::pow(v.y, j) * std::pow(v.z, k);
    return sum;
  }
  Values at_nodes() const {
    Values values;
    const auto& n = trace::fit_nodes();
    std::size_t at = 0;
    for (std::size_t k = 0; k < kNodes; ++k)
      for (std::size_t j = 0; j < kNodes; ++j)
        for (std::size_t i = 0; i < kNodes; ++i) values[at++] = (*this)(Vec3(n[i], n[j], n[k]));
    return values;
  }
};

double evaluate(const trace::Cubic& cubic, const Vec3& v) {
  return static_cast<double>(
      trace::evaluate(cubic, static_cast<float>(v.x), static_cast<float>(v.y), static_cast<float>(v.z)));
}

Vec3 random_place(std::mt19937& engine) {
  std::uniform_real_distribution<double> draw(-1.0, 1.0);
  return {draw(engine), draw(engine), draw(engine)};
}

}  // namespace

TEST_CASE("A fit gives a cubic back to the accuracy of floats, with its gradient and its range", "[trace]") {
  std::mt19937 engine(41);
  for (int trial = 0; trial < 300; ++trial) {
    const Polynomial p = Polynomial::random(engine, 3);
    const trace::CubicFit fit = trace::fit_cubic(p.at_nodes());
    CHECK(fit.left_out < 1e-13);
    double worst = 0.0, worst_slope = 0.0;
    bool in_range = true;
    for (int i = 0; i < 40; ++i) {
      const Vec3 v = random_place(engine);
      const double value = p(v);
      worst = std::max(worst, std::abs(evaluate(fit.cubic, v) - value));
      in_range = in_range && std::abs(value - fit.middle) <= fit.swing + 1e-12;
      float g[3];
      trace::gradient(fit.cubic, static_cast<float>(v.x), static_cast<float>(v.y), static_cast<float>(v.z), g);
      for (int k = 0; k < 3; ++k) {
        Vec3 a = v, b = v;
        a[k] -= 1e-5;
        b[k] += 1e-5;
        worst_slope = std::max(worst_slope, std::abs(static_cast<double>(g[k]) - (p(b) - p(a)) / 2e-5));
      }
    }
    CHECK(worst < 1e-5);  // 20 terms of size one, each rounded to 2^-24, and as many roundings of their sum
    CHECK(worst_slope < 3e-5);
    CHECK(in_range);
  }
}

TEST_CASE("What a fit leaves out bounds its difference to the polynomial through all nodes", "[trace]") {
  std::mt19937 engine(42);
  for (int trial = 0; trial < 300; ++trial) {
    const Polynomial p = Polynomial::random(engine, 9);
    const trace::CubicFit fit = trace::fit_cubic(p.at_nodes());
    CHECK(fit.left_out > 0.0);
    for (int i = 0; i < 40; ++i) {
      const Vec3 v = random_place(engine);
      CHECK(std::abs(evaluate(fit.cubic, v) - p(v)) <= fit.left_out + 2e-5);
    }
  }
}

TEST_CASE("A fit is the least-squares cubic over its nodes", "[trace]") {
  // What is left is orthogonal, over the nodes, to every monomial of degree at most three.
  std::mt19937 engine(43);
  const auto& n = trace::fit_nodes();
  for (int trial = 0; trial < 20; ++trial) {
    const Polynomial p = Polynomial::random(engine, 9);
    const Values values = p.at_nodes();
    const trace::CubicFit fit = trace::fit_cubic(values);
    for (int a = 0; a < 4; ++a)
      for (int b = 0; a + b < 4; ++b)
        for (int c = 0; a + b + c < 4; ++c) {
          double sum = 0.0;
          std::size_t at = 0;
          for (std::size_t k = 0; k < kNodes; ++k)
            for (std::size_t j = 0; j < kNodes; ++j)
              for (std::size_t i = 0; i < kNodes; ++i)
                sum += (values[at++] - evaluate(fit.cubic, {n[i], n[j], n[k]})) * std::pow(n[i], a) * std::pow(n[j], b) * std::pow(n[k], c);
          CHECK(sum == Approx(0.0).margin(1e-4));
        }
  }
}

TEST_CASE("Four places at once are evaluated like each alone", "[trace]") {
  std::mt19937 engine(44);
  std::uniform_real_distribution<float> draw(-1.0f, 1.0f);
  for (int trial = 0; trial < 200; ++trial) {
    trace::Cubic cubic;
    for (float& c : cubic) c = draw(engine);
    trace::Float4 x{}, y{}, z{};
    for (int i = 0; i < 4; ++i) {
      x[i] = draw(engine);
      y[i] = draw(engine);
      z[i] = draw(engine);
    }
    const trace::Float4 together = trace::evaluate(cubic, x, y, z);
    for (int i = 0; i < 4; ++i) CHECK(together[i] == trace::evaluate(cubic, x[i], y[i], z[i]));
  }
}
