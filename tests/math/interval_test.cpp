// SPDX-License-Identifier: Apache-2.0
// Interval arithmetic encloses what it stands for.
#include "math/interval.h"

#include "support/catch.h"

#include <random>

using namespace whorl;

namespace {

class Draws {
 public:
  explicit Draws(unsigned seed) : engine_(seed) {}
  double between(double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine_); }
  Interval interval(double lo, double hi) {
    const double a = between(lo, hi), b = between(lo, hi);
    return {std::min(a, b), std::max(a, b)};
  }
  double in(Interval a) { return between(a.lo, a.hi); }

 private:
  std::mt19937 engine_;
};

// Rounding to nearest may place an end half a unit off; nothing more is granted.
bool holds(Interval range, double v) {
  const double slack = 4e-16 * (range.magnitude() + std::abs(v));
  return range.lo - slack <= v && v <= range.hi + slack;
}

}  // namespace

TEST_CASE("Interval operations contain the results of every pair of members", "[interval]") {
  Draws draw(11);
  for (int i = 0; i < 20000; ++i) {
    const Interval a = draw.interval(-3.0, 3.0), b = draw.interval(-3.0, 3.0), c = draw.interval(0.01, 4.0);
    const double k = draw.between(-2.0, 2.0), x = draw.in(a), y = draw.in(b), z = draw.in(c);
    CAPTURE(a.lo, a.hi, b.lo, b.hi, c.lo, c.hi, k, x, y, z);
    REQUIRE(holds(a + b, x + y));
    REQUIRE(holds(a - b, x - y));
    REQUIRE(holds(-a, -x));
    REQUIRE(holds(a * b, x * y));
    REQUIRE(holds(k * a, k * x));
    REQUIRE(holds(square(a), x * x));
    REQUIRE(holds(over_positive(a, c), x / z));
    REQUIRE(hull(a, b).contains(x));
    REQUIRE(hull(a, b).contains(y));
    REQUIRE(a.magnitude() >= std::abs(x));
  }
}

TEST_CASE("Interval operations are no wider than the results of the ends and of zero", "[interval]") {
  // The range of a bilinear form over a rectangle is taken at its corners, that of a square at the ends or at zero.
  Draws draw(12);
  for (int i = 0; i < 2000; ++i) {
    const Interval a = draw.interval(-3.0, 3.0), b = draw.interval(-3.0, 3.0), c = draw.interval(0.01, 4.0);
    const auto is_end = [](double v, std::initializer_list<double> ends) {
      return std::any_of(ends.begin(), ends.end(), [v](double e) { return e == v; });
    };
    const Interval product = a * b, quotient = over_positive(a, c), power = square(a);
    for (const double end : {product.lo, product.hi})
      REQUIRE(is_end(end, {a.lo * b.lo, a.lo * b.hi, a.hi * b.lo, a.hi * b.hi}));
    for (const double end : {quotient.lo, quotient.hi})
      REQUIRE(is_end(end, {a.lo / c.lo, a.lo / c.hi, a.hi / c.lo, a.hi / c.hi}));
    REQUIRE(is_end(power.hi, {a.lo * a.lo, a.hi * a.hi}));
    REQUIRE(power.lo == (a.contains(0.0) ? 0.0 : std::min(a.lo * a.lo, a.hi * a.hi)));
  }
}
