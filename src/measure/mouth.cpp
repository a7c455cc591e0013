// SPDX-License-Identifier: Apache-2.0
// Extents of a region that is known by asking point after point.
#include "measure/mouth.h"

#include "math/parallel.h"

#include <cmath>
#include <vector>

namespace whorl::measure {
namespace {

using growth::HalfPlanePoint;

class Mouth {
 public:
  explicit Mouth(const field::Field& field) : field_(field) {}

  // In the tube at the growth front, and in no earlier tube.
  bool holds(HalfPlanePoint p) const {
    if (p.rho <= 0.0) return false;
    const scene::Scene& scene = field_.scene();
    const double theta =
        scene.law.theta_lip + growth::front_lead(scene.front.tan_inclination, scene.law.depth, p);
    const Vec3 at(p.rho * std::cos(theta), p.rho * std::sin(theta), p.z);
    if (field_.tube(at, theta) <= 0.0 || field_.value({field::Part::kChamber, 0.0}, at) > 0.0) return false;
    for (double earlier = theta - kTwoPi; earlier > scene.theta_begin; earlier -= kTwoPi)
      if (field_.tube(at, earlier) > 0.0) return false;
    return true;
  }

  // Moves from a place inside as far as it goes in direction (dr, dz), sidling along the edge, down to `finest` steps.
  HalfPlanePoint farthest(HalfPlanePoint p, double dr, double dz, double step, double finest) const {
    // Rise for a step aside: from steep (a narrow horn beside the whorl before) to all but level (a rounded top).
    constexpr double kRises[] = {4.0, 1.0, 0.3, 0.1, 0.03, 0.01, 1e-3, 1e-4};
    const auto try_step = [&](double rise, double aside) {
      const HalfPlanePoint q{p.rho + step * (rise * dr - aside * dz), p.z + step * (rise * dz + aside * dr)};
      if (!holds(q)) return false;
      p = q;
      return true;
    };
    while (step > finest) {
      bool moved = try_step(1.0, 0.0);
      for (const double rise : kRises)
        if (!moved) moved = try_step(rise, 1.0) || try_step(rise, -1.0);
      if (!moved) step *= 0.5;
    }
    return p;
  }

 private:
  const field::Field& field_;
};

}  // namespace

MouthExtent mouth_extent(const field::Field& field) {
  constexpr std::size_t kGrid = 240;
  const growth::CoilingLaw& law = field.scene().law;
  const double reach = 2.0 * law.half_breadth * std::max(1.0, law.S);
  const Mouth mouth(field);
  const auto place = [&](std::size_t i, std::size_t j) {
    return HalfPlanePoint{law.distance + reach * (2.0 * static_cast<double>(i) / kGrid - 1.0),
                          law.depth + reach * (2.0 * static_cast<double>(j) / kGrid - 1.0)};
  };
  std::vector<char> inside((kGrid + 1) * (kGrid + 1));
  parallel_for(kGrid + 1, 1, [&](std::size_t j) {
    for (std::size_t i = 0; i <= kGrid; ++i) inside[j * (kGrid + 1) + i] = mouth.holds(place(i, j));
  });
  const double step = 2.0 * reach / kGrid, finest = 1e-7 * reach;
  const auto extreme = [&](double dr, double dz) {
    HalfPlanePoint best{};
    double most = -1e300;
    for (std::size_t j = 0; j <= kGrid; ++j)
      for (std::size_t i = 0; i <= kGrid; ++i) {
        const HalfPlanePoint p = place(i, j);
        const double along = dr * p.rho + dz * p.z;
        if (inside[j * (kGrid + 1) + i] && along > most) {
          most = along;
          best = p;
        }
      }
    const HalfPlanePoint end = mouth.farthest(best, dr, dz, step, finest);
    return dr * end.rho + dz * end.z;
  };
  return {extreme(0.0, 1.0) + extreme(0.0, -1.0), extreme(1.0, 0.0) + extreme(-1.0, 0.0), finest};
}

bool suture_depth(const trace::EmbreeSolid& solid, double& z) {
  const scene::Scene& scene = solid.field().scene();
  const double azimuth = scene.law.theta_lip - kPi;
  const Vec3 outwards(std::cos(azimuth), std::sin(azimuth), 0.0);
  const double radius = (scene.bounds.max - scene.bounds.min).length();
  // Whether a ray towards the axis at this depth meets the last whorl (rather than an earlier one, or nothing).
  const auto last_whorl_at = [&](double depth, bool& hit_any) {
    trace::Ray ray{Vec3f(outwards * radius + Vec3(0.0, 0.0, depth)), Vec3f(-outwards)};
    ray.t_max = static_cast<float>(radius);
    trace::Hit hit;
    hit_any = solid.closest(ray, hit);
    return hit_any && kTwoPi * static_cast<double>(solid.growth_place(hit).turn) > azimuth - kPi;
  };
  constexpr int kSteps = 2000;
  const double top = scene.bounds.min.z, bottom = scene.law.at(azimuth).depth;
  double above = top;
  bool seen_earlier = false;
  for (int i = 0; i <= kSteps; ++i) {
    const double depth = top + (bottom - top) * i / kSteps;
    bool any;
    const bool last = last_whorl_at(depth, any);
    if (any && !last) {
      seen_earlier = true;
      above = depth;
    }
    if (last && seen_earlier) {
      double lo = above, hi = depth;
      for (int k = 0; k < 40; ++k) {
        const double mid = 0.5 * (lo + hi);
        (last_whorl_at(mid, any) ? hi : lo) = mid;
      }
      z = 0.5 * (lo + hi);
      return true;
    }
  }
  return false;
}

}  // namespace whorl::measure
