// SPDX-License-Identifier: Apache-2.0
// Earlier shell wins: what is at a place is decided by outlines and the order in which they were laid down.
#include "field/field.h"

#include "support/catch.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using field::Part;
using field::State;

namespace {

// Sides of a place against one passage of the tube, on the outlines of its nearest station.
struct Passage {
  bool in_outer, in_hollow, doubtful;
};

Passage passage(const scene::Scene& scene, double theta, growth::HalfPlanePoint p) {
  const auto i = static_cast<std::size_t>(std::lround((theta - scene.first_station_theta) / scene::kStationSpacing));
  const growth::SectionPoint q = scene.law.to_section(scene.law.at(theta), p);
  const double r = std::hypot(q.x, q.y), psi = std::atan2(q.y, q.x);
  const double outer = scene.outlines[scene.stations[i].outer].reach.value(psi);
  const double hollow = scene.outlines[scene.stations[i].hollow].reach.value(psi);
  return {r < outer, r < hollow, std::abs(r - outer) < 2e-3 || std::abs(r - hollow) < 2e-3};
}

}  // namespace

TEST_CASE("Walls of an earlier whorl are never cut by a later lumen, and later walls never fill an earlier one", "[field]") {
  test::ShellPlan open = test::globose_plan();
  open.D = 0.35;
  for (const test::ShellPlan& plan : {test::tall_plan(), test::globose_plan(), test::planispiral_plan(), open}) {
    const test::Shell shell(plan);
    const scene::Scene& scene = shell.scene;
    const growth::CoilingLaw& law = scene.law;
    CAPTURE(plan.name, plan.D);
    std::mt19937 engine(23);
    const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
    int walls = 0, lumens = 0, overlapped = 0, wrong = 0;
    for (int i = 0; i < 60000; ++i) {
      const double theta = draw(law.theta_start + kTwoPi, law.theta_lip - 2.7), psi = draw(-kPi, kPi), size = law.at(theta).half_breadth;
      const growth::HalfPlanePoint p = law.to_half_plane(law.at(theta), {draw(0.0, 1.0) * std::cos(psi), draw(0.0, 1.0) * std::sin(psi)});
      if (p.rho <= 0.0) continue;
      // Away from the pillar and its fillet.
      const Vec3 at = test::in_space(theta, p);
      if (scene.pillar.present && p.rho < 0.6 * size) continue;
      const Passage own = passage(scene, theta, p);
      bool doubtful = own.doubtful || !own.in_outer, earlier = false;
      for (double t = theta - kTwoPi; t > law.theta_start - 0.5; t -= kTwoPi) {
        const Passage before = passage(scene, t, p);
        doubtful = doubtful || before.doubtful || t < law.theta_start + kPi;
        earlier = earlier || before.in_outer;
      }
      if (doubtful) continue;
      bool later = false;
      for (double t = theta + kTwoPi; t < law.theta_lip; t += kTwoPi) later = later || passage(scene, t, p).in_outer;
      if (earlier) continue;  // another whorl's to decide
      overlapped += later;
      if (own.in_hollow) {
        ++lumens;
        wrong += shell.at(at) != State::kLumen;
      } else {
        ++walls;
        wrong += shell.at(at) != State::kSolid;
      }
      wrong += shell.field.place_at(at).owner.part != Part::kWhorl || std::abs(shell.field.place_at(at).owner.theta - theta) > 1e-9;
    }
    CHECK(wrong == 0);
    CHECK(walls > 250);
    CHECK(lumens > 5000);
    if (plan.D < 0.3) CHECK(overlapped > 500);
  }
}

TEST_CASE("Every function is continuous across the azimuth of half a turn", "[field]") {
  for (const test::ShellPlan& plan : {test::tall_plan(), test::globose_plan(), test::planispiral_plan(), test::ornate_plan()}) {
    const test::Shell shell(plan);
    const scene::Scene& scene = shell.scene;
    CAPTURE(plan.name);
    std::mt19937 engine(24);
    const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
    int compared = 0, states_differ = 0;
    double worst = 0.0;
    for (int i = 0; i < 20000; ++i) {
      const Vec3 p(-draw(0.02, 1.0) * scene.bounds.max.x, 0.0, draw(scene.bounds.min.z, scene.bounds.max.z));
      const Vec3 above = p + Vec3(0.0, 1e-9, 0.0), below = p - Vec3(0.0, 1e-9, 0.0);
      double least = 1e300;
      for (double theta = kPi; theta < scene.theta_end + kPi; theta += kTwoPi) {
        double outer[2], hollow[2];
        shell.field.whorl(above, theta, outer[0], hollow[0]);
        shell.field.whorl(below, theta, outer[1], hollow[1]);
        worst = std::max({worst, std::abs(outer[0] - outer[1]), std::abs(hollow[0] - hollow[1])});
        least = std::min({least, std::abs(outer[0]), std::abs(hollow[0])});
        ++compared;
      }
      if (least > 1e-6 && shell.at(above) != shell.at(below)) ++states_differ;
      if (shell.at(p) != shell.at(above) && shell.at(p) != shell.at(below)) ++states_differ;
    }
    CHECK(compared > 60000);
    CHECK(worst < 1e-6);
    CHECK(states_differ == 0);
  }
}

