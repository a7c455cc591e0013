// SPDX-License-Identifier: Apache-2.0
// Raup's parameters and the classic closed forms of coiled shells, taken on the law itself.
#include "growth/coiling_law.h"

#include "support/catch.h"
#include "support/shell_check_values.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using growth::CoilingLaw;
using growth::Station;

namespace {

// In units in which the outer margin at the lip is one away from the axis (R = 1), as the check values are.
CoilingLaw law_of(double W, double D, double T, double S, double whorls = 6.0) {
  test::ShellPlan plan;
  plan.W = {{0.0, W}};
  plan.D = D;
  plan.T = T;
  plan.S = S;
  plan.whorls = whorls;
  const specimen::Specimen s = test::specimen_of(plan);
  const CoilingLaw law = growth::coiling_law(s.growth, s.section);
  return growth::scaled(law, 1.0 / (law.distance + law.half_breadth));
}
CoilingLaw law_of(const test::CheckValue& row) {
  return law_of(row.input("W"), row.input("D"), row.input("T"), row.input("S", 1.0), row.input("whorls", 6.0));
}

Vec3 centre(const CoilingLaw& law, double theta) {
  const Station s = law.at(theta);
  return test::in_space(theta, {s.distance, s.depth});
}

double spiral_angle_deg(const CoilingLaw& law, double theta) {
  constexpr double kStep = 1e-5;
  const Vec3 p = centre(law, theta), along = centre(law, theta + kStep) - centre(law, theta - kStep);
  return degrees(std::acos(p.dot(along) / (p.length() * along.length())));
}

double chords(const CoilingLaw& law, double from, double to) {
  constexpr int kSteps = 200000;
  double sum = 0.0;
  Vec3 before = centre(law, from);
  for (int i = 1; i <= kSteps; ++i) {
    const Vec3 p = centre(law, from + (to - from) * i / kSteps);
    sum += (p - before).length();
    before = p;
  }
  return sum;
}

double outer_margin(const CoilingLaw& law, double theta) {
  const Station s = law.at(theta);
  return s.distance + s.half_breadth;
}

// Free room between the circular sections of the last two whorls; negative where they overlap.
double gap(double W, double D, double T) {
  const CoilingLaw law = law_of(W, D, T, 1.0);
  const Station a = law.at(law.theta_lip), b = law.at(law.theta_lip - kTwoPi);
  return std::hypot(a.distance - b.distance, a.depth - b.depth) - a.half_breadth - b.half_breadth;
}

double contact_D(double W, double T) {
  double lo = -0.4, hi = 0.98;  // apart at large D, in each other at small D
  for (int i = 0; i < 60; ++i) {
    const double mid = 0.5 * (lo + hi);
    (gap(W, mid, T) < 0.0 ? lo : hi) = mid;
  }
  return 0.5 * (lo + hi);
}

double W_of_angle(double alpha_deg) { return std::exp(kTwoPi / std::tan(radians(alpha_deg))); }

}  // namespace

TEST_CASE("W, D, T and S are the ratios that Raup defines", "[growth]") {
  // Raup 1966, J. Paleontology 40(5): 1178-1190, in the centre-line form of shell-geometry 1.2.
  for (const double W : {1.1, 2.0, 7.5})
    for (const double D : {-0.4, 0.0, 0.3, 0.95})
      for (const double T : {0.0, 1.5, 20.0})
        for (const double S : {0.3, 1.0, 4.0}) {
          CAPTURE(W, D, T, S);
          const CoilingLaw law = law_of(W, D, T, S);
          for (const double theta : {law.theta_lip, law.theta_lip - 1.0, 3.0, -20.0}) {
            const Station s = law.at(theta), later = law.at(theta + kTwoPi);
            const auto across = law.to_half_plane(s, {1.0, 0.0}), inward = law.to_half_plane(s, {-1.0, 0.0});
            const auto up = law.to_half_plane(s, {0.0, 1.0}), down = law.to_half_plane(s, {0.0, -1.0});
            CHECK(outer_margin(law, theta + kTwoPi) / outer_margin(law, theta) == Approx(W).epsilon(1e-12));
            CHECK(later.depth == Approx(W * s.depth).epsilon(1e-12));
            CHECK(inward.rho / across.rho == Approx(D).margin(1e-12));
            CHECK(s.depth / s.distance == Approx(T).margin(1e-12));
            CHECK((down.z - up.z) / (across.rho - inward.rho) == Approx(S).epsilon(1e-12));
          }
          CHECK(law.distance + law.half_breadth == Approx(1.0));
        }
}

