// SPDX-License-Identifier: Apache-2.0
// Hits, crossings and surfaces against marching that knows nothing but the state of places.
#include "support/catch.h"

#include "math/parallel.h"
#include "support/shell_rays.h"
#include "trace/embree_solid.h"

using namespace whorl;
using field::State;
using trace::Hit;
using trace::Ray;

namespace {

constexpr double kTolerance = 2e-6;  // of the height: greatest distance of the cells' surface from the true one

// A grazing ray: the surface's error moves the hit by more than twenty times as much, or the solid behind it is so short
// that the error closes it.
constexpr double kGrazingCos = 0.05, kGrazingStretch = 1e-4;

std::vector<test::ShellPlan> shapes() { return {test::tall_plan(), test::globose_plan(), test::planispiral_plan()}; }

double reach_of(const test::Shell& shell) { return 2.5 * (shell.scene.bounds.max - shell.scene.bounds.min).length(); }

struct Verdict {
  int agree = 0, both_miss = 0, grazing = 0, wrong = 0;
  double worst_t = 0.0;
  std::string first_wrong;
};

// First solid of a ray by walking, walked again in the smallest steps where the solid says that it comes earlier.
Verdict judge(const test::Shell& shell, const trace::EmbreeSolid& solid, const std::vector<Ray>& rays, double step) {
  struct One {
    bool hit = false, walked = false;
    Hit at;
    double t = 0.0, stretch = 0.0;
  };
  std::vector<One> all(rays.size());
  const double h = shell.height(), far = reach_of(shell);
  parallel_for(rays.size(), 8, [&](std::size_t i) {
    One& one = all[i];
    one.hit = solid.closest(rays[i], one.at);
    test::Walk walked = test::walk(shell, rays[i], far, step * h, true);
    if (one.hit && (walked.changes.empty() || walked.changes.back().t > static_cast<double>(one.at.t) + 1e-5 * h)) {
      Ray near = rays[i];
      near.t_min = std::max(near.t_min, one.at.t - static_cast<float>(2e-4 * h));
      walked = test::walk(shell, near, static_cast<double>(one.at.t) + 2e-3 * h, 2e-6 * h, true);
    }
    one.walked = walked.start == State::kSolid || (!walked.changes.empty() && walked.changes.back().after == State::kSolid);
    if (!one.walked) return;
    one.t = walked.changes.empty() ? static_cast<double>(rays[i].t_min) : walked.changes.back().t;
    Ray on = rays[i];
    on.t_min = static_cast<float>(one.t + 1e-6 * h);
    const test::Walk through = test::walk(shell, on, one.t + 1.5 * kGrazingStretch * h, 0.1 * kGrazingStretch * h, false);
    one.stretch = through.start != State::kSolid ? 0.0 : through.changes.empty() ? 1.0 : (through.changes[0].t - one.t) / h;
  });
  Verdict verdict;
  for (std::size_t i = 0; i < rays.size(); ++i) {
    const One& one = all[i];
    const double apart = std::abs(one.t - static_cast<double>(one.at.t)) / h;
    if (!one.hit && !one.walked) {
      ++verdict.both_miss;
      continue;
    }
    const bool agrees = one.hit && one.walked && apart < 1e-5;
    const Vec3 normal = one.hit ? Vec3(one.at.normal) : Vec3(rays[i].direction);
    if (agrees) {
      ++verdict.agree;
      verdict.worst_t = std::max(verdict.worst_t, apart);
    } else if ((one.walked && one.stretch < kGrazingStretch) ||
               std::abs(normal.dot(Vec3(rays[i].direction))) < (one.hit && one.walked ? 0.2 : kGrazingCos)) {
      ++verdict.grazing;  // a hit of both may be 1e-5 off where the cosine is under 2e-6 / 1e-5
    } else {
      ++verdict.wrong;
      if (verdict.first_wrong.empty())
        verdict.first_wrong = "ray " + std::to_string(i) + " cells " + (one.hit ? std::to_string(one.at.t) : "miss") + " walked " +
                              (one.walked ? std::to_string(one.t) : "miss");
    }
  }
  return verdict;
}

}  // namespace

