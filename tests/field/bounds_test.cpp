// SPDX-License-Identifier: Apache-2.0
// Bounds over boxes hold what is found inside, of every function, wherever the box lies.
#include "field/field.h"

#include "support/catch.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using field::Part;
using field::Term;

namespace {

constexpr Part kParts[] = {Part::kChamber, Part::kChamberHollow, Part::kChamberOpening,
                           Part::kPillar,  Part::kWhorl,         Part::kWhorlHollow};

struct Tally {
  int boxes = 0, outside = 0, steeper = 0;
  double worst = 0.0;
};

class BoxTrial {
 public:
  explicit BoxTrial(const test::Shell& shell, unsigned seed) : shell_(shell), engine_(seed) {}

  double draw(double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine_); }

  // A box of random size: anywhere, round the axis, on the tube, at the lip, at the embryonic shell.
  Box3 box(int kind, double& theta) {
    const scene::Scene& scene = shell_.scene;
    const Vec3 size = scene.bounds.max - scene.bounds.min;
    Vec3 centre;
    double half = size.length() * std::exp(draw(std::log(1e-4), std::log(0.2)));
    theta = draw(scene.theta_begin - 0.5, scene.theta_end + 0.3);
    if (kind == 0) {
      for (int k = 0; k < 3; ++k) centre[k] = draw(scene.bounds.min[k], scene.bounds.max[k]);
    } else if (kind == 1) {
      centre = {0.02 * size.x * draw(-1.0, 1.0), 0.02 * size.y * draw(-1.0, 1.0), draw(scene.bounds.min.z, scene.bounds.max.z)};
    } else {
      if (kind == 3) theta = draw(scene.law.theta_lip - 1.0, scene.theta_end);
      if (kind == 4) {
        theta = draw(scene.theta_begin - 0.3, scene.law.theta_start + 2.5);
        half *= 0.1;
      }
      centre = test::in_tube(scene.law, theta, draw(-kPi, kPi), draw(0.5, 1.3));
    }
    theta += std::remainder(std::atan2(centre.y, centre.x) - theta, kTwoPi);  // the passage at the box's middle
    return {centre - Vec3(half), centre + Vec3(half)};
  }

  // A place in the box, every third on its surface.
  Vec3 place(const Box3& box, int i) {
    Vec3 p;
    for (int k = 0; k < 3; ++k) {
      const double u = i % 3 == 0 ? draw(0.0, 1.0) < 0.5 ? 0.0 : 1.0 : draw(0.0, 1.0);
      p[k] = box.min[k] + u * (box.max[k] - box.min[k]);
    }
    return p;
  }

  Tally run(int boxes) {
    Tally tally;
    const scene::Scene& scene = shell_.scene;
    const double slack = 1e-12 * (scene.bounds.max - scene.bounds.min).length();
    for (int b = 0; b < boxes; ++b) {
      double theta;
      const Box3 box = this->box(b % 5, theta);
      const bool axis = box.min.x <= 0.0 && box.max.x >= 0.0 && box.min.y <= 0.0 && box.max.y >= 0.0;
      for (const Part part : kParts) {
        if (part == Part::kPillar && !scene.pillar.present) continue;
        const bool tube = part == Part::kWhorl || part == Part::kWhorlHollow;
        const Term term{part, part == Part::kChamberOpening ? shell_.field.opening_theta() : tube ? theta : 0.0};
        const Interval range = shell_.field.bounds(term, box);
        const double steepest = shell_.field.steepness(term, box);
        ++tally.boxes;
        for (int i = 0; i < 12; ++i) {
          const Vec3 p = place(box, i);
          const double v = shell_.field.value(term, p), off = std::max(range.lo - v, v - range.hi);
          if (off > slack) ++tally.outside;
          tally.worst = std::max(tally.worst, off);
          if (!axis && scene.ellipsoids.empty() && smooth_at(term, p) && steepness_at(term, p, box) > 1.001 * steepest) ++tally.steeper;
        }
      }
    }
    return tally;
  }

