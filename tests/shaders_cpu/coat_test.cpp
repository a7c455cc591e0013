// SPDX-License-Identifier: Apache-2.0
// The rough clear coat: its facets, its sampling, its albedo.
#include "shaders_cpu/surface/coat_albedo.h"

#include "math/sobol.h"
#include "shaders_cpu/surface/coated_diffuse.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/ggx.h"
#include "support/catch.h"
#include "support/statistics.h"

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

constexpr double kAlphas[] = {0.01, 0.05, 0.2, 0.5, 1.0};

Vec3 tilted(double cosine) { return {std::sqrt(1.0 - cosine * cosine), 0.0, cosine}; }

}  // namespace

TEST_CASE("Facet areas projected on the surface sum to the surface", "[ggx]") {
  for (const double alpha : kAlphas) {
    double sum = 0.0;  // over t = tan(angle) / alpha, in s = t / (1 + t): the integrand is then smooth
    constexpr int kSteps = 2000;
    for (int i = 0; i < kSteps; ++i) {
      const double s = (i + 0.5) / kSteps, t = alpha * s / (1.0 - s), cosine = 1.0 / std::sqrt(1.0 + t * t);
      const double dt = alpha / ((1.0 - s) * (1.0 - s)) / kSteps;
      sum += kTwoPi * ggx_density(tilted(cosine), alpha) * cosine * t * cosine * cosine * cosine * dt;
    }
    CHECK(sum == Approx(1.0).epsilon(1e-5));
  }
}

TEST_CASE("Facets seen from a direction have the area that the direction sees", "[ggx]") {
  // Walter et al. 2007: the integral of G1 max(0, wo.h) D(h) equals wo.z.
  for (const double alpha : {0.2, 0.5, 1.0})
    for (const double cosine : {0.1, 0.4, 0.8, 1.0}) {
      const Vec3 wo = tilted(cosine);
      double sum = 0.0;
      constexpr int kSteps = 1500;
      for (int i = 0; i < kSteps; ++i)
        for (int j = 0; j < 256; ++j) {
          const double c = (i + 0.5) / kSteps, s = std::sqrt(1.0 - c * c), angle = kTwoPi * (j + 0.5) / 256;
          const Vec3 h(s * std::cos(angle), s * std::sin(angle), c);
          sum += std::max(0.0, wo.dot(h)) * ggx_density(h, alpha) * kTwoPi / (kSteps * 256.0);
        }
      CHECK(sum / (1.0 + ggx_lambda(wo, alpha)) == Approx(cosine).epsilon(2e-4));
    }
}

TEST_CASE("Visible normals are drawn with their stated density", "[ggx]") {
  // Bins even in the disc of Heitz's method would hide faults: bins are even in the normal's cosine and azimuth.
  constexpr int kRows = 12, kColumns = 16, kFine = 24, kLog = 17;
  for (const double alpha : {0.1, 0.4, 1.0})
    for (const double cosine : {0.05, 0.5, 0.95}) {
      const Vec3 wo = tilted(cosine);
      std::vector<double> counts(kRows * kColumns, 0.0), expected(kRows * kColumns, 0.0);
      // Rows even in u = 1 / sqrt(1 + tan^2 / alpha^2), which suits every roughness.
      const auto cosine_of = [&](double u) { return 1.0 / std::sqrt(1.0 + alpha * alpha * (1.0 / (u * u) - 1.0)); };
      for (int r = 0; r < kRows * kFine; ++r)
        for (int c = 0; c < kColumns * kFine; ++c) {
          const double u0 = static_cast<double>(r) / (kRows * kFine), u1 = static_cast<double>(r + 1) / (kRows * kFine);
          const double low = u0 > 0.0 ? cosine_of(u0) : 0.0, high = cosine_of(u1), z = cosine_of(0.5 * (u0 + u1));
          const double s = std::sqrt(1.0 - z * z), angle = kTwoPi * (c + 0.5) / (kColumns * kFine);
          const Vec3 h(s * std::cos(angle), s * std::sin(angle), z);
          const double density =
              std::max(0.0, wo.dot(h)) * ggx_density(h, alpha) / (cosine * (1.0 + ggx_lambda(wo, alpha)));
          expected[static_cast<std::size_t>(r / kFine * kColumns + c / kFine)] +=
              density * (high - low) * kTwoPi / (kColumns * kFine) * (1 << kLog);
        }
      double total = 0.0;
      for (const double e : expected) total += e;
      CHECK(total == Approx(1 << kLog).epsilon(2e-3));
      for (int i = 0; i < (1 << kLog); ++i) {
        const auto key = static_cast<std::uint64_t>(i);
        const double u1 = static_cast<double>(mix64(2 * key + 1) >> 11) * 0x1p-53;
        const double u2 = static_cast<double>(mix64(2 * key + 2) >> 11) * 0x1p-53;
        const Vec3 h = ggx_visible_normal(wo, alpha, std::sqrt(u1), kTwoPi * u2);
        const double tan2 = (1.0 - h.z * h.z) / (h.z * h.z * alpha * alpha);
        const int row = std::min(kRows - 1, static_cast<int>(kRows / std::sqrt(1.0 + tan2)));
        const double turn = std::atan2(h.y, h.x) / kTwoPi;
        const int column = std::min(kColumns - 1, static_cast<int>(kColumns * (turn < 0.0 ? turn + 1.0 : turn)));
        counts[static_cast<std::size_t>(row * kColumns + column)] += 1.0;
      }
      INFO("alpha " << alpha << " cosine " << cosine);
      CHECK(test::chi_square_sigmas(counts, expected) < 4.0);
    }
}