TEST_CASE("The centre line crosses the radius from the pole at Thompson's spiral angles", "[growth][published]") {
  // Planar: Thompson 1917, On Growth and Form, p. 534 (C01), closed form (C02).
  for (const char* id : {"C01", "C02"})
    for (const test::CheckValue& row : test::check_values(id)) {
      CAPTURE(row.id);
      const CoilingLaw law = law_of(row.input("W"), 0.1, 0.0, 1.0);
      for (const double theta : {law.theta_lip, 11.0})
        CHECK(spiral_angle_deg(law, theta) == Approx(row.value).margin(row.tolerance).epsilon(0));
    }
  // On a cone of semi-angle theta: p. 558 (C03, C04). The centre line lies on it for T = cot(theta).
  for (const char* id : {"C03", "C04"})
    for (const test::CheckValue& row : test::check_values(id)) {
      CAPTURE(row.id);
      const double T = 1.0 / std::tan(radians(row.input("theta")));
      const CoilingLaw law = law_of(row.input("W"), 0.1, T, 1.0);
      CHECK(spiral_angle_deg(law, law.theta_lip) == Approx(row.value).margin(row.tolerance).epsilon(0));
    }
  // From W and T (C05, shell-geometry 4.1).
  for (const test::CheckValue& row : test::check_values("C05")) {
    CAPTURE(row.id);
    const CoilingLaw law = law_of(row.input("W"), 0.2, row.input("T"), 1.0);
    CHECK(spiral_angle_deg(law, 5.0) == Approx(row.value).margin(row.tolerance).epsilon(0));
  }
}

TEST_CASE("The centre line is as long as the closed form and Thompson's table say", "[growth][published]") {
  // Thompson 1917 pp. 551-552 (C07): arc from the pole over the radius. Two hundred whorls reach the pole well enough.
  for (const test::CheckValue& row : test::check_values("C07")) {
    CAPTURE(row.id);
    const double k = 1.0 / std::tan(radians(row.input("alpha")));
    const CoilingLaw law = law_of(W_of_angle(row.input("alpha")), 0.1, 0.0, 1.0);
    const double arc = chords(law, law.theta_lip - 12.0 / k, law.theta_lip);
    CHECK(arc / law.at(law.theta_lip).distance == Approx(row.value).margin(row.tolerance).epsilon(0));
  }
  // shell-geometry 4.2, table 4.7 (C21): the last whorls of six shells.
  for (const test::CheckValue& row : test::check_values("C21")) {
    CAPTURE(row.id);
    const CoilingLaw law = law_of(row);
    const double arc = chords(law, law.theta_lip - kTwoPi * row.input("whorls"), law.theta_lip);
    CHECK(arc == Approx(row.value).margin(row.tolerance).epsilon(0));
  }
}

TEST_CASE("The centre line bends and twists as a helicospiral does, right-handed", "[growth]") {
  // shell-geometry 4.3 (C25), by finite differences.
  const auto rows = test::check_values("C25");
  REQUIRE(rows.size() == 2);
  const CoilingLaw law = law_of(2.0, 0.3, 1.5, 1.0);
  const double at = law.theta_lip, h = 2e-3;
  const Station s = law.at(at);
  REQUIRE(s.distance == Approx(rows[0].input("r")));
  REQUIRE(s.depth == Approx(rows[0].input("z")));
  // Seven-point central differences of the sixth order.
  const auto p = [&](int i) { return centre(law, at + h * i); };
  const Vec3 first = ((p(3) - p(-3)) - (p(2) - p(-2)) * 9.0 + (p(1) - p(-1)) * 45.0) / (60.0 * h);
  const Vec3 second = ((p(3) + p(-3)) * 2.0 - (p(2) + p(-2)) * 27.0 + (p(1) + p(-1)) * 270.0 - p(0) * 490.0) / (180.0 * h * h);
  const Vec3 third = ((p(-3) - p(3)) + (p(2) - p(-2)) * 8.0 - (p(1) - p(-1)) * 13.0) / (8.0 * h * h * h);
  const Vec3 normal = first.cross(second);
  CHECK(normal.length() / std::pow(first.length(), 3) == Approx(rows[0].value).margin(rows[0].tolerance).epsilon(0));
  CHECK(normal.dot(third) / normal.length2() == Approx(rows[1].value).margin(rows[1].tolerance).epsilon(0));
}

TEST_CASE("Successive whorls touch at the D of the contact line", "[growth][published]") {
  // Circular sections at any T: shell-geometry 4.5 (C24); T = 0: Thompson 1917 p. 543 (C06), his lambda.
  for (const test::CheckValue& row : test::check_values("C24")) {
    CAPTURE(row.id);
    CHECK(contact_D(row.input("W"), row.input("T")) == Approx(row.value).margin(row.tolerance).epsilon(0));
  }
  for (const test::CheckValue& row : test::check_values("C06")) {
    CAPTURE(row.id);
    CHECK(contact_D(W_of_angle(row.input("alpha")), 0.0) == Approx(row.value).margin(row.tolerance).epsilon(0));
  }
}

