// SPDX-License-Identifier: Apache-2.0
// Sums wall along every ray of a picture.
#include "transport/radiograph.h"

#include "math/parallel.h"
#include "math/sobol.h"
#include "shaders_cpu/tone/curve.h"
#include "transport/path_tracer.h"

#include <algorithm>
#include <atomic>
#include <cmath>

namespace whorl::transport {
namespace {

struct Tally {
  std::uint64_t rays = 0, covered = 0;
  double squared_error = 0.0;
};

trace::UnitedSolid all_of(const RadiographJob& job) { return {*job.solid, job.attached}; }

PixelFacts first_surface(const RadiographJob& job, int x, int y) {
  PixelFacts facts;
  trace::Hit hit;
  if (!all_of(job).closest(job.camera.ray(x + 0.5, y + 0.5), hit)) return facts;
  facts.depth_mm = hit.t;
  facts.normal = Vec3f(job.camera.page.to_frame(Vec3(hit.normal)));
  const trace::GrowthPlace grown = job.solid->growth_place(hit);
  facts.turn = grown.turn;
  facts.around_deg = grown.around_deg;
  facts.part = static_cast<std::uint8_t>(hit.part);
  return facts;
}

void pixel(const RadiographJob& job, int samples, int x, int y, RayScratch& scratch, Film& film,
           Tally& tally) {
  SobolStream stream({static_cast<std::uint32_t>(x), static_cast<std::uint32_t>(y), job.panel, 0, job.seed});
  double sum = 0.0, squares = 0.0;
  int hits = 0;
  for (int i = 0; i < samples; ++i) {
    stream.set_point(static_cast<std::uint32_t>(i));
    const auto u = stream.block(0);
    const Vec2 offset = filter_offset(u[0], u[1]);
    const double length = wall_length(all_of(job), job.camera.ray(x + 0.5 + offset.x, y + 0.5 + offset.y), scratch);
    if (!(length > 0.0)) continue;
    const double passed = std::exp(-job.attenuation_per_mm * length);
    const double shown = job.bright_shell ? 1.0 - passed : passed;
    sum += shown;
    squares += shown * shown;
    ++hits;
  }
  tally.rays += static_cast<std::uint64_t>(samples) + 1;
  const std::size_t at = film.index(x, y);
  film.facts[at] = first_surface(job, x, y);
  if (hits == 0) return;
  const double mean = sum / hits, cover = static_cast<double>(hits) / samples;
  film.radiance[at] = Vec3f(static_cast<float>(shaders_cpu::inverse_tone(mean) * cover));
  film.coverage[at] = static_cast<float>(cover);
  // An upper bound: the samples of a net err less than independent ones.
  tally.squared_error += std::max(0.0, squares / hits - mean * mean) / hits;
  ++tally.covered;
}

}  // namespace

double wall_length(const trace::UnitedSolid& solid, const trace::Ray& ray, RayScratch& scratch) {
  std::vector<trace::Crossing>& met = scratch.crossings;
  solid.shell().crossings(ray, field::State::kOutside, met);
  double length = 0.0;
  for (std::size_t i = 0; i + 1 < met.size(); ++i)
    if (met[i].after == field::State::kSolid) length += static_cast<double>(met[i + 1].t - met[i].t);
  if (!solid.attached()) return length;
  // Where an element reaches into the wall, matter counts once.
  solid.attached()->stretches(ray, scratch.within);
  for (const trace::AttachedSolids::Within& w : scratch.within) {
    length += w.out - w.in;
    for (std::size_t i = 0; i + 1 < met.size(); ++i)
      if (met[i].after == field::State::kSolid)
        length -= std::max(0.0, std::min(w.out, static_cast<double>(met[i + 1].t)) - std::max(w.in, static_cast<double>(met[i].t)));
  }
  return length;
}

Film radiograph(const RadiographJob& job, const Progress& progress) {
  Film film(job.camera.width_px, job.camera.height_px);
  const PixelRect rect = job.bounds_mm.isEmpty() ? PixelRect{0, 0, film.width, film.height} : pixels_of(job.camera, job.bounds_mm);
  const int samples = samples_taken(job.samples_per_pixel);
  std::vector<Tally> tallies(static_cast<std::size_t>(film.height));
  std::atomic<int> finished{0};
  parallel_for(tallies.size(), 1, [&](std::size_t row) {
    RayScratch scratch;
    const int y = static_cast<int>(row);
    for (int x = 0; x < film.width; ++x)
      if (rect.contains(x, y)) pixel(job, samples, x, y, scratch, film, tallies[row]);
    progress.done(static_cast<double>(++finished) / film.height);
  });
  Tally sum;
  for (const Tally& t : tallies) {
    sum.rays += t.rays;
    sum.covered += t.covered;
    sum.squared_error += t.squared_error;
  }
  film.rays_camera = sum.rays;
  film.noise = sum.covered ? std::sqrt(sum.squared_error / static_cast<double>(sum.covered)) : 0.0;
  film.mean_samples = film.max_samples = samples;
  return film;
}

}  // namespace whorl::transport
