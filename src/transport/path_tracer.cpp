// SPDX-License-Identifier: Apache-2.0
// Tiles, pixels and sample replicates of one panel.
#include "transport/path_tracer.h"

#include "math/basis3f.h"
#include "math/parallel.h"
#include "math/sobol.h"
#include "shaders_cpu/tone/curve.h"
#include "shaders_cpu/tone/srgb.h"
#include "transport/encounter.h"
#include "transport/path.h"

#include <algorithm>
#include <atomic>
#include <bit>
#include <cmath>

namespace whorl::transport {
namespace {

constexpr int kTilePx = 16;
constexpr int kReplicates = 2;
constexpr std::uint32_t kFilterBlock = 0, kFirstPathBlock = 1;

/// What a tile counts; summed over tiles in their order, so that the sums do not depend on threads.
struct Tally {
  RayCounts rays;
  std::uint64_t non_finite = 0, covered = 0, samples = 0;  // samples of covered pixels
  int most_samples = 0;
  double squared_error = 0.0;

  void add(const Tally& t) {
    rays.camera += t.rays.camera;
    rays.scattered += t.rays.scattered;
    rays.shadow += t.rays.shadow;
    non_finite += t.non_finite;
    covered += t.covered;
    samples += t.samples;
    most_samples = std::max(most_samples, t.most_samples);
    squared_error += t.squared_error;
  }
};

bool is_finite(const Vec3f& v) noexcept { return std::isfinite(v.x) && std::isfinite(v.y) && std::isfinite(v.z); }

PixelRect joined(const PixelRect& a, const PixelRect& b) {
  if (a.x0 >= a.x1 || a.y0 >= a.y1) return b;
  if (b.x0 >= b.x1 || b.y0 >= b.y1) return a;
  return {std::min(a.x0, b.x0), std::min(a.y0, b.y0), std::max(a.x1, b.x1), std::max(a.y1, b.y1)};
}

/// Pixels in which anything can be seen.
PixelRect reachable(const RenderJob& job) {
  if (job.bounds_mm.isEmpty()) return {0, 0, job.camera.width_px, job.camera.height_px};
  PixelRect rect = pixels_of(job.camera, job.bounds_mm);
  for (const auto& lamp : job.lighting.lamps) {
    const Vec3 centre(lamp.centre), reach(lamp.radius);
    rect = joined(rect, pixels_of(job.camera, {centre - reach, centre + reach}));
  }
  return rect;
}

class Panel {
 public:
  explicit Panel(const RenderJob& job)
      : job_(job),
        paths_(*job.shell, job.lighting, job.materials),
        half_(samples_taken(job.samples_per_pixel) / kReplicates),
        most_half_(std::max(half_, job.most_samples / kReplicates)),
        rect_(reachable(job)) {}

  Tally tile(int tile_x, int tile_y, Film& film) const {
    Tally tally;
    const int x1 = std::min((tile_x + 1) * kTilePx, film.width), y1 = std::min((tile_y + 1) * kTilePx, film.height);
    for (int y = tile_y * kTilePx; y < y1; ++y)
      for (int x = tile_x * kTilePx; x < x1; ++x) {
        if (!rect_.contains(x, y)) continue;
        pixel(x, y, film, tally);
        film.facts[film.index(x, y)] = facts(x, y, tally);
      }
    return tally;
  }

 private:
  struct Sum {
    Vec3 radiance{0.0};
    double squares = 0.0;  // of the luminance
    int hits = 0, valid = 0;
    double mean_luminance() const { return valid ? static_cast<double>(luminance(Vec3f(radiance / valid))) : 0.0; }
  };

  /// Adds the samples [from, to) of one of the pixel's nets.
  void replicate(int x, int y, std::uint32_t number, int from, int to, Sum& sum, Tally& tally) const {
    SobolStream stream({static_cast<std::uint32_t>(x), static_cast<std::uint32_t>(y), job_.panel, number, job_.seed});
    for (int i = from; i < to; ++i) {
      stream.set_point(static_cast<std::uint32_t>(i));
      const auto u = stream.block(kFilterBlock);
      const Vec2 offset = filter_offset(u[0], u[1]);
      const Glimpse seen = paths_.look(job_.camera.ray(x + 0.5 + offset.x, y + 0.5 + offset.y), stream, kFirstPathBlock,
                                       tally.rays);
      if (!is_finite(seen.radiance)) {
        ++tally.non_finite;
        continue;
      }
      sum.radiance += Vec3(seen.radiance);
      sum.squares += std::pow(static_cast<double>(luminance(seen.radiance)), 2);
      sum.hits += seen.hit;
      ++sum.valid;
    }
  }