TEST_CASE("The table of the coat's albedo holds what finer quadrature gives", "[coat]") {
  for (const double alpha : kAlphas) {
    const CoatAlbedo coat(kAragoniteIndex, alpha);
    for (const double cosine : {0.003, 0.02, 0.05, 0.1, 0.2, 0.35, 0.5, 0.75, 0.97, 1.0}) {
      INFO("alpha " << alpha << " cosine " << cosine);
      CHECK(std::abs(static_cast<double>(coat.at(static_cast<float>(cosine))) -
                     coat_albedo_quadrature(cosine, kAragoniteIndex, alpha, 64)) < 5e-5);
    }
  }
}

TEST_CASE("The coat's albedo is the integral of the coat's reflection over the hemisphere", "[coat]") {
  // A black body leaves the coat alone. Midpoint rule over the hemisphere, independent of any sampling.
  for (const double alpha : {0.2, 0.5, 1.0}) {
    const CoatAlbedo coat(kCalciteIndex, alpha);
    for (const double cosine : {0.2, 0.6, 1.0}) {
      const SurfaceView view({Vec3f(0.0f), &coat}, Vec3f(tilted(cosine)));
      double sum = 0.0;
      constexpr int kSteps = 800;
      for (int i = 0; i < kSteps; ++i)
        for (int j = 0; j < 400; ++j) {
          const double c = (i + 0.5) / kSteps, s = std::sqrt(1.0 - c * c), angle = kTwoPi * (j + 0.5) / 400;
          const Vec3f wi(Vec3(s * std::cos(angle), s * std::sin(angle), c));
          sum += static_cast<double>(view.reflect(wi).value.x) * c * kTwoPi / (kSteps * 400.0);
        }
      CHECK(sum == Approx(static_cast<double>(coat.at(static_cast<float>(cosine)))).epsilon(3e-4));
    }
  }
}

TEST_CASE("A nearly smooth coat reflects what Fresnel's equations say", "[coat]") {
  const CoatAlbedo coat(1.530, kPolishedAlpha);
  CHECK(static_cast<double>(coat.at(1.0f)) == Approx(0.04388).margin(2e-5));  // row C29a of the check values
  for (const double cosine : {0.3, 0.5, 0.8})
    CHECK(static_cast<double>(coat.at(static_cast<float>(cosine))) ==
          Approx(fresnel_dielectric(cosine, 1.530)).epsilon(3e-3));
}

TEST_CASE("The mean albedo is that of the interpolated table", "[coat]") {
  for (const double alpha : kAlphas) {
    const CoatAlbedo coat(kAragoniteIndex, alpha);
    double sum = 0.0;
    constexpr int kSteps = 200000;
    for (int i = 0; i < kSteps; ++i) {
      const double c = (i + 0.5) / kSteps;
      sum += 2.0 * c * static_cast<double>(coat.at(static_cast<float>(c))) / kSteps;
    }
    CHECK(static_cast<double>(coat.mean()) == Approx(sum).epsilon(1e-5));
  }
}