TEST_CASE("The closest hit is where walking from place to place first meets solid", "[trace]") {
  for (const test::ShellPlan& plan : shapes()) {
    const test::Shell shell(plan);
    const trace::EmbreeSolid solid(shell.field, {kTolerance * shell.height(), false});
    const Verdict verdict = judge(shell, solid, test::random_rays(shell, 2000, 61), 1e-3);
    CAPTURE(plan.name, verdict.first_wrong, verdict.worst_t);
    CHECK(verdict.wrong == 0);
    CHECK(verdict.agree > 700);
    CHECK(verdict.both_miss > 100);
    CHECK(verdict.grazing < 20);
  }
}

TEST_CASE("Rays along axes, signed zeros, cell faces and edges hit what walking meets", "[trace]") {
  for (const test::ShellPlan& plan : shapes()) {
    const test::Shell shell(plan);
    const trace::EmbreeSolid solid(shell.field, {kTolerance * shell.height(), false});
    const trace::CellSet& set = solid.cells();
    const Vec3 size = shell.scene.bounds.max - shell.scene.bounds.min;
    std::vector<Ray> rays;
    for (int i = 0; i < 1200; ++i) {
      const trace::Cell& cell = set.cell((static_cast<std::size_t>(i) * 7919u) % set.size());
      const int axis = i % 3, u = (axis + 1) % 3, v = (axis + 2) % 3;
      Ray ray;
      const float sign = i % 2 == 0 ? 1.0f : -1.0f;
      ray.direction[axis] = sign;
      ray.direction[u] = i % 4 < 2 ? 0.0f : -0.0f;
      ray.direction[v] = i % 8 < 4 ? 0.0f : -0.0f;
      // In a face, in an edge, and a rounding off either.
      ray.origin[u] = cell.centre[u] + cell.half;
      ray.origin[v] = i % 5 < 2 ? cell.centre[v] - cell.half : cell.centre[v] + 0.37f * cell.half;
      if (i % 7 == 0) ray.origin[u] = std::nextafter(ray.origin[u], 1e9f);
      if (i % 11 == 0) ray.direction[u] = 3e-7f;  // all but along the face
      ray.origin[axis] = static_cast<float>(sign > 0.0f ? shell.scene.bounds.min[axis] - 0.1 * size[axis]
                                                       : shell.scene.bounds.max[axis] + 0.1 * size[axis]);
      rays.push_back(ray);
    }
    const Verdict verdict = judge(shell, solid, rays, 1e-3);
    CAPTURE(plan.name, verdict.first_wrong, verdict.worst_t);
    CHECK(verdict.wrong == 0);
    CHECK(verdict.agree > 1000);
    CHECK(verdict.grazing < 20);
  }
}

TEST_CASE("Between crossings the state is that of the places in between", "[trace]") {
  for (const test::ShellPlan& plan : shapes()) {
    const test::Shell shell(plan);
    trace::EmbreeSolid solid(shell.field, {kTolerance * shell.height(), false});
    const double h = shell.height(), far = reach_of(shell);
    const std::vector<Ray> rays = test::random_rays(shell, 6000, 62);
    for (const bool exact : {false, true}) {
      solid.set_exact(exact);
      int stretches = 0, wrong = 0, broken = 0, many = 0, unwalked = 0;
      std::vector<trace::Crossing> crossings;
      const std::size_t count = exact ? 1500 : rays.size();
      for (std::size_t i = 0; i < count; ++i) {
        const State start = shell.at(Vec3(rays[i].origin));
        solid.crossings(rays[i], start, crossings);
        many += crossings.size() > 8;
        double from = 0.0;
        State state = start;
        for (std::size_t k = 0; k <= crossings.size(); ++k) {
          const double to = k < crossings.size() ? static_cast<double>(crossings[k].t) : far;
          if (to - from > kGrazingStretch * h) {
            ++stretches;
            for (const double part : {0.04, 0.5, 0.96})
              if (shell.at(test::place_on(rays[i], from + part * (to - from))) != state) {
                ++wrong;
                break;
              }
          }
          if (k == crossings.size()) break;
          broken += crossings[k].before != state || crossings[k].after == state || to < from;
          from = to;
          state = crossings[k].after;
        }
        unwalked += state != State::kOutside;  // every ray ends in the open
      }
      CAPTURE(plan.name, exact);
      CHECK(wrong == 0);
      CHECK(broken == 0);
      CHECK(unwalked == 0);
      CHECK(stretches > 3 * static_cast<int>(count));
      CHECK(many > 10);
    }
  }
}

