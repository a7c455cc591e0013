// SPDX-License-Identifier: Apache-2.0
// From scene radiance to what is printed.
#include "shaders_cpu/tone/curve.h"
#include "shaders_cpu/tone/srgb.h"
#include "support/catch.h"

using namespace whorl;
using namespace whorl::shaders_cpu;

TEST_CASE("The sRGB curve switches at the thresholds of IEC 61966-2-1", "[tone]") {
  CHECK(srgb_encode(0.0031308) == Approx(12.92 * 0.0031308).epsilon(1e-15));
  CHECK(srgb_encode(std::nextafter(0.0031308, 1.0)) == Approx(1.055 * std::pow(0.0031308, 1.0 / 2.4) - 0.055).epsilon(1e-12));
  CHECK(srgb_decode(0.04045) == Approx(0.04045 / 12.92).epsilon(1e-15));
  CHECK(srgb_decode(std::nextafter(0.04045, 1.0)) == Approx(std::pow(0.09545 / 1.055, 2.4)).epsilon(1e-12));
  CHECK(srgb_encode(0.0) == 0.0);
  CHECK(srgb_encode(1.0) == Approx(1.0).epsilon(1e-15));
  CHECK(srgb_encode(0.2140411) == Approx(0.5).epsilon(1e-6));  // mid grey, a widely printed pair
  CHECK(srgb_encode(0.18) == Approx(0.46136).epsilon(1e-4));
}

TEST_CASE("Every 8-bit and 16-bit value survives decoding and encoding", "[tone]") {
  for (int v = 0; v <= 65535; ++v) CHECK(std::lround(65535.0 * srgb_encode(srgb_decode(v / 65535.0))) == v);
  for (int v = 0; v <= 255; ++v) CHECK(std::lround(255.0 * srgb_encode(srgb_decode_bytes(v, 0, 0).x)) == v);
}

TEST_CASE("A matt white card facing the key prints as sRGB 243", "[tone]") {
  CHECK(tone(1.0) == 0.9);
  CHECK(std::lround(255.0 * srgb_encode(tone(1.0))) == 243);
}

TEST_CASE("The tone curve rises everywhere, has no kink, and stays below 1", "[tone]") {
  const double h = 1e-6;
  for (const double x : {0.1, 0.5, 0.999, 1.0, 1.001, 1.5, 2.0}) {
    const double left = (tone(x) - tone(x - h)) / h, right = (tone(x + h) - tone(x)) / h;
    CHECK(left > 0.0);
    CHECK(left == Approx(right).epsilon(1e-4));
  }
  CHECK((tone(1.0 + h) - tone(1.0)) / h == Approx(0.9).epsilon(1e-4));
  CHECK(tone(0.0) == 0.0);
  CHECK(tone(3.0) < 1.0);
  CHECK(tone(1e30) <= 1.0);
}

TEST_CASE("Only highlights come near white: twice the card still prints below 1", "[tone]") {
  CHECK(tone(1.1) < 0.96);
  CHECK(tone(2.0) == Approx(1.0 - 0.1 * std::exp(-9.0)).epsilon(1e-12));
}

TEST_CASE("The inverse tone curve gives back what prints as a colour, white included", "[tone]") {
  for (int v = 0; v <= 255; ++v) {
    const double display = srgb_decode(v / 255.0);
    CHECK(tone(inverse_tone(display)) == Approx(display).margin(1.1e-6));
    CHECK(std::lround(65535.0 * srgb_encode(tone(inverse_tone(display)))) == std::lround(65535.0 * (v / 255.0)));
  }
  for (double x = 0.0; x < 2.2; x += 0.01) CHECK(inverse_tone(tone(x)) == Approx(x).margin(1e-9));
  CHECK(std::isfinite(inverse_tone(1.0)));
}
