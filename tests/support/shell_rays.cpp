// SPDX-License-Identifier: Apache-2.0
// Random rays; marching that knows only the state of places.
#include "support/shell_rays.h"

#include <random>

namespace whorl::test {

std::vector<trace::Ray> random_rays(const Shell& shell, std::size_t count, unsigned seed) {
  std::mt19937 engine(seed);
  std::normal_distribution<double> normal;
  std::uniform_real_distribution<double> draw(0.0, 1.0);
  const Box3& box = shell.scene.bounds;
  const Vec3 size = box.max - box.min;
  const auto somewhere = [&] { return box.min + Vec3(draw(engine) * size.x, draw(engine) * size.y, draw(engine) * size.z); };
  std::vector<trace::Ray> rays;
  while (rays.size() < count) {
    const Vec3 d = Vec3(normal(engine), normal(engine), normal(engine)).normalized();
    Vec3 start = somewhere();
    if (rays.size() % 2 == 0)
      start -= size.length() * d;  // from afar towards a place of the shell
    else if (shell.at(start) == field::State::kSolid)
      continue;  // rays start in air
    rays.push_back({Vec3f(start), Vec3f(d)});
  }
  return rays;
}

Walk walk(const Shell& shell, const trace::Ray& ray, double t_end, double step, bool to_first_solid) {
  Walk result;
  const Box3& box = shell.scene.bounds;
  double t = static_cast<double>(ray.t_min);
  field::State now = result.start = shell.at(place_on(ray, t));
  while (t < t_end) {
    const double next = std::min(t_end, t + step);
    const Vec3 p = place_on(ray, next);
    field::State then = box.intersects(p) ? shell.at(p) : field::State::kOutside;
    if (then != now) {
      double lo = t, hi = next;
      while (hi - lo > 1e-9 * step) {
        const double mid = 0.5 * (lo + hi);
        const field::State m = shell.at(place_on(ray, mid));
        if (m == now) {
          lo = mid;
        } else {
          hi = mid;
          then = m;
        }
      }
      result.changes.push_back({hi, then});
      if (to_first_solid && then == field::State::kSolid) return result;
      t = hi;
      now = then;
      continue;
    }
    t = next;
  }
  return result;
}

}  // namespace whorl::test
