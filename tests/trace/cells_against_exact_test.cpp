// SPDX-License-Identifier: Apache-2.0
// Rays on the cells' cubics against the same rays on the functions themselves.
#include "support/catch.h"

#include "math/parallel.h"
#include "math/sobol.h"
#include "support/shell_specimen.h"
#include "trace/embree_solid.h"

#include <cmath>
#include <vector>

using namespace whorl;
using trace::Hit;
using trace::Ray;

namespace {

// The band of tangency, for hits that only one of the two has: a ray that meets the surface at under three degrees, or that
// grazes over solid for less than a ten-thousandth of the height.
constexpr double kGrazingCos = 0.05;
constexpr double kGrazingStretch = 1e-4;  // of the height
// Where both have the same hit, their surfaces are this near along the normal, and the hits this near along the ray: the
// latter outside of 1/cos > 5, since the cells are true to 2e-6 of the height along the normal.
constexpr double kAlongNormal = 5e-6, kAlongRay = 1e-5, kFlatCos = 0.2;  // of the height

struct Traced {
  bool hit = false;
  Hit at;
};

std::vector<Traced> trace_all(const trace::EmbreeSolid& solid, const std::vector<Ray>& rays) {
  std::vector<Traced> results(rays.size());
  parallel_for(rays.size(), 1024, [&](std::size_t i) { results[i].hit = solid.closest(rays[i], results[i].at); });
  return results;
}

// Parallel rays from eight sides, spread over the bounds.
std::vector<Ray> camera_rays(const scene::Scene& scene, std::size_t count) {
  const Vec3 centre = 0.5 * (scene.bounds.min + scene.bounds.max);
  const double radius = 0.5 * (scene.bounds.max - scene.bounds.min).length();
  std::vector<Ray> rays(count);
  for (std::size_t i = 0; i < count; ++i) {
    SobolStream stream({static_cast<std::uint32_t>(i % 8), 0, 0, 0, 11});
    stream.set_point(static_cast<std::uint32_t>(i / 8));
    const auto u = stream.block(0);
    const double side = kTwoPi * static_cast<double>(i % 8) / 8.0, lift = 0.35 * static_cast<double>(i % 3) - 0.35;
    const Frame frame = frame_around(Vec3(std::cos(side), std::sin(side), lift).normalized());
    const Vec3 start = centre + frame.to_world({0.8 * radius * (2.0 * static_cast<double>(u[0]) - 1.0),
                                                0.8 * radius * (2.0 * static_cast<double>(u[1]) - 1.0), 1.01 * radius});
    rays[i] = {Vec3f(start), Vec3f(-frame.z)};
  }
  return rays;
}

// From every hit one ray into the half-space of its normal, denser towards the normal (cosine).
std::vector<Ray> scattered_rays(const std::vector<Traced>& from, std::size_t count, std::uint64_t seed) {
  std::vector<std::size_t> hits;
  for (std::size_t i = 0; i < from.size(); ++i)
    if (from[i].hit) hits.push_back(i);
  std::vector<Ray> rays(count);
  for (std::size_t i = 0; i < count; ++i) {
    const Hit& hit = from[hits[i % hits.size()]].at;
    SobolStream stream({static_cast<std::uint32_t>(i % hits.size()), 1, 0, 0, seed});
    stream.set_point(static_cast<std::uint32_t>(i / hits.size()));
    const auto u = stream.block(0);
    const Frame frame = frame_around(Vec3(hit.normal));
    const double r = std::sqrt(static_cast<double>(u[0])), a = kTwoPi * static_cast<double>(u[1]);
    const Vec3 d = frame.to_world({r * std::cos(a), r * std::sin(a), std::sqrt(std::max(1e-6, 1.0 - r * r))});
    rays[i] = {hit.position + hit.normal * hit.safe_offset, Vec3f(d.normalized())};
  }
  return rays;
}

double cosine(const Ray& ray, const Hit& hit) { return std::abs(static_cast<double>(hit.normal.dot(ray.direction))); }

// Length of the solid that the ray goes through from its first hit on.
double first_solid_stretch(const trace::EmbreeSolid& solid, const Ray& ray, const Hit& hit) {
  std::vector<trace::Crossing> crossings;
  solid.crossings(ray, field::State::kOutside, crossings);
  for (std::size_t i = 0; i + 1 < crossings.size(); ++i)
    if (crossings[i].after == field::State::kSolid && crossings[i].t >= hit.t - 1e-4f)
      return static_cast<double>(crossings[i + 1].t - crossings[i].t);
  return 0.0;
}

struct Tally {
  std::size_t only_one = 0, far = 0, in_band = 0, both = 0;
};

Tally compare(const trace::EmbreeSolid& solid, double height, const std::vector<Ray>& rays,
              const std::vector<Traced>& cells, const std::vector<Traced>& exact) {
  Tally tally;
  for (std::size_t i = 0; i < rays.size(); ++i) {
    const Traced &a = cells[i], &b = exact[i];
    if (!a.hit && !b.hit) continue;
    const double apart = a.hit && b.hit ? std::abs(static_cast<double>(a.at.t - b.at.t)) / height : 1.0;
    if (a.hit && b.hit) ++tally.both;
    if (apart <= kAlongNormal) continue;
    const Hit& nearer = !b.hit || (a.hit && a.at.t < b.at.t) ? a.at : b.at;
    const double cos = cosine(rays[i], nearer);
    const bool same_surface = apart * cos <= kAlongNormal;
    if (same_surface && (apart <= kAlongRay || cos < kFlatCos)) continue;
    if (cos < kGrazingCos || first_solid_stretch(solid, rays[i], nearer) < kGrazingStretch * height) {
      ++tally.in_band;
      continue;
    }
    ++(a.hit && b.hit ? tally.far : tally.only_one);
  }
  return tally;
}

}  // namespace