  /// Whether the pixel's noise would be seen in print.
  static bool noisy(const Sum& a, const Sum& b) {
    const double hits = a.hits + b.hits;
    if (hits < 2.0) return false;
    const double mean = static_cast<double>(luminance(Vec3f((a.radiance + b.radiance) / hits)));
    const double error = std::sqrt(std::max(0.0, (a.squares + b.squares) / hits - mean * mean) / hits);
    const auto printed = [](double light) { return shaders_cpu::srgb_encode(shaders_cpu::tone(std::max(0.0, light))); };
    return printed(mean + error) - printed(mean - error) > 2.0 * kSeenNoise;
  }

  void pixel(int x, int y, Film& film, Tally& tally) const {
    Sum a, b;
    int taken = 0;
    for (int wanted = half_; wanted <= most_half_; wanted *= 2) {
      replicate(x, y, 0, taken, wanted, a, tally);
      replicate(x, y, 1, taken, wanted, b, tally);
      taken = wanted;
      if (!noisy(a, b)) break;
    }
    const int valid = a.valid + b.valid, hits = a.hits + b.hits;
    if (hits == 0) return;
    film.radiance[film.index(x, y)] = Vec3f((a.radiance + b.radiance) / valid);
    film.coverage[film.index(x, y)] = static_cast<float>(hits) / static_cast<float>(valid);
    const double half_difference = 0.5 * (a.mean_luminance() - b.mean_luminance());
    tally.squared_error += half_difference * half_difference;
    ++tally.covered;
    tally.samples += static_cast<std::uint64_t>(kReplicates * taken);
    tally.most_samples = std::max(tally.most_samples, kReplicates * taken);
  }

  PixelFacts facts(int x, int y, Tally& tally) const {
    PixelFacts facts;
    ++tally.rays.camera;
    const trace::Ray ray = job_.camera.ray(x + 0.5, y + 0.5);
    const Encounter met = first_met(*job_.shell, job_.lighting.lamps, ray);
    if (met.nothing()) return facts;
    facts.depth_mm = met.hit.t;
    Vec3f normal = met.hit.normal;
    if (met.lamp) {
      normal = unit(ray.origin + ray.direction * met.hit.t - met.lamp->centre);
      facts.part = static_cast<std::uint8_t>(trace::Part::kLamp);
    } else {
      facts.part = static_cast<std::uint8_t>(met.hit.part);
      facts.albedo = job_.materials.surface(met.hit).albedo;
      const trace::GrowthPlace grown = job_.shell->growth_place(met.hit);
      facts.turn = grown.turn;
      facts.around_deg = grown.around_deg;
    }
    facts.normal = Vec3f(job_.camera.page.to_frame(Vec3(normal)));
    return facts;
  }

  const RenderJob& job_;
  PathTracer paths_;
  int half_, most_half_;  // samples of each replicate
  PixelRect rect_;
};

}  // namespace

int samples_taken(int n) noexcept {
  return static_cast<int>(std::bit_ceil(static_cast<unsigned>(std::clamp(n, kReplicates, 1 << 30))));
}

Film render(const RenderJob& job, const Progress& progress) {
  Film film(job.camera.width_px, job.camera.height_px);
  const int across = (film.width + kTilePx - 1) / kTilePx, down = (film.height + kTilePx - 1) / kTilePx;
  const std::size_t tiles = static_cast<std::size_t>(across) * static_cast<std::size_t>(down);
  const Panel panel(job);
  std::vector<Tally> tallies(tiles);
  std::atomic<std::size_t> finished{0};
  parallel_for(tiles, 1, [&](std::size_t i) {
    const int t = static_cast<int>(i);
    tallies[i] = panel.tile(t % across, t / across, film);
    progress.done(static_cast<double>(++finished) / static_cast<double>(tiles));
  });
  Tally sum;
  for (const Tally& t : tallies) sum.add(t);
  film.rays_camera = sum.rays.camera;
  film.rays_scattered = sum.rays.scattered;
  film.rays_shadow = sum.rays.shadow;
  film.non_finite = sum.non_finite;
  film.noise = sum.covered ? std::sqrt(sum.squared_error / static_cast<double>(sum.covered)) : 0.0;
  const double least = samples_taken(job.samples_per_pixel);
  film.mean_samples = sum.covered ? static_cast<double>(sum.samples) / static_cast<double>(sum.covered) : least;
  film.max_samples = sum.covered ? sum.most_samples : least;
  return film;
}

}  // namespace whorl::transport
