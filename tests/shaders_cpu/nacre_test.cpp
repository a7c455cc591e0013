// SPDX-License-Identifier: Apache-2.0
// Nacre: where its colours lie, and that its surfaces keep energy and exchange light and view.
#include "math/hemisphere.h"
#include "math/sobol.h"
#include "shaders_cpu/light/observer.h"
#include "shaders_cpu/surface/coated_diffuse.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/surface/layers.h"
#include "shaders_cpu/surface/nacre.h"
#include "support/airy.h"
#include "support/catch.h"

#include <array>
#include <cmath>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

const NacreCoat& demo_coat() {
  static const NacreCoat coat(NacreStack{}, 0.1);
  return coat;
}

}  // namespace

TEST_CASE("Nacre reflects what Airy's formula gives, sheet by sheet", "[shaders]") {
  for (const int count : {1, 30, 60})
    for (double nm = 380.0; nm <= 780.0; nm += 7.0)
      for (const double cosine : {1.0, 0.7, 0.3, 0.05}) {
        const std::array<test::AiryLayer, 2> pair = {test::AiryLayer{1.5, 8.0}, test::AiryLayer{kTabletIndex, 442.0}};
        const double s = test::airy(1.0, pair, count, kTabletIndex, nm, cosine, true).first;
        const double p = test::airy(1.0, pair, count, kTabletIndex, nm, cosine, false).first;
        CHECK(nacre_reflectance({442.0, 0.0, 8.0, 1.5, count}, nm, cosine) == Approx(0.5 * (s + p)).epsilon(1e-9));
      }
}

TEST_CASE("Nacre shines at m lambda = 2 (n_a d_a + n_o d_o)", "[shaders]") {
  // Rows C37a to C37c: tablets of 442 nm (n 1.68), sheets of 8 nm (n 1.5). The formula is that of single echoes. Many of them, between
  // media of the tablets' index, pull the maximum up by a share of second order in the sheets' contrast: by 0.074, 0.049 and 0.036 nm
  // for a stack without end, whose maximum is the extreme of cos(a) cos(b) - (n_a / n_o + n_o / n_a) sin(a) sin(b) / 2 with the phases
  // a and b of tablet and sheet. With 30 tablets hardly any of that shows, with 480 all.
  constexpr double kTablet = 1.68, kTabletNm = 442.0, kSheet = 1.5, kSheetNm = 8.0;
  const std::array<Layer, 2> pair = {Layer{kSheet, kSheetNm}, Layer{kTablet, kTabletNm}};
  const auto highest = [](double around, double reach, const auto& value) {
    double best = -1.0, at = 0.0;
    for (double nm = around - reach; nm <= around + reach; nm += reach / 10000.0)
      if (const double r = value(nm); r > best) best = r, at = nm;
    return at;
  };
  const auto without_end = [](double nm) {
    const double a = kTwoPi * kTablet * kTabletNm / nm, b = kTwoPi * kSheet * kSheetNm / nm;
    return std::abs(std::cos(a) * std::cos(b) - 0.5 * (kTablet / kSheet + kSheet / kTablet) * std::sin(a) * std::sin(b));
  };
  for (const auto& [order, published] : {std::pair{2, 754.56}, std::pair{3, 503.04}, std::pair{4, 377.28}}) {
    const auto stack = [&](int count) {
      return highest(published, 0.5 * published / (order * count),
                     [&](double nm) { return stack_response(kTablet, pair, count, kTablet, nm, 1.0).mean_reflectance(); });
    };
    CHECK(stack(30) == Approx(published).margin(0.03));
    CHECK(stack(480) == Approx(highest(published, 0.5, without_end)).margin(2e-3));
    CHECK(stack(480) == Approx(published).margin(0.075));
  }
}

TEST_CASE("The outer face pulls nacre's maximum aside by less than a third of the band's width, and the less the more tablets",
          "[shaders]") {
  // A face whose reflection stands out of step with that of the stack. The pull falls somewhat faster than the width, wavelength over
  // order and number: by 0.284, 0.216 and 0.169 of the width in the third order with 30, 60 and 120 tablets (from Airy's formula).
  const double middle = 503.04 + 2.0 * 442.0 * (kTabletIndex - 1.68) / 3.0;
  double last = 1.0;
  for (const auto& [count, wanted] : {std::pair{30, 0.284}, std::pair{60, 0.216}, std::pair{120, 0.169}}) {
    const double width = middle / (3.0 * count);
    double best = 0.0, at = 0.0;
    for (double nm = middle - width; nm <= middle + width; nm += width / 4000.0)
      if (const double r = nacre_reflectance({442.0, 0.0, 8.0, 1.5, count}, nm, 1.0); r > best) best = r, at = nm;
    const double pull = (at - middle) / width;
    CHECK(pull == Approx(wanted).margin(0.001));
    CHECK(pull < last);
    last = pull;
  }
}

