// SPDX-License-Identifier: Apache-2.0
// Lobes and the outer surface's normal.
#include "growth/outline.h"

#include "support/catch.h"
#include "support/shell_specimen.h"

using namespace whorl;

namespace {

specimen::Lobe lobe(double at, double reach, double width) {
  specimen::Lobe l;
  l.at_deg.value = at;
  l.reach.value = reach;
  l.width_deg.value = width;
  return l;
}

}  // namespace

TEST_CASE("A lobe stands at its reach where it is stated and at half of it half its width away", "[growth]") {
  // scene-file contract: reach is a fraction of the local radius, width is at half reach. The outline is a spline through
  // samples at most 0.24 half-widths apart; its error is h^4/384 of the fourth derivative, 12 (ln 2)^2 for the bell.
  for (const double at : {-170.0, -20.0, 0.0, 63.0, 180.0})
    for (const double reach : {-0.4, 0.1, 1.5})
      for (const double width : {6.0, 20.0, 60.0, 170.0}) {
        CAPTURE(at, reach, width);
        const PeriodicSpline outline = growth::outer_reach({lobe(at, reach, width)});
        const double margin = std::pow(0.24, 4) / 384.0 * 12.0 * std::pow(std::log(2.0), 2) * std::abs(reach);
        CHECK(outline.value(radians(at)) == Approx(1.0 + reach).margin(margin).epsilon(0));
        for (const double side : {-0.5, 0.5})
          CHECK(outline.value(radians(at + side * width)) == Approx(1.0 + 0.5 * reach).margin(margin).epsilon(0));
        // The bell falls off on both sides of its place.
        CHECK(std::abs(outline.value(radians(at + 0.25 * width)) - 1.0) > 0.5 * std::abs(reach));
        CHECK(std::abs(outline.value(radians(at + width)) - 1.0) < 0.5 * std::abs(reach));
      }
}

TEST_CASE("Lobes add up, and a section without any is the plain ellipse", "[growth]") {
  const PeriodicSpline both = growth::outer_reach({lobe(50.0, 0.3, 40.0), lobe(-80.0, -0.2, 70.0)});
  const PeriodicSpline one = growth::outer_reach({lobe(50.0, 0.3, 40.0)}), other = growth::outer_reach({lobe(-80.0, -0.2, 70.0)});
  for (double psi = -4.0; psi < 4.0; psi += 0.0713)
    CHECK(both.value(psi) - 1.0 == Approx(one.value(psi) + other.value(psi) - 2.0).margin(3e-5));
  CHECK(growth::outer_reach({}).is_constant());
  CHECK(growth::outer_reach({}).value(1.0) == 1.0);
}

TEST_CASE("The surface normal is across both tangents of the tube, outwards, and its gradient is that of |q| / reach",
          "[growth]") {
  test::ShellPlan steep;
  steep.T = 6.0;
  steep.W = {{0.0, 1.4}};
  steep.S = 2.0;
  steep.roll_deg = -25.0;
  steep.D = 0.25;
  for (const test::ShellPlan& plan : {test::globose_plan(), test::ornate_plan(), steep}) {
    const specimen::Specimen stated = test::specimen_of(plan);
    const growth::CoilingLaw law = growth::coiling_law(stated.growth, stated.section);
    const PeriodicSpline reach = growth::outer_reach(stated.section.lobes);
    const auto surface = [&](double theta, double psi) { return test::in_tube(law, theta, psi, reach.value(psi)); };
    const auto t_at = [&](const Vec3& p, double theta) {
      const double growth_angle = theta + std::remainder(std::atan2(p.y, p.x) - theta, kTwoPi);
      const growth::SectionPoint q = law.to_section(law.at(growth_angle), {std::hypot(p.x, p.y), p.z});
      return std::hypot(q.x, q.y) / reach.value(std::atan2(q.y, q.x));
    };
    for (const double theta : {9.0, 20.3})
      for (double psi = -3.1; psi < 3.2; psi += 0.31) {
        CAPTURE(plan.name, theta, psi);
        const Vec3 p = surface(theta, psi);
        const double size = law.at(theta).half_breadth, h = 1e-5;
        if (std::hypot(p.x, p.y) < 0.06 * size) continue;  // nearer to the axis the normal is tempered on purpose
        const growth::SurfaceNormal n = growth::surface_normal(law, theta, reach, psi);
        const Vec3 normal(n.rho * std::cos(theta) - n.along * std::sin(theta),
                          n.rho * std::sin(theta) + n.along * std::cos(theta), n.z);
        CHECK(normal.length() == Approx(1.0));
        const Vec3 along = (surface(theta + h, psi) - surface(theta - h, psi)).normalized();
        const Vec3 around = (surface(theta, psi + h) - surface(theta, psi - h)).normalized();
        CHECK(normal.dot(along) == Approx(0.0).margin(1e-8));
        CHECK(normal.dot(around) == Approx(0.0).margin(1e-8));
        const double step = 1e-5 * size;
        const double slope = (t_at(p + step * normal, theta) - t_at(p - step * normal, theta)) / (2.0 * step);
        CHECK(slope == Approx(n.gradient).epsilon(1e-5));
        CHECK(slope > 0.0);
      }
  }
}

TEST_CASE("The growth front leads towards the apex in a leaning aperture, by its inclination, and never by more than a quarter turn",
          "[growth]") {
  // scene-file contract: degrees between aperture plane and axis, + prosocline (the apical end is ahead).
  for (const double inclination : {-45.0, -10.0, 20.0, 45.0}) {
    const double tan_inclination = std::tan(radians(inclination));
    for (const double rho : {0.5, 2.0, 30.0}) {
      const double rise = 1e-4 * rho;
      // Near the section's centre the front's arc ahead over its rise along the axis is the tangent of the inclination.
      const double lead = growth::front_lead(tan_inclination, 7.0, {rho, 7.0 - rise});
      CHECK(lead * rho / rise == Approx(tan_inclination).epsilon(1e-6));
    }
    CHECK(growth::front_lead(tan_inclination, 7.0, {1.0, 7.0}) == 0.0);
    for (const double z : {-1e6, 6.9, 7.1, 1e6})
      for (const double rho : {-1.0, 0.0, 1e-9, 1.0})
        CHECK(std::abs(growth::front_lead(tan_inclination, 7.0, {rho, z})) <= 0.5 * kPi);
  }
}