 private:
  // Where the gradient is meant: off the section's centre line, where the section angle loses its meaning, and off the seams
  // of passages.
  bool smooth_at(const Term& term, const Vec3& p) const {
    if (term.part == Part::kChamber || term.part == Part::kChamberHollow || term.part == Part::kPillar) return true;
    double growth_angle, around;
    shell_.field.coordinates(p, term.theta, growth_angle, around);
    if (std::abs(growth_angle - term.theta) > 2.5) return false;
    const growth::SectionPoint q =
        shell_.scene.law.to_section(shell_.scene.law.at(growth_angle), {std::hypot(p.x, p.y), p.z});
    return std::hypot(q.x, q.y) > 0.05 && std::abs(growth_angle - shell_.scene.theta_end) > 1e-3 &&
           std::abs(growth_angle - (shell_.scene.law.theta_lip - 2.6)) > 1e-3;
  }
  double steepness_at(const Term& term, const Vec3& p, const Box3& box) const {
    const double h = 5e-6 * (box.max.x - box.min.x);
    Vec3 g;
    for (int k = 0; k < 3; ++k) {
      Vec3 a = p, b = p;
      a[k] -= h;
      b[k] += h;
      g[k] = (shell_.field.value(term, b) - shell_.field.value(term, a)) / (2.0 * h);
    }
    return g.length() - 1e-9 / h;  // what rounding may feign
  }

  const test::Shell& shell_;
  std::mt19937 engine_;
};

std::vector<test::ShellPlan> trial_plans() {
  std::vector<test::ShellPlan> plans{test::tall_plan(), test::globose_plan(), test::planispiral_plan(), test::ornate_plan()};
  test::ShellPlan crossing = test::self_similar_plan(), flat = test::self_similar_plan(), leaning = test::globose_plan(),
                  open = test::globose_plan(), stages = test::globose_plan(), keeled = test::globose_plan();
  crossing.D = -0.3;
  crossing.columella = 0.6;
  flat.S = 0.3;
  flat.wall_mm = 0.1;
  leaning.inclination_deg = -45.0;
  leaning.lip_mm = 1.5;
  leaning.D = 0.0;
  open.D = 0.6;
  open.T = 0.2;
  open.inclination_deg = 45.0;
  stages.W = {{1.0, 1.2}, {2.0, 4.0}, {2.5, 1.2}};
  stages.whorls = 4.0;
  keeled.lobes = {{90.0, 0.5, 20.0}, {0.0, -0.3, 30.0}};
  keeled.constant_wall = true;
  for (test::ShellPlan* plan : {&crossing, &flat, &leaning, &open, &stages, &keeled}) {
    plan->size_kind = specimen::SizeKind::kApertureHeight;  // quickly solved
    plan->size_mm = 9.0;
    plans.push_back(*plan);
  }
  return plans;
}

}  // namespace

TEST_CASE("Bounds over a box contain every value in it, and steepness every gradient off the axis", "[field]") {
  for (const test::ShellPlan& plan : trial_plans()) {
    CAPTURE(plan.name, plan.D, plan.S, plan.inclination_deg, plan.W.size());
    const test::Shell shell(plan);
    const Tally tally = BoxTrial(shell, 17).run(3000);
    CAPTURE(tally.worst);
    CHECK(tally.boxes > 10000);
    CHECK(tally.outside == 0);
    CHECK(tally.steeper == 0);
  }
}