TEST_CASE("A planispiral's conch ratios are those of the closed forms", "[growth]") {
  // shell-geometry 1.4 (C16): aperture height, whorl height, umbilical width over the diameter across the aperture.
  const auto ratios = [](double W, double D) {
    const CoilingLaw law = law_of(W, D, 0.0, 1.0);
    const double lip = law.theta_lip;
    const auto inner_margin = [&](double theta) { return law.at(theta).distance - law.at(theta).half_breadth; };
    const double diameter = outer_margin(law, lip) + outer_margin(law, lip - kPi);
    return std::array<double, 3>{(outer_margin(law, lip) - outer_margin(law, lip - kTwoPi)) / diameter,
                                 2.0 * law.at(lip).half_breadth / diameter,
                                 (inner_margin(lip) + inner_margin(lip - kPi)) / diameter};
  };
  const auto rows = test::check_values("C16");
  REQUIRE(rows.size() == 9);
  for (std::size_t i = 0; i < rows.size(); ++i) {
    CAPTURE(rows[i].id);
    CHECK(ratios(rows[i].input("W"), rows[i].input("D"))[i % 3] ==
          Approx(rows[i].value).margin(rows[i].tolerance).epsilon(0));
  }
  // The common ammonite's ratio of 0.3 (Parent, Greco & Bejas 2010, Acta Palaeontologica Polonica 55(1)) gives its W (C17).
  const auto common = test::check_values("C17").front();
  CHECK(ratios(common.value, 0.3)[0] == Approx(common.input("ah/dm")).margin(common.tolerance).epsilon(0));
}

TEST_CASE("Section coordinates and the half-plane are turned into one another, rolled too", "[growth]") {
  std::mt19937 engine(21);
  const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
  for (int i = 0; i < 2000; ++i) {
    test::ShellPlan plan;
    plan.W = {{0.0, draw(1.05, 5.0)}};
    plan.D = draw(-0.4, 0.9);
    plan.T = draw(0.0, 8.0);
    plan.S = draw(0.2, 5.0);
    plan.roll_deg = draw(-85.0, 85.0);
    const specimen::Specimen stated = test::specimen_of(plan);
    const CoilingLaw law = growth::coiling_law(stated.growth, stated.section);
    const double theta = draw(0.0, law.theta_lip);
    const Station s = law.at(theta);
    const growth::SectionPoint q{draw(-2.0, 2.0), draw(-2.0, 2.0)};
    const growth::HalfPlanePoint p = law.to_half_plane(s, q);
    const growth::SectionPoint back = law.to_section(s, p);
    CHECK(back.x == Approx(q.x).margin(1e-10));
    CHECK(back.y == Approx(q.y).margin(1e-10));
    // For a place at rest section coordinates drift as the section moves on.
    const double h = 1e-5;
    const growth::SectionPoint ahead = law.to_section(law.at(theta + h), p), behind = law.to_section(law.at(theta - h), p);
    const growth::SectionPoint drift = law.drift(theta, s, q);
    const double scale = 1.0 + (s.distance + s.depth) / (s.half_breadth * std::min(1.0, law.S));
    CHECK((ahead.x - behind.x) / (2.0 * h) == Approx(drift.x).margin(1e-8 * scale));
    CHECK((ahead.y - behind.y) / (2.0 * h) == Approx(drift.y).margin(1e-8 * scale));
  }
}

TEST_CASE("Section angle 0 points away from the axis, 90 to the apex, and roll leans the upper end outwards", "[growth]") {
  // scene-file contract: directions round a whorl section. Growth is towards +z, so the apex lies at smaller z.
  CoilingLaw law = law_of(2.0, 0.3, 1.5, 1.0);
  const Station s = law.at(law.theta_lip);
  CHECK(law.to_half_plane(s, {1.0, 0.0}).rho > s.distance);
  CHECK(law.to_half_plane(s, {0.0, 1.0}).z < s.depth);
  law.roll_cos = std::cos(radians(20.0));
  law.roll_sin = std::sin(radians(20.0));
  const growth::HalfPlanePoint up = law.to_half_plane(s, {0.0, 1.0});
  CHECK(up.rho - s.distance == Approx(law.S * s.half_breadth * std::sin(radians(20.0))));
  CHECK(s.depth - up.z == Approx(law.S * s.half_breadth * std::cos(radians(20.0))));
}
