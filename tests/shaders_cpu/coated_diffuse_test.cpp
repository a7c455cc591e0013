// SPDX-License-Identifier: Apache-2.0
// The coated matt surface: energy, reciprocity, and a sampler that does what its density says.
#include "shaders_cpu/surface/coated_diffuse.h"

#include "math/basis3f.h"
#include "math/sobol.h"
#include "shaders_cpu/surface/fresnel.h"
#include "support/catch.h"
#include "support/statistics.h"

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

constexpr double kGlosses[] = {0.0, 0.25, 0.5, 0.75, 1.0};
constexpr double kCosines[] = {0.02, 0.1, 0.3, 0.6, 1.0};

Vec3f tilted(double cosine) { return Vec3f(Vec3(std::sqrt(1.0 - cosine * cosine), 0.0, cosine)); }

CoatAlbedo coat_of(double gloss) { return {kAragoniteIndex, alpha_of_gloss(gloss)}; }

/// Mean weight of the scattered directions = directional albedo, from independent scrambled nets.
test::Mean albedo_by_sampling(const SurfaceView& view) {
  test::Mean mean;
  for (std::uint32_t key = 0; key < 64; ++key) {
    SobolStream stream({key, 0, 0, 0, 11});
    double sum = 0.0;
    constexpr std::uint32_t kPoints = 1u << 10;
    for (std::uint32_t i = 0; i < kPoints; ++i) {
      stream.set_point(i);
      const auto u = stream.block(0);
      const Scatter s = view.scatter(u[0], u[1], u[2]);
      if (s.reflection.pdf > 0.0f) sum += static_cast<double>(s.reflection.value.x * s.direction.z / s.reflection.pdf);
    }
    mean.add(sum / kPoints);
  }
  return mean;
}

}  // namespace

TEST_CASE("A white body under any coat returns all light, in every direction", "[surface]") {
  for (const double gloss : kGlosses) {
    const CoatAlbedo coat = coat_of(gloss);
    for (const double cosine : kCosines) {
      const test::Mean albedo = albedo_by_sampling(SurfaceView({Vec3f(1.0f), &coat}, tilted(cosine)));
      INFO("gloss " << gloss << " cosine " << cosine << " albedo " << albedo.value() << " +- " << albedo.standard_error());
      // 4 standard errors, and what interpolation in the table may add (measured in its own test).
      CHECK(std::abs(albedo.value() - 1.0) < 4.0 * albedo.standard_error() + 5e-5);
    }
  }
}

TEST_CASE("A body of albedo a returns E + (1 - E) a, less than all light", "[surface]") {
  for (const double gloss : kGlosses) {
    const CoatAlbedo coat = coat_of(gloss);
    for (const double body : {0.0, 0.2, 0.8})
      for (const double cosine : kCosines) {
        const auto a = static_cast<float>(body);
        const test::Mean albedo = albedo_by_sampling(SurfaceView({Vec3f(a), &coat}, tilted(cosine)));
        const double share = static_cast<double>(coat.at(static_cast<float>(cosine)));
        CHECK(std::abs(albedo.value() - (share + (1.0 - share) * body)) < 4.0 * albedo.standard_error() + 5e-5);
        CHECK(albedo.value() < 1.0);
      }
  }
}

TEST_CASE("Without a coat the surface is Lambert's: albedo / pi everywhere", "[surface]") {
  const SurfaceView view({Vec3f(0.7f, 0.5f, 0.3f), nullptr}, tilted(0.4));
  for (const double cosine : kCosines) {
    const Reflection r = view.reflect(tilted(cosine));
    CHECK(static_cast<double>(r.value.y) == Approx(0.5 / kPi));
    CHECK(static_cast<double>(r.pdf) == Approx(cosine / kPi));
  }
  CHECK(albedo_by_sampling(view).value() == Approx(0.7).epsilon(1e-5));
}

TEST_CASE("Light may be followed either way: the BRDF is reciprocal", "[surface]") {
  for (const double gloss : kGlosses) {
    const CoatAlbedo coat = coat_of(gloss);
    const CoatedDiffuse surface{Vec3f(0.8f, 0.6f, 0.1f), &coat};
    for (std::uint64_t i = 0; i < 2000; ++i) {
      const auto direction = [&](std::uint64_t k) {
        const float z = 0.01f + 0.99f * unit_float(low_word(mix64(4 * i + k)));
        const float angle = 6.2831853f * unit_float(high_word(mix64(4 * i + k)));
        const float s = std::sqrt(1.0f - z * z);
        return unit(Vec3f(s * std::cos(angle), s * std::sin(angle), z));
      };
      Vec3f a = direction(1), b = direction(2);
      if (i % 4 == 0) b = unit(Vec3f(-a.x, -a.y, a.z) + 0.01f * b);  // near the mirror direction
      const Vec3f there = SurfaceView(surface, a).reflect(b).value, back = SurfaceView(surface, b).reflect(a).value;
      for (int c = 0; c < 3; ++c) CHECK(there[c] == Approx(back[c]).epsilon(2e-3));
    }
  }
}