TEST_CASE("Thickness and wavelength scale together", "[shaders]") {
  const NacreStack stack{}, thicker{stack.tablet_nm * 1.2, stack.spread_nm * 1.2, stack.sheet_nm * 1.2, 1.5, 30};
  for (const double nm : {420.0, 500.0, 640.0})
    CHECK(nacre_reflectance(stack, nm, 0.7, 1.2) == Approx(nacre_reflectance(thicker, nm, 0.7)).epsilon(1e-9));
}

TEST_CASE("Without sheets nacre is plain aragonite", "[shaders]") {
  const NacreStack stack{440.0, 20.0, 0.0, 1.5, 30};
  for (const double cosine : {1.0, 0.5, 0.2})
    CHECK(nacre_reflectance(stack, 550.0, cosine) == Approx(fresnel_dielectric(cosine, kTabletIndex)).epsilon(1e-9));
}

TEST_CASE("A reflectance of 1 is white, and that of 0.5 half of it", "[shaders]") {
  const Vec3 white = reflected_colour([](double) { return 1.0; });
  for (int i = 0; i < 3; ++i) CHECK(white[i] == Approx(1.0).epsilon(1e-12));
  CHECK(reflected_colour([](double) { return 0.5; }).y == Approx(0.5).epsilon(1e-12));
}

TEST_CASE("The observer's and daylight's numbers give daylight its published chromaticity", "[shaders]") {
  Vec3 sum(0.0);  // CIE 15: x = 0.3127, y = 0.3290 for D65; the fits of the observer err by some thousandths
  for (double nm = 380.0; nm <= 780.0; nm += 1.0) sum += cie_observer(nm) * daylight_d65(nm);
  const double total = sum.x + sum.y + sum.z;
  CHECK(sum.x / total == Approx(0.3127).margin(0.002));
  CHECK(sum.y / total == Approx(0.3290).margin(0.002));
}

TEST_CASE("The table of facets agrees with the sum over wavelengths", "[shaders]") {
  for (const float scale : {0.875f, 1.0f, 1.125f})  // rows of the table
    for (const int node : {64, 48, 30}) {
      const float u = static_cast<float>(node) / (NacreCoat::kNodes - 1), cosine = u * u;
      const Vec3 wanted = reflected_colour([&](double nm) {
        return nacre_reflectance(NacreStack{}, nm, static_cast<double>(cosine), static_cast<double>(scale));
      });
      const Vec3f found = demo_coat().facet(cosine, scale);
      for (int c = 0; c < 3; ++c)
        CHECK(static_cast<double>(found[c]) == Approx(std::clamp(wanted[c], 0.0, 1.0)).margin(0.004));
    }
}

TEST_CASE("Nacre over a white body returns all light and never more, in every colour, and over a dark one less", "[shaders]") {
  for (const float scale : {0.8f, 1.0f, 1.13f})
    for (const float cosine : {0.95f, 0.5f, 0.15f}) {
      const Vec3f wo(std::sqrt(1.0f - cosine * cosine), 0.0f, cosine);
      for (const float albedo : {1.0f, 0.3f}) {
        const SurfaceView view({Vec3f(albedo), nullptr, &demo_coat(), scale}, wo);
        SobolStream stream({0, 0, 0, 0, 7});
        Vec3 sum(0.0);
        constexpr int kDraws = 1 << 16;
        for (int i = 0; i < kDraws; ++i) {
          stream.set_point(static_cast<std::uint32_t>(i));
          const auto u = stream.block(0);
          const Scatter s = view.scatter(u[0], u[1], u[2]);
          if (s.reflection.pdf > 0.0f) sum += Vec3(s.reflection.value) * static_cast<double>(s.direction.z / s.reflection.pdf);
        }
        for (int c = 0; c < 3; ++c) {
          if (albedo == 1.0f) CHECK(sum[c] / kDraws == Approx(1.0).margin(2e-4));  // 6e-5 by the points of so even a net
          else CHECK(sum[c] / kDraws < 0.6);
        }
      }
    }
}

TEST_CASE("Light and view may be exchanged on nacre", "[shaders]") {
  const Vec3f a = Vec3f(0.3f, 0.2f, 0.9f).normalized(), b = Vec3f(-0.6f, 0.1f, 0.5f).normalized();
  const CoatedDiffuse surface{Vec3f(0.8f, 0.6f, 0.4f), nullptr, &demo_coat(), 0.93f};
  const Vec3f there = SurfaceView(surface, a).reflect(b).value, back = SurfaceView(surface, b).reflect(a).value;
  for (int c = 0; c < 3; ++c) CHECK(there[c] == Approx(back[c]).epsilon(2e-4));
}

TEST_CASE("The drift of thickness stays within -1 and 1, closes round the section and is smooth", "[shaders]") {
  for (double turn = 0.0; turn < 6.0; turn += 0.037) {
    CHECK(std::abs(nacre_drift(turn, 25.0f, 1)) <= 1.0f);
    CHECK(nacre_drift(turn, -180.0f, 1) == Approx(nacre_drift(turn, 180.0f, 1)).margin(1e-4));
    CHECK(std::abs(nacre_drift(turn + 1e-4, 25.0f, 1) - nacre_drift(turn, 25.0f, 1)) < 0.01f);
  }
}
