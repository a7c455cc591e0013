// SPDX-License-Identifier: Apache-2.0
// Extents by climbing on the surface that parallel rays meet.
#include "measure/support.h"

#include "math/parallel.h"

#include <algorithm>
#include <array>
#include <limits>

namespace whorl::measure {
namespace {

constexpr double kNothing = -std::numeric_limits<double>::infinity();

struct Climb {
  const trace::EmbreeSolid& solid;
  Frame frame;      // z = the direction
  Vec3 centre;
  double radius;    // of a sphere round the solid

  // Height of the surface over a place of the plane across the direction.
  double height(double x, double y) const {
    trace::Ray ray{Vec3f(centre + frame.to_world({x, y, radius})), Vec3f(-frame.z)};
    trace::Hit hit;
    if (!solid.closest(ray, hit)) return kNothing;
    return frame.z.dot(centre) + radius - static_cast<double>(hit.t);
  }
};

}  // namespace

double support(const trace::EmbreeSolid& solid, const Vec3& n, int grid) {
  const Box3& box = solid.field().scene().bounds;
  const double radius = 0.5 * (box.max - box.min).length();
  const Climb climb{solid, frame_around(n), 0.5 * (box.min + box.max), radius};
  const auto count = static_cast<std::size_t>(grid) * static_cast<std::size_t>(grid);
  std::vector<double> heights(count);
  const auto place = [&](std::size_t i) { return radius * (2.0 * (static_cast<double>(i) + 0.5) / grid - 1.0); };
  parallel_for(static_cast<std::size_t>(grid), 4, [&](std::size_t j) {
    for (std::size_t i = 0; i < static_cast<std::size_t>(grid); ++i)
      heights[j * static_cast<std::size_t>(grid) + i] = climb.height(place(i), place(j));
  });

  // Climb from the few highest places: a second summit may top the first between grid lines.
  constexpr std::size_t kStarts = 6;
  std::vector<std::size_t> order(count);
  for (std::size_t i = 0; i < count; ++i) order[i] = i;
  std::partial_sort(order.begin(), order.begin() + kStarts, order.end(),
                    [&](std::size_t a, std::size_t b) { return heights[a] != heights[b] ? heights[a] > heights[b] : a < b; });
  double best = kNothing;
  for (std::size_t k = 0; k < kStarts; ++k) {
    double x = place(order[k] % static_cast<std::size_t>(grid)), y = place(order[k] / static_cast<std::size_t>(grid));
    double top = heights[order[k]], step = radius / grid;
    // Along a keel the ascent is a narrow ridge: steps grow again while they succeed, and the climb is bounded.
    constexpr int kMostMoves = 400;
    for (int moves = 0; moves < kMostMoves && step > 1e-7 * radius;) {
      bool moved = false;
      for (const auto& [dx, dy] : {std::array{1.0, 0.0}, {-1.0, 0.0}, {0.0, 1.0}, {0.0, -1.0}, {0.7, 0.7}, {-0.7, 0.7},
                                   {0.7, -0.7}, {-0.7, -0.7}}) {
        const double h = climb.height(x + step * dx, y + step * dy);
        if (h > top) {
          top = h;
          x += step * dx;
          y += step * dy;
          moved = true;
          ++moves;
          break;
        }
      }
      step = moved ? std::min(2.0 * step, radius / grid) : 0.25 * step;
    }
    best = std::max(best, top);
  }
  return best;
}

double width_across_axis(const trace::EmbreeSolid& solid) {
  constexpr int kDirections = 36, kGrid = 96;
  const auto width = [&](double azimuth) {
    const Vec3 n(std::cos(azimuth), std::sin(azimuth), 0.0);
    return support(solid, n, kGrid) + support(solid, -n, kGrid);
  };
  double best = 0.0, at = 0.0;
  for (int i = 0; i < kDirections; ++i) {
    const double azimuth = kPi * i / kDirections, w = width(azimuth);
    if (w > best) {
      best = w;
      at = azimuth;
    }
  }
  for (double step = 0.5 * kPi / kDirections; step > 1e-4; step *= 0.5)
    for (const double azimuth : {at - step, at + step}) {
      const double w = width(azimuth);
      if (w > best) {
        best = w;
        at = azimuth;
      }
    }
  return best;
}

}  // namespace whorl::measure
