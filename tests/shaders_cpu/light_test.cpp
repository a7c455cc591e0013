// SPDX-License-Identifier: Apache-2.0
// Cones, ball lamps and the colour of glowing bodies.
#include "math/hash.h"
#include "shaders_cpu/light/blackbody.h"
#include "shaders_cpu/light/key_light.h"
#include "shaders_cpu/light/sphere_lamp.h"
#include "support/catch.h"
#include "support/statistics.h"

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

Vec2 uniform_pair(std::uint64_t i) {
  const std::uint64_t word = mix64(i + 12345);
  return {static_cast<double>(unit_float(low_word(word))), static_cast<double>(unit_float(high_word(word)))};
}

}  // namespace

TEST_CASE("A cone is sampled evenly in solid angle", "[light]") {
  constexpr int kRows = 16, kColumns = 16, kCount = 1 << 16;
  for (const double half_angle_deg : {0.5, 12.0, 60.0, 180.0}) {
    const double half = std::sin(0.5 * radians(half_angle_deg));
    const Cone cone{Vec3f(Vec3(0.6, -0.48, 0.64)), static_cast<float>(2.0 * half * half)};
    const Basis3f basis(cone.axis);
    std::vector<double> counts(kRows * kColumns, 0.0), expected(kRows * kColumns, kCount / static_cast<double>(kRows * kColumns));
    int outside = 0;
    for (std::uint64_t i = 0; i < kCount; ++i) {
      const Vec2 u = uniform_pair(i);
      const Vec3f d = cone.sample(static_cast<float>(u.x), static_cast<float>(u.y));
      const Vec3f apart = d - cone.axis, local = basis.to_local(d);
      const double drop = 0.5 * static_cast<double>(apart.dot(apart)) / static_cast<double>(cone.one_minus_cos);
      outside += drop > 1.0001;
      const double turn = std::atan2(static_cast<double>(local.y), static_cast<double>(local.x)) / kTwoPi;
      const int row = std::min(kRows - 1, static_cast<int>(kRows * drop));
      const int column = std::min(kColumns - 1, static_cast<int>(kColumns * (turn < 0.0 ? turn + 1.0 : turn)));
      counts[static_cast<std::size_t>(row * kColumns + column)] += 1.0;
    }
    INFO("half angle " << half_angle_deg);
    CHECK(outside == 0);
    CHECK(test::chi_square_sigmas(counts, expected) < 4.0);
    CHECK(cone.pdf() * cone.solid_angle() == Approx(1.0f));
    CHECK(static_cast<double>(cone.solid_angle()) == Approx(kTwoPi * (1.0 - std::cos(radians(half_angle_deg)))).epsilon(1e-6));
  }
}

TEST_CASE("The cone of a far small ball keeps its solid angle: no cancellation", "[light]") {
  for (const double distance : {1.5, 10.0, 1e3, 1e5}) {
    const SphereLamp lamp{Vec3f(Vec3(0.0, 0.0, distance)), 1.0f, Vec3f(1.0f)};
    const LampView view(lamp, Vec3f(0.0f));
    const double sin2 = 1.0 / (distance * distance);
    CHECK(static_cast<double>(view.cone.solid_angle()) == Approx(kTwoPi * sin2 / (1.0 + std::sqrt(1.0 - sin2))).epsilon(1e-5));
  }
}

TEST_CASE("From inside a lamp all directions are drawn", "[light]") {
  const SphereLamp lamp{Vec3f(0.0f), 1.0f, Vec3f(1.0f)};
  CHECK(static_cast<double>(LampView(lamp, Vec3f(0.3f, 0.0f, 0.0f)).cone.solid_angle()) == Approx(4.0 * kPi));
  CHECK(LampView(lamp, Vec3f(1.0f, 0.0f, 0.0f)).cone.one_minus_cos == 2.0f);
}

TEST_CASE("A ball lamp above the horizon gives a facing card the irradiance pi L (r / d)^2", "[light]") {
  // Closed form for an even ball: E = pi L (r/d)^2 cos, as long as all of it is above the horizon.
  for (const double cosine : {1.0, 0.6})
    for (const double distance : {2.0, 5.0, 50.0}) {
      const double sine = std::sqrt(1.0 - cosine * cosine);
      const SphereLamp lamp{Vec3f(Vec3(sine, 0.0, cosine) * distance), 1.0f, Vec3f(1.0f)};
      const LampView view(lamp, Vec3f(0.0f));
      test::Mean irradiance;
      for (std::uint64_t i = 0; i < (1 << 16); ++i) {
        const Vec2 u = uniform_pair(i);
        const Vec3f d = view.cone.sample(static_cast<float>(u.x), static_cast<float>(u.y));
        irradiance.add(static_cast<double>(d.z / view.cone.pdf()));
      }
      CHECK(irradiance.sigmas_from(kPi * cosine / (distance * distance)) < 4.0);
    }
}