TEST_CASE("Bounds and steepness hold with sculpture, raised and cut, regular and not", "[field][sculpture]") {
  const auto carve = [](scene::Scene& scene) {
    const double lip = scene.law.theta_lip, start = scene.law.theta_start;
    scene.sculpture.reliefs = {
        {0.06, 0.4, 0.2, 0.0, 0.0, 0.0, start, lip + kTwoPi, 0.0, 0},                      // a cord
        {-0.04, -0.9, 0.15, 0.0, 0.0, 0.0, start + 3.0, lip - 2.0, 0.0, 0},                // a groove that begins and ends
        {0.08, 0.5, 1.4, kTwoPi / 13.0, lip, 0.35 * kTwoPi / 13.0, start, lip + kTwoPi, 0.0, 0},
        {0.01, 0.0, 0.0, kTwoPi / 90.0, lip, 0.5 * kTwoPi / 90.0, start, lip + kTwoPi, 0.7, 5},
        {0.05, 0.4, 0.3, kTwoPi / 13.0, lip, 0.4 * kTwoPi / 13.0, start, lip + kTwoPi, 0.5, 6},
        {0.02, 1.5, 0.4, 0.0, 0.0, 0.0, lip - 2.2 * kTwoPi, lip + kTwoPi, 0.0, 0, 0.0},    // alike on every whorl
        {0.02, 2.6, 0.4, kTwoPi / 7.0, lip, 0.4 * kTwoPi / 7.0, lip - 2.2 * kTwoPi, lip + kTwoPi, 0.4, 7, 1.8}};
  };
  test::ShellPlan tall = test::tall_plan(), lobed = test::globose_plan();
  lobed.inclination_deg = 25.0;
  lobed.size_kind = specimen::SizeKind::kApertureHeight;
  lobed.size_mm = 9.0;
  lobed.lobes = {{80.0, 0.25, 40.0}};
  for (const test::ShellPlan& plan : {tall, lobed}) {
    CAPTURE(plan.name);
    const test::Shell shell(plan, carve);
    const Tally tally = BoxTrial(shell, 21).run(3000);
    CAPTURE(tally.worst);
    CHECK(tally.boxes > 10000);
    CHECK(tally.outside == 0);
    CHECK(tally.steeper == 0);
  }
}

TEST_CASE("Bounds contain every value with primitives in space, that add and that cut", "[field]") {
  const auto add = [](scene::Scene& scene) {
    for (int i = 0; i < 6; ++i) {
      const double theta = scene.law.theta_lip - 1.0 - 1.7 * i, size = scene.law.at(theta).half_breadth;
      scene::Ellipsoid e;
      e.centre = test::in_tube(scene.law, theta, 0.5 * i, 1.0);
      e.to_unit[0] = Vec3(1.0, 0.3, 0.0) / (0.5 * size);
      e.to_unit[1] = Vec3(-0.3, 1.0, 0.0) / (0.3 * size);
      e.to_unit[2] = Vec3(0.0, 0.0, 1.0) / (0.4 * size);
      e.weight = i % 2 == 0 ? 0.6 : -0.4;
      e.theta = theta;
      e.hollow = i == 4;
      scene.ellipsoids.push_back(e);
    }
  };
  const test::Shell shell(test::globose_plan(), add);
  const Tally tally = BoxTrial(shell, 18).run(3000);
  CAPTURE(tally.worst);
  CHECK(tally.outside == 0);
}

TEST_CASE("Bounds of a small box are narrow", "[field]") {
  // Bounds that are never too narrow would be met by -inf..inf; cells need better. Hulls of spline coefficients and of four
  // stations leave a width of their own.
  for (const test::ShellPlan& plan : {test::globose_plan(), test::ornate_plan()}) {
    const test::Shell shell(plan);
    CAPTURE(plan.name);
    BoxTrial trial(shell, 19);
    for (int i = 0; i < 400; ++i) {
      double theta;
      const Box3 box = trial.box(2, theta);
      if (theta > shell.scene.theta_end - 0.01) continue;
      const Vec3 c = 0.5 * (box.min + box.max), half(1e-6 * std::hypot(c.x, c.y));
      for (const Part part : {Part::kWhorl, Part::kWhorlHollow}) {
        const Interval range = shell.field.bounds({part, theta}, {c - half, c + half});
        CHECK(range.width() < 0.2 * shell.scene.law.at(theta).half_breadth);
      }
    }
  }
}
