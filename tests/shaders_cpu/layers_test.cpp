// SPDX-License-Identifier: Apache-2.0
// Transfer matrices against closed forms: Fresnel, Airy's formula, the quarter-wave stack.
#include "shaders_cpu/surface/layers.h"
#include "support/airy.h"
#include "support/catch.h"

#include <array>
#include <cmath>

using namespace whorl;
using namespace whorl::shaders_cpu;

TEST_CASE("A stack of no thickness, or of no layers, reflects as Fresnel says", "[shaders]") {
  const std::array<Layer, 2> thin = {Layer{1.5, 0.0}, Layer{1.9, 0.0}};
  for (const double cosine : {1.0, 0.8, 0.4, 0.1}) {
    const Polarised<double> wanted = fresnel_polarised(cosine, 1.68);
    for (const StackResponse& r : {stack_response(1.0, thin, 7, 1.68, 550.0, cosine), stack_response(1.0, {}, 1, 1.68, 550.0, cosine)}) {
      CHECK(r.reflectance.s == Approx(wanted.s).epsilon(1e-12));
      CHECK(r.reflectance.p == Approx(wanted.p).epsilon(1e-12).margin(1e-15));
    }
  }
}

TEST_CASE("One layer equals Airy's formula at every angle, thickness and absorption, swinging across and in the plane", "[shaders]") {
  for (const double outer : {1.0, 1.68})  // from the denser side as well: beyond the critical angle light tunnels
    for (const double index : {1.0, 1.5, 2.2})
      for (const double thickness : {0.0, 35.0, 300.0, 1234.0})
        for (const double cosine : {1.0, 0.9, 0.7, 0.5, 0.25, 0.05, 0.002})
          for (const double k : {0.0, 0.05, 0.8})
            for (const double substrate : {1.0, 1.7}) {
              if (k == 0.0 && outer * std::sqrt(1.0 - cosine * cosine) == index) continue;  // light along the layer
              const std::array<Layer, 1> film = {Layer{{index, -k}, thickness}};
              const std::array<test::AiryLayer, 1> same = {test::AiryLayer{{index, k}, thickness}};
              const StackResponse r = stack_response(outer, film, 1, substrate, 550.0, cosine);
              const auto s = test::airy(outer, same, 1, substrate, 550.0, cosine, true);
              const auto p = test::airy(outer, same, 1, substrate, 550.0, cosine, false);
              INFO("outer " << outer << " index " << index << " - i " << k << " thickness " << thickness << " cosine " << cosine
                            << " substrate " << substrate);
              // The angle is known by its cosine: at 0.002 half of a double's digits are left in what the sine tells of it.
              CHECK(r.reflectance.s == Approx(s.first).epsilon(1e-9).margin(1e-14));
              CHECK(r.reflectance.p == Approx(p.first).epsilon(1e-9).margin(1e-14));
              CHECK(r.transmittance.s == Approx(s.second).epsilon(1e-9).margin(1e-14));
              CHECK(r.transmittance.p == Approx(p.second).epsilon(1e-9).margin(1e-14));
            }
}

TEST_CASE("Many layers equal Airy's formula taken layer by layer from the last face upwards", "[shaders]") {
  const std::array<Layer, 3> layers = {Layer{1.5, 8.0}, Layer{{1.683, -0.002}, 440.0}, Layer{1.33, 90.0}};
  const std::array<test::AiryLayer, 3> same = {test::AiryLayer{1.5, 8.0}, test::AiryLayer{{1.683, 0.002}, 440.0},
                                               test::AiryLayer{1.33, 90.0}};
  for (const int repeats : {1, 2, 7, 30})
    for (double nm = 380.0; nm <= 780.0; nm += 37.0)
      for (const double cosine : {1.0, 0.6, 0.2, 0.05}) {
        const StackResponse r = stack_response(1.0, layers, repeats, 1.683, nm, cosine);
        const auto s = test::airy(1.0, same, repeats, 1.683, nm, cosine, true);
        const auto p = test::airy(1.0, same, repeats, 1.683, nm, cosine, false);
        CHECK(r.reflectance.s == Approx(s.first).epsilon(1e-9));
        CHECK(r.reflectance.p == Approx(p.first).epsilon(1e-9));
        CHECK(r.transmittance.s == Approx(s.second).epsilon(1e-9));
        CHECK(r.transmittance.p == Approx(p.second).epsilon(1e-9));
      }
}

TEST_CASE("A film of 300 nm at 0.6 rad has the values worked out for it", "[shaders]") {
  // n = 1 / 1.5 / 1.7, 550 nm; worked out independently from Airy's formula.
  const double cosine = std::cos(0.6);
  const std::array<Layer, 1> clear = {Layer{1.5, 300.0}}, dull = {Layer{{1.5, -0.05}, 300.0}};
  const StackResponse a = stack_response(1.0, clear, 1, 1.7, 550.0, cosine), b = stack_response(1.0, dull, 1, 1.7, 550.0, cosine);
  CHECK(a.reflectance.s == Approx(0.0350557).epsilon(2e-6));
  CHECK(a.reflectance.p == Approx(0.00837616).epsilon(2e-6));
  CHECK(b.reflectance.s == Approx(0.0438941).epsilon(2e-6));
  CHECK(b.reflectance.p == Approx(0.0118272).epsilon(5e-6));
  CHECK(b.reflectance.s + b.transmittance.s == Approx(0.703925).epsilon(2e-6));
  CHECK(b.reflectance.p + b.transmittance.p == Approx(0.694126).epsilon(2e-6));
}

TEST_CASE("Without absorption what is not reflected passes: R + T = 1", "[shaders]") {
  const std::array<Layer, 3> layers = {Layer{1.5, 8.0}, Layer{1.683, 440.0}, Layer{1.45, 90.0}};
  for (double nm = 380.0; nm <= 780.0; nm += 17.0)
    for (const double cosine : {1.0, 0.6, 0.2, 0.05}) {
      const StackResponse r = stack_response(1.0, layers, 30, 1.683, nm, cosine);
      CHECK(r.reflectance.s + r.transmittance.s == Approx(1.0).margin(1e-9));
      CHECK(r.reflectance.p + r.transmittance.p == Approx(1.0).margin(1e-9));
    }
}

TEST_CASE("A quarter-wave stack has its closed form, either layer outermost", "[shaders]") {
  constexpr double kHigh = 1.68, kLow = 1.45, kSubstrate = 1.5, kNm = 550.0;
  constexpr int kPairs = 5;
  const auto closed = [](double first, double second) {
    const double a = std::pow(second, 2 * kPairs), b = kSubstrate * std::pow(first, 2 * kPairs);
    return ((a - b) / (a + b)) * ((a - b) / (a + b));
  };
  const Layer high{kHigh, kNm / (4.0 * kHigh)}, low{kLow, kNm / (4.0 * kLow)};
  const std::array<Layer, 2> high_first = {high, low}, low_first = {low, high};
  CHECK(stack_response(1.0, high_first, kPairs, kSubstrate, kNm, 1.0).mean_reflectance() == Approx(closed(kHigh, kLow)).epsilon(1e-10));
  CHECK(stack_response(1.0, low_first, kPairs, kSubstrate, kNm, 1.0).mean_reflectance() == Approx(closed(kLow, kHigh)).epsilon(1e-10));
  CHECK(closed(kHigh, kLow) == Approx(0.539797).epsilon(2e-6));
  CHECK(closed(kLow, kHigh) == Approx(0.238134).epsilon(2e-6));
}