TEST_CASE("A ray meets a lamp at its near side, from inside at its far side, never behind", "[light]") {
  const SphereLamp lamp{Vec3f(0.0f, 0.0f, 5.0f), 2.0f, Vec3f(1.0f)};
  CHECK(lamp_distance(lamp, Vec3f(0.0f), Vec3f(0, 0, 1)) == Approx(3.0f));
  CHECK(lamp_distance(lamp, Vec3f(0, 0, 5), Vec3f(0, 0, 1)) == Approx(2.0f));
  CHECK(lamp_distance(lamp, Vec3f(0, 0, 6), Vec3f(0, 0, -1)) == Approx(3.0f));
  CHECK(std::isinf(lamp_distance(lamp, Vec3f(0.0f), Vec3f(0, 0, -1))));
  CHECK(std::isinf(lamp_distance(lamp, Vec3f(0, 0, 8), Vec3f(0, 0, 1))));
  CHECK(std::isinf(lamp_distance(lamp, Vec3f(2.1f, 0, 0), Vec3f(0, 0, 1))));
  CHECK(lamp_distance(lamp, Vec3f(1.2f, 0, 0), Vec3f(0, 0, 1)) == Approx(5.0f - 1.6f));
}

TEST_CASE("A small lamp far away is still met within its true outline", "[light]") {
  const SphereLamp lamp{Vec3f(0.0f, 0.0f, 1000.0f), 0.1f, Vec3f(1.0f)};
  const auto towards = [](double x) { return Vec3f(Vec3(x, 0.0, 1000.0).normalized()); };
  CHECK(static_cast<double>(lamp_distance(lamp, Vec3f(0.0f), towards(0.09))) == Approx(1000.0 - std::sqrt(0.1 * 0.1 - 0.09 * 0.09)).epsilon(1e-6));
  CHECK(std::isinf(lamp_distance(lamp, Vec3f(0.0f), towards(0.11))));
}

TEST_CASE("The key disc holds the directions within its angular radius and no others", "[light]") {
  for (const double softness_deg : {0.1, 1.0, 12.0, 60.0}) {
    const Vec3 axis = Vec3(0.3, 0.5, 0.7).normalized();
    const KeyLight key{key_cone(axis, softness_deg), Vec3f(2.0f)};
    const Vec3 side = axis.cross(Vec3(0, 0, 1)).normalized();
    const auto at = [&](double deg) { return Vec3f(axis * std::cos(radians(deg)) + side * std::sin(radians(deg))); };
    CHECK(key.radiance_along(at(0.99 * softness_deg)).x == 2.0f);
    CHECK(key.radiance_along(at(1.01 * softness_deg)).x == 0.0f);
  }
}

TEST_CASE("A black body at 2856 K has the colour of CIE standard illuminant A", "[blackbody]") {
  // CIE 15 / ISO 11664-2: x = 0.44758, y = 0.40745. The fits of the observer are good to a few thousandths.
  const Vec3 xyz = blackbody_xyz(2855.5);
  const double sum = xyz.x + xyz.y + xyz.z;
  CHECK(xyz.x / sum == Approx(0.44758).margin(0.003));
  CHECK(xyz.y / sum == Approx(0.40745).margin(0.003));
}

TEST_CASE("A black body at 6504 K is nearly neutral, at 3200 K warm", "[blackbody]") {
  const Vec3 day = blackbody_colour(6504.0), lamp = blackbody_colour(3200.0);
  for (int c = 0; c < 3; ++c) CHECK(day[c] == Approx(1.0).margin(0.06));
  CHECK(lamp.x > 1.4);
  CHECK(lamp.z < 0.5);
  CHECK(lamp.x > lamp.y);
  CHECK(lamp.y > lamp.z);
}

TEST_CASE("Every lamp colour has luminance 1 and no negative channel", "[blackbody]") {
  for (double kelvin = 800.0; kelvin < 30000.0; kelvin *= 1.1) {
    const Vec3 c = blackbody_colour(kelvin);
    CHECK(0.2126 * c.x + 0.7152 * c.y + 0.0722 * c.z == Approx(1.0).epsilon(1e-12));
    CHECK(std::min({c.x, c.y, c.z}) >= 0.0);
  }
}