TEST_CASE("Hits lie on the true surface to the tolerance, their normals point into the air", "[trace]") {
  for (const double tolerance : {2e-6, 5e-5}) {
    const test::Shell shell(test::tall_plan());
    const double h = shell.height();
    const trace::EmbreeSolid solid(shell.field, {tolerance * h, false});
    int hits = 0, off = 0, normals_off = 0, occluded_differs = 0;
    for (const Ray& ray : test::random_rays(shell, 20000, 63)) {
      Hit hit;
      const bool found = solid.closest(ray, hit);
      occluded_differs += solid.occluded(ray) != found;
      if (!found) continue;
      ++hits;
      // Along the normal the change from air to solid lies within twice the tolerance: once for the cells, once for the
      // curvature between ray and normal; the rounding of a place is added.
      const Vec3 p(hit.position), n(hit.normal);
      const double band = 2.0 * tolerance * h + 2e-7 * h;
      off += shell.at(p + band * n) == State::kSolid || shell.at(p - band * n) != State::kSolid;
      normals_off += std::abs(n.length() - 1.0) > 1e-5 || n.dot(Vec3(ray.direction)) > 0.05;
      const double turn = static_cast<double>(solid.growth_place(hit).turn);
      CHECK((turn > 0.0 && turn < shell.plan.whorls + 0.6));
      CHECK(hit.safe_offset >= static_cast<float>(2.0 * tolerance * h));
    }
    CAPTURE(tolerance, hits, off, normals_off);
    CHECK(hits > 5000);
    CHECK(off <= hits / 500);  // at edges, where whorls meet, no distance along one normal is meant
    CHECK(normals_off == 0);
    CHECK(occluded_differs == 0);
  }
}

TEST_CASE("A ray's limits are kept, and a ray that starts in solid has hit at its start", "[trace]") {
  const test::Shell shell(test::globose_plan());
  const double h = shell.height();
  const trace::EmbreeSolid solid(shell.field, {kTolerance * h, false});
  int limited = 0, started = 0;
  for (const Ray& ray : test::random_rays(shell, 4000, 64)) {
    Hit hit;
    if (!solid.closest(ray, hit)) continue;
    Ray shorter = ray, longer = ray, later = ray;
    shorter.t_max = hit.t - static_cast<float>(1e-5 * h);
    longer.t_max = hit.t + static_cast<float>(1e-5 * h);
    Hit untouched;
    untouched.t = -7.0f;
    CHECK_FALSE(solid.closest(shorter, untouched));
    CHECK(untouched.t == -7.0f);
    CHECK_FALSE(solid.occluded(shorter));
    CHECK(solid.closest(longer, untouched));
    CHECK(solid.occluded(longer));
    ++limited;
    // A twentieth of a wall deep: solid at the very start.
    later.t_min = hit.t + static_cast<float>(2e-5 * h / std::max(0.2, std::abs(static_cast<double>(hit.normal.dot(ray.direction)))));
    if (shell.at(test::place_on(later, static_cast<double>(later.t_min))) != State::kSolid) continue;
    Hit again;
    if (solid.closest(later, again) && again.t == later.t_min) ++started;
  }
  CHECK(limited > 1000);
  CHECK(started > 900);
}