TEST_CASE("Directions are drawn with their stated density, and those lost below the horizon fill it up to 1", "[surface]") {
  constexpr int kRows = 16, kColumns = 24, kFine = 40, kCount = 1 << 17;
  for (const double gloss : {0.0, 0.4, 0.7})
    for (const double cosine : {0.1, 0.5, 0.9}) {
      const CoatAlbedo coat = coat_of(gloss);
      const SurfaceView view({Vec3f(0.1f), &coat}, tilted(cosine));  // a dark body: the coat is drawn often
      std::vector<double> counts(kRows * kColumns + 1, 0.0), expected(kRows * kColumns + 1, 0.0);
      double inside = 0.0;
      for (int r = 0; r < kRows * kFine; ++r)
        for (int c = 0; c < kColumns * kFine; ++c) {
          const double z = (r + 0.5) / (kRows * kFine), s = std::sqrt(1.0 - z * z);
          const double angle = kTwoPi * (c + 0.5) / (kColumns * kFine);
          const Vec3f wi(Vec3(s * std::cos(angle), s * std::sin(angle), z));
          const double share = static_cast<double>(view.reflect(wi).pdf) * kTwoPi / (kRows * kFine * kColumns * kFine);
          expected[static_cast<std::size_t>(r / kFine * kColumns + c / kFine)] += share * kCount;
          inside += share;
        }
      REQUIRE(inside <= 1.0 + 1e-3);
      expected.back() = std::max(0.0, 1.0 - inside) * kCount;
      double value_faults = 0.0;
      for (std::uint64_t i = 0; i < kCount; ++i) {
        const std::uint64_t a = mix64(2 * i + 1), b = mix64(2 * i + 2);
        const Scatter s = view.scatter(unit_float(low_word(a)), unit_float(high_word(a)), unit_float(low_word(b)));
        if (!(s.reflection.pdf > 0.0f)) {
          counts.back() += 1.0;
          continue;
        }
        value_faults += std::abs(static_cast<double>(view.reflect(s.direction).pdf / s.reflection.pdf) - 1.0) > 1e-4;
        const int row = std::min(kRows - 1, static_cast<int>(static_cast<float>(kRows) * s.direction.z));
        const double turn = std::atan2(static_cast<double>(s.direction.y), static_cast<double>(s.direction.x)) / kTwoPi;
        const int column = std::min(kColumns - 1, static_cast<int>(kColumns * (turn < 0.0 ? turn + 1.0 : turn)));
        counts[static_cast<std::size_t>(row * kColumns + column)] += 1.0;
      }
      INFO("gloss " << gloss << " cosine " << cosine << " inside " << inside);
      CHECK(value_faults == 0.0);
      CHECK(test::chi_square_sigmas(counts, expected) < 4.0);
    }
}

TEST_CASE("Gloss 0 looks matt", "[surface]") {
  // Within 60 degrees of the normal, on both sides, no direction is brighter than the dimmest by more than a third.
  const CoatAlbedo coat = coat_of(0.0);
  double least = 1e9, most = 0.0;
  for (int i = 0; i <= 12; ++i)
    for (int j = 0; j <= 12; ++j)
      for (int k = 0; k <= 8; ++k) {
        const double a = radians(5.0 * i), b = radians(5.0 * j), turn = radians(22.5 * k);
        const Vec3f wo(Vec3(std::sin(a), 0.0, std::cos(a)));
        const Vec3f wi(Vec3(std::sin(b) * std::cos(turn), std::sin(b) * std::sin(turn), std::cos(b)));
        const double f = kPi * static_cast<double>(SurfaceView({Vec3f(0.7f), &coat}, wo).reflect(wi).value.x);
        least = std::min(least, f);
        most = std::max(most, f);
      }
  INFO("pi f from " << least << " to " << most);
  CHECK(most < least * 4.0 / 3.0);
}

TEST_CASE("Gloss 1 is nearly a mirror: the highlight's half width is about one degree", "[surface]") {
  const CoatAlbedo coat = coat_of(1.0);
  const SurfaceView view({Vec3f(0.0f), &coat}, tilted(0.8));
  const auto at = [&](double off_deg) {
    const double angle = std::acos(0.8) + radians(off_deg);
    return view.reflect(Vec3f(Vec3(-std::sin(angle), 0.0, std::cos(angle)))).value.x;
  };
  CHECK(at(0.7) > 0.5f * at(0.0));
  CHECK(at(1.2) < 0.5f * at(0.0));
  CHECK(alpha_of_gloss(0.0) == 1.0);
  CHECK(alpha_of_gloss(1.0) == Approx(kPolishedAlpha));
}
