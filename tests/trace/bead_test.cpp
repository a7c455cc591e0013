// SPDX-License-Identifier: Apache-2.0
// Rays through beads, against the equation of their surface.
#include "trace/bead.h"

#include "support/catch.h"

#include <random>

using namespace whorl;

TEST_CASE("A ray through a bead enters and leaves on its surface, and is inside between", "[attached]") {
  std::mt19937_64 engine(21);
  std::normal_distribution<double> normal;
  std::uniform_real_distribution<double> uniform(0.2, 2.0);
  int through_count = 0;
  for (int i = 0; i < 20000; ++i) {
    const Vec3 n = Vec3(normal(engine), normal(engine), normal(engine)).normalized();
    const Frame frame = frame_around(n);
    scene::Bead bead;
    bead.centre = {3.0f, -2.0f, 40.0f};
    const double a = uniform(engine), b = uniform(engine), up = uniform(engine), down = uniform(engine);
    bead.rows[0] = Vec3f(frame.x / a);
    bead.rows[1] = Vec3f(frame.y / b);
    bead.rows[2] = Vec3f(n / up);
    bead.below = static_cast<float>(up / down);
    trace::Ray ray;
    ray.origin = Vec3f(Vec3(bead.centre) + 60.0 * Vec3(normal(engine), normal(engine), normal(engine)).normalized());
    ray.direction = Vec3f((Vec3(bead.centre) + Vec3(normal(engine), normal(engine), normal(engine)) - Vec3(ray.origin)).normalized());
    const auto at = [&](double t) { return Vec3(ray.origin) + t * Vec3(ray.direction); };
    // x^2/a^2 + y^2/b^2 + z^2/c^2, c being the half-axis on that side of the equator.
    const auto equation = [&](const Vec3& p) {
      const Vec3 q = frame.to_frame(p - Vec3(bead.centre));
      const double c = q.z >= 0.0 ? up : down;
      return q.x * q.x / (a * a) + q.y * q.y / (b * b) + q.z * q.z / (c * c);
    };
    trace::Through through{};
    if (!trace::through_bead(bead, ray, through)) {
      for (double t = 50.0; t < 70.0; t += 0.05) CHECK(equation(at(t)) > 0.999);
      continue;
    }
    ++through_count;
    CHECK(equation(at(through.in)) == Approx(1.0).margin(2e-5));
    CHECK(equation(at(through.out)) == Approx(1.0).margin(2e-5));
    if (through.out - through.in > 1e-3) {
      CHECK(trace::holds(bead, at(0.5 * (through.in + through.out))));
      CHECK(trace::normal_of(bead, at(through.in)).dot(Vec3(ray.direction)) < 1e-3);
    }
    const Box3 box = scene::box_of(bead);
    const Vec3 p = at(through.in);
    for (int k = 0; k < 3; ++k) CHECK((p[k] >= box.min[k] - 1e-5 && p[k] <= box.max[k] + 1e-5));
  }
  CHECK(through_count > 4000);
}