TEST_CASE("a million rays find on the cells what they find on the functions themselves", "[trace][rays]") {
  constexpr std::size_t kCamera = 200'000, kScattered = 140'000;  // for each of three shapes: a million and a little
  for (const test::ShellPlan& plan : {test::tall_plan(), test::globose_plan(), test::planispiral_plan()}) {
    CAPTURE(plan.name);
    const test::Shell shell(plan);
    trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
    const std::vector<Ray> camera = camera_rays(shell.scene, kCamera);
    const std::vector<Traced> seen = trace_all(solid, camera);
    const std::vector<Ray> scattered = scattered_rays(seen, kScattered, 5);
    const std::vector<Traced> met = trace_all(solid, scattered);
    solid.set_exact(true);
    const std::vector<Traced> seen_exactly = trace_all(solid, camera), met_exactly = trace_all(solid, scattered);

    for (const Tally& tally : {compare(solid, shell.height(), camera, seen, seen_exactly),
                               compare(solid, shell.height(), scattered, met, met_exactly)}) {
      CHECK(tally.both > 8'000);
      CHECK(tally.only_one == 0);
      CHECK(tally.far == 0);
      // The band is narrow: few of the rays that meet anything fall into it.
      CHECK(static_cast<double>(tally.in_band) < 0.001 * static_cast<double>(tally.both));
    }
  }
}

TEST_CASE("ten million secondary rays do not meet the surface that they leave", "[trace][rays]") {
  constexpr std::size_t kBatch = 1'000'000, kBatches = 4;  // for each of three shapes: twelve million
  for (const test::ShellPlan& plan : {test::tall_plan(), test::globose_plan(), test::planispiral_plan()}) {
    CAPTURE(plan.name);
    const test::Shell shell(plan);
    const trace::EmbreeSolid solid(shell.field, {2e-6 * shell.height(), false});
    const std::vector<Traced> seen = trace_all(solid, camera_rays(shell.scene, 100'000));
    std::size_t self_hits = 0, rays_traced = 0;
    for (std::size_t batch = 0; batch < kBatches; ++batch) {
      const std::vector<Ray> rays = scattered_rays(seen, kBatch, 100 + batch);
      const std::vector<Traced> met = trace_all(solid, rays);
      rays_traced += rays.size();
      for (std::size_t i = 0; i < rays.size(); ++i) {
        // A hit within the offset's reach is the surface itself unless there is air before it and true solid behind it:
        // beside a suture or the columella another surface can be as near.
        if (!met[i].hit || met[i].at.t > 4.0f * met[i].at.safe_offset) continue;
        const Vec3 start(rays[i].origin);
        const Vec3 beyond = Vec3(met[i].at.position) - 4.0 * static_cast<double>(met[i].at.safe_offset) * Vec3(met[i].at.normal);
        const bool really_there = shell.at(start) != field::State::kSolid && shell.at(beyond) == field::State::kSolid &&
                                  met[i].at.normal.dot(rays[i].direction) < 0.0f;
        if (!really_there) ++self_hits;
      }
    }
    CHECK(rays_traced == kBatch * kBatches);
    CHECK(self_hits == 0);
  }
}