TEST_CASE("The apex is closed: from above the axis every line meets solid before lumen", "[field]") {
  for (const double D : {-0.3, -0.1, 0.0, 0.1, 0.3, 0.6})
    for (const double S : {0.6, 1.0, 1.8})
      for (const double T : {0.5, 2.5}) {
        test::ShellPlan plan = test::self_similar_plan();
        plan.D = D;
        plan.S = S;
        plan.T = T;
        plan.roll_deg = 0.0;
        plan.columella = D < 0.0 ? 0.3 : 0.0;
        plan.whorls = 4.0;
        plan.size_kind = specimen::SizeKind::kApertureHeight;
        plan.size_mm = 10.0;
        plan.wall_mm = 0.3;
        const test::Shell shell(plan);
        CAPTURE(D, S, T);
        const scene::Chamber& chamber = shell.scene.chamber;
        int open_lines = 0, thin = 0;
        for (int i = 0; i < 60; ++i) {
          const double a = 2.4 * i, r = 0.6 * chamber.radius * std::sqrt(i / 60.0);
          const double step = 0.005 * chamber.half_height;
          const double z_end = chamber.centre_z + 2.0 * chamber.half_height;
          Vec3 p(r * std::cos(a), r * std::sin(a), shell.scene.bounds.min.z);
          while (p.z < z_end && shell.at(p) == State::kOutside) p.z += step;
          if (shell.at(p) != State::kSolid) ++open_lines;
          // Between the cap's two ellipsoids a line along the axis, r from it, goes through sqrt(1 - (r / radius)^2) of the
          // tube's wall there or more.
          const double in = p.z;
          while (p.z < z_end && shell.at(p) == State::kSolid) p.z += step;
          const double wall = plan.wall_mm * shell.scene.law.at(shell.scene.law.theta_start).half_breadth / shell.scene.law.half_breadth;
          if (p.z - in < 0.99 * std::sqrt(1.0 - std::pow(r / chamber.radius, 2)) * wall - 2.0 * step) ++thin;
        }
        CHECK(open_lines == 0);
        CHECK(thin == 0);
      }
}

TEST_CASE("Along the columella there is no shell but the tube's, its fillet and the pillar", "[field]") {
  // Flat sections made the flare spread over the whole pillar once: a sleeve a quarter of a half-breadth thick.
  for (const double S : {0.3, 1.0, 2.0})
    for (const double D : {-0.2, 0.05}) {
      test::ShellPlan plan = test::self_similar_plan();
      plan.S = S;
      plan.D = D;
      plan.roll_deg = 0.0;
      plan.columella = 0.2;
      plan.wall_mm = 0.1;
      plan.size_kind = specimen::SizeKind::kApertureHeight;
      plan.size_mm = 8.0;
      const test::Shell shell(plan);
      const scene::Scene& scene = shell.scene;
      CAPTURE(S, D);
      std::mt19937 engine(25);
      const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
      int met = 0, astray = 0;
      for (int i = 0; i < 20000; ++i) {
        const double z = draw(scene.pillar.top_z, scene.pillar.bottom_z), azimuth = draw(-kPi, kPi);
        const double rho = 0.2 * scene.law.half_breadth * z / scene.law.depth * draw(0.9, 1.8);
        const Vec3 p = test::in_space(azimuth, {rho, z});
        const field::Place place = shell.field.place_at(p);
        if (place.state == State::kOutside || place.owner.part != Part::kWhorl) continue;
        ++met;
        const growth::SectionPoint q = scene.law.to_section(scene.law.at(place.owner.theta), {rho, z});
        // A quarter of the local unit of length past the outline is where the fillet ends: (t^2 - 1) / 2 = 1/4.
        if (std::hypot(q.x, q.y) > std::sqrt(1.5) + 1e-9) ++astray;
      }
      CHECK(met > 1000);
      CHECK(astray == 0);
    }
}

TEST_CASE("Past the mouth there is only air and earlier shell", "[field]") {
  for (const double inclination : {-30.0, 0.0, 30.0}) {
    test::ShellPlan plan = test::globose_plan();
    plan.inclination_deg = inclination;
    plan.size_kind = specimen::SizeKind::kApertureHeight;
    plan.size_mm = 10.0;
    const test::Shell shell(plan);
    const scene::Scene& scene = shell.scene;
    CAPTURE(inclination);
    std::mt19937 engine(26);
    const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
    int past = 0, stray = 0, behind = 0, missing = 0;
    for (int i = 0; i < 30000; ++i) {
      const double theta = draw(scene.law.theta_lip - 1.5, scene.law.theta_lip + 2.5), psi = draw(-kPi, kPi);
      const double r = draw(0.0, 1.2);
      const growth::HalfPlanePoint at = scene.law.to_half_plane(scene.law.at(theta), {r * std::cos(psi), r * std::sin(psi)});
      if (at.rho < 0.05) continue;
      const Vec3 p = test::in_space(theta, at);
      // The front's plane leans about the section's centre: across growth by the arc, along the axis by the depth.
      const double front = scene.law.theta_lip + std::atan2(std::tan(radians(inclination)) * (scene.law.depth - at.z), at.rho);
      const double beyond = (theta - front) * at.rho * std::cos(radians(inclination));  // mm past the front
      const field::Place place = shell.field.place_at(p);
      const bool own = place.state != State::kOutside && place.owner.part == Part::kWhorl && std::abs(place.owner.theta - theta) < 1e-6;
      if (beyond > scene.front.rim_radius + 1e-9) {
        ++past;
        stray += own;
      } else if (beyond < -2.0 * scene.front.rim_radius && place.state != State::kOutside && r < 0.95) {
        ++behind;
        missing += !own && std::abs(place.owner.theta - theta) < 1.0;
      } else if (beyond < -2.0 * scene.front.rim_radius && r < 0.95) {
        ++missing;
      }
    }
    CHECK(past > 5000);
    CHECK(stray == 0);
    CHECK(behind > 2000);
    CHECK(missing == 0);
  }
}
