// SPDX-License-Identifier: Apache-2.0
// Rounds of rays in blocks, and bisection on the field.
#include "race.h"

#include "math/parallel.h"
#include "stopwatch.h"

#include <algorithm>
#include <atomic>
#include <cmath>

namespace whorl::bench {
namespace {

constexpr std::size_t kBlock = 4096;  // rays: neighbours stay together, as a renderer's do

const std::vector<trace::Ray>& rays_of(const RaySets& sets, int kind) {
  return kind == 0 ? sets.camera : kind == 1 ? sets.scattered : sets.shadow;
}

struct Timed {
  double rays_per_second, rays_per_wall_second, hit_share;
};

Timed run(const Contender& contender, const std::vector<trace::Ray>& rays, bool any_hit) {
  const std::size_t blocks = (rays.size() / kBlock) / contender.every;
  std::atomic<std::size_t> hits{0};
  const Stopwatch watch;
  parallel_for(blocks, 1, [&](std::size_t block) {
    const trace::Ray* first = rays.data() + block * contender.every * kBlock;
    std::size_t count = 0;
    for (std::size_t i = 0; i < kBlock; ++i) {
      Found found;
      count += any_hit ? contender.occluded(first[i]) : contender.closest(first[i], found);
    }
    hits += count;
  });
  const double traced = static_cast<double>(blocks * kBlock);
  return {traced / watch.processor_seconds() * thread_count(), traced / watch.seconds(), static_cast<double>(hits) / traced};
}

double quantile(std::vector<double>& values, double part) {
  if (values.empty()) return 0.0;
  const auto at = static_cast<std::ptrdiff_t>(part * static_cast<double>(values.size() - 1));
  std::nth_element(values.begin(), values.begin() + at, values.end());
  return values[static_cast<std::size_t>(at)];
}

bool solid_at(const field::Field& field, const Vec3& p) { return field.place_at(p).state == field::State::kSolid; }

/// Distance along `normal` (out of the solid) to where the state changes; negative where it changes nowhere within `most`.
double distance_to_surface(const field::Field& field, const Vec3& p, const Vec3& normal, double least, double most) {
  const bool inside = solid_at(field, p);
  const double way = inside ? 1.0 : -1.0;
  double near = 0.0, far = least;
  while (solid_at(field, p + normal * (way * far)) == inside) {
    near = far;
    far *= 2.0;
    if (far > most) return -1.0;
  }
  for (int i = 0; i < 30; ++i) {
    const double middle = 0.5 * (near + far);
    (solid_at(field, p + normal * (way * middle)) == inside ? near : far) = middle;
  }
  return far;
}

}  // namespace

std::vector<Result> race(const std::vector<const Contender*>& contenders, const RaySets& rays, int rounds) {
  std::vector<Result> results(contenders.size());
  for (int kind = 0; kind < kKinds; ++kind) {
    const auto k = static_cast<std::size_t>(kind);
    std::vector<std::vector<double>> ratios(contenders.size());
    for (int round = 0; round < rounds; ++round) {
      double first = 0.0;
      for (std::size_t c = 0; c < contenders.size(); ++c) {
        const Timed timed = run(*contenders[c], rays_of(rays, kind), kind == 2);
        if (timed.rays_per_second > results[c].rays_per_second[k]) {
          results[c].rays_per_second[k] = timed.rays_per_second;
          results[c].rays_per_wall_second[k] = timed.rays_per_wall_second;
        }
        results[c].hit_share[k] = timed.hit_share;
        if (c == 0) first = timed.rays_per_second;
        ratios[c].push_back(timed.rays_per_second / first);
      }
    }
    for (std::size_t c = 0; c < contenders.size(); ++c) results[c].ratio[k] = quantile(ratios[c], 0.5);
  }
  return results;
}

void measure_error(const field::Field& field, const Contender& contender, const RaySets& rays, std::size_t hits, Result& result) {
  const double half_breadth = field.scene().law.half_breadth;
  std::vector<double> errors;
  result.lost = 0;
  for (const std::vector<trace::Ray>* set : {&rays.camera, &rays.scattered}) {
    const std::size_t step = std::max<std::size_t>(1, set->size() / (2 * hits));
    std::vector<double> found_errors(set->size() / step, -2.0);
    parallel_for(found_errors.size(), 64, [&](std::size_t i) {
      const trace::Ray& ray = (*set)[i * step];
      Found found;
      if (!contender.closest(ray, found)) return;
      const Vec3 p = Vec3(ray.origin) + Vec3(ray.direction) * static_cast<double>(found.t);
      found_errors[i] = distance_to_surface(field, p, Vec3(found.normal), 1e-9 * half_breadth, 0.1 * half_breadth);
    });
    for (const double error : found_errors) {
      if (error >= 0.0) errors.push_back(error);
      result.lost += error == -1.0;
    }
  }
  result.error_median_mm = quantile(errors, 0.5);
  result.error_99_mm = quantile(errors, 0.99);
}

}  // namespace whorl::bench
