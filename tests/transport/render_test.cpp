// SPDX-License-Identifier: Apache-2.0
// Whole panels: the same bits on any number of threads, coverage, facts, honest noise.
#include "math/basis3f.h"
#include "math/parallel.h"
#include "shaders_cpu/tone/curve.h"
#include "shaders_cpu/tone/srgb.h"
#include "support/analytic_solids.h"
#include "support/catch.h"
#include "shaders_cpu/tone/curve.h"
#include "shaders_cpu/tone/srgb.h"
#include "support/studio_light.h"

#include <algorithm>
#include <atomic>
#include <cstring>

using namespace whorl;
using namespace whorl::transport;

namespace {

/// An open sphere with a lamp in it, looked at from the side: every kind of path.
struct Studio {
  test::OpenSphere shell{1.0f, 0.15};
  RenderJob job;

  explicit Studio(int pixels = 40, int samples = 16) {
    const double rise = radians(50.0);
    job.shell = &shell;
    job.bounds_mm = {Vec3(-1.0), Vec3(1.0)};
    job.camera = test::camera_from_above(pixels, 2.4, 3.0);
    job.camera.page = {Vec3(1, 0, 0), Vec3(0, std::cos(rise), std::sin(rise)), Vec3(0, -std::sin(rise), std::cos(rise))};
    const PlacedLamp lamp{{0.3, -0.3, 0.5}, 0.06, 40.0, 3200.0};
    job.lighting = light_page(test::page_light(135.0, 45.0, 12.0, 0.35), {&lamp, 1}, job.camera.page);
    job.materials = test::of_albedo(0.7f, 0.5);
    job.samples_per_pixel = samples;
    job.seed = 5;
  }
};

template <class T>
bool same_bytes(const std::vector<T>& a, const std::vector<T>& b) {
  return a.size() == b.size() && std::memcmp(a.data(), b.data(), a.size() * sizeof(T)) == 0;
}

bool same_facts(const PixelFacts& a, const PixelFacts& b) {
  return a.depth_mm == b.depth_mm && a.normal == b.normal && a.albedo == b.albedo && a.turn == b.turn &&
         a.around_deg == b.around_deg && a.part == b.part;
}

class Recorder final : public Progress {
 public:
  void done(double fraction) const noexcept override {
    ++calls;
    if (fraction <= 0.0 || fraction > 1.0) ++out_of_range;
    if (fraction == 1.0) ++ends;
  }
  mutable std::atomic<int> calls{0}, ends{0}, out_of_range{0};
};

}  // namespace

TEST_CASE("One, two and four threads give the same pixels, facts and counts to the bit", "[render]") {
  const Studio studio;
  set_thread_count(1);
  const Film one = render(studio.job, Silent());
  for (const int threads : {2, 4}) {
    set_thread_count(threads);
    const Film film = render(studio.job, Silent());
    CHECK(same_bytes(one.radiance, film.radiance));
    CHECK(same_bytes(one.coverage, film.coverage));
    CHECK(std::equal(one.facts.begin(), one.facts.end(), film.facts.begin(), same_facts));
    CHECK(one.noise == film.noise);
    CHECK(one.rays_camera == film.rays_camera);
    CHECK(one.rays_scattered == film.rays_scattered);
    CHECK(one.rays_shadow == film.rays_shadow);
  }
  set_thread_count(0);
}

TEST_CASE("Another seed or another panel gives other noise", "[render]") {
  Studio studio(24);
  const Film film = render(studio.job, Silent());
  studio.job.seed = 6;
  CHECK_FALSE(same_bytes(film.radiance, render(studio.job, Silent()).radiance));
  studio.job.seed = 5;
  studio.job.panel = 1;
  CHECK_FALSE(same_bytes(film.radiance, render(studio.job, Silent()).radiance));
}

TEST_CASE("Pixels outside the bounds are left out without changing any other", "[render]") {
  Studio studio(24);
  studio.job.camera.mm_per_px = 0.3;
  const Film film = render(studio.job, Silent());
  studio.job.bounds_mm = Box3();
  const Film whole = render(studio.job, Silent());
  CHECK(same_bytes(film.radiance, whole.radiance));
  CHECK(same_bytes(film.coverage, whole.coverage));
  CHECK(film.rays_camera < whole.rays_camera / 2);
  CHECK(film.rays_shadow == whole.rays_shadow);
}

TEST_CASE("A lamp beyond the shell's bounds is still seen", "[render]") {
  const test::Void nothing;
  RenderJob job;
  job.shell = &nothing;
  job.bounds_mm = {Vec3(-0.1), Vec3(0.1)};
  job.camera = test::camera_from_above(32, 8.0);
  job.lighting.lamps = {{Vec3f(2.0f, 1.0f, 0.0f), 1.0f, Vec3f(4.0f)}};
  const Film film = render(job, Silent());
  const std::size_t middle = film.index(24, 12);
  CHECK(film.radiance[middle].x == 4.0f);
  CHECK(film.facts[middle].part == static_cast<std::uint8_t>(trace::Part::kLamp));
  CHECK(film.facts[middle].depth_mm == Approx(9.0f).epsilon(0.01));
  CHECK(film.facts[middle].normal.z > 0.9f);
}

TEST_CASE("Coverage sums to the area of the silhouette", "[render]") {
  const test::Ball ball(Vec3f(0.1f, 0.05f, 0.0f), 1.0f);
  RenderJob job;
  job.shell = &ball;
  job.camera = test::camera_from_above(48, 2.6);
  job.samples_per_pixel = 64;
  const Film film = render(job, Silent());
  double area = 0.0;
  int edges = 0;
  for (const float c : film.coverage) {
    area += static_cast<double>(c) * job.camera.mm_per_px * job.camera.mm_per_px;
    edges += c > 0.0f && c < 1.0f;
  }
  // Some 300 edge pixels, each with an error below 0.5 / sqrt(64) of a pixel even if sampled at random.
  const double error = std::sqrt(static_cast<double>(edges)) * 0.0625 * job.camera.mm_per_px * job.camera.mm_per_px;
  CHECK(std::abs(area - kPi) < 4.0 * error);
  CHECK(edges > 100);
}

TEST_CASE("Facts are those of the ray through the pixel's centre", "[render]") {
  const test::Ball ball(Vec3f(0.0f), 1.0f, trace::Part::kInterior);
  for (const bool mirror : {false, true}) {
    RenderJob job;
    job.shell = &ball;
    job.camera = test::camera_from_above(33, 2.6, 5.0);
    job.camera.page = frame_around(Vec3(0.3, 0.5, 0.8).normalized());
    if (mirror) job.camera.page.x = -job.camera.page.x;
    job.materials = test::of_albedo(0.2f);
    job.materials.interior = Vec3f(0.6f, 0.4f, 0.3f);
    job.samples_per_pixel = 2;
    const Film film = render(job, Silent());
    for (int y = 0; y < 33; ++y)
      for (int x = 0; x < 33; ++x) {
        const double px = (x - 16) * 2.6 / 33, py = (16 - y) * 2.6 / 33, rest = 1.0 - px * px - py * py;
        const PixelFacts& f = film.facts[film.index(x, y)];
        if (std::abs(rest) < 0.02) continue;  // too near the outline for the tolerances below
        if (rest < 0.0) {
          CHECK(f.part == 0);
          continue;
        }
        CHECK(f.part == 2);
        CHECK(f.depth_mm == Approx(5.0 - std::sqrt(rest)).epsilon(1e-5));
        CHECK(f.normal.x == Approx(px).margin(1e-5));
        CHECK(f.normal.y == Approx(py).margin(1e-5));
        CHECK(f.normal.z == Approx(std::sqrt(rest)).margin(1e-5));
        CHECK(f.albedo == Vec3f(0.6f, 0.4f, 0.3f));
        CHECK(f.turn == 1.5f);
        CHECK(f.around_deg == 30.0f);
      }
  }
}

TEST_CASE("A cut face prints as its stated colour, whatever the light", "[render]") {
  const test::Card card(Vec3f(0.0f), Vec3f(0, 0, 1), 5.0f, trace::Part::kCutFace);
  const int bytes[][3] = {{255, 255, 255}, {0, 0, 0}, {200, 30, 99}, {243, 250, 1}};
  for (const auto& rgb : bytes) {
    RenderJob job;
    job.shell = &card;
    job.camera = test::camera_from_above(4, 1.0);
    job.lighting = light_page(test::page_light(135.0, 45.0, 12.0, 0.35), {}, job.camera.page);
    job.materials.section_display = Vec3f(shaders_cpu::srgb_decode_bytes(rgb[0], rgb[1], rgb[2]));
    const Film film = render(job, Silent());
    for (const Vec3f& c : film.radiance)
      for (int k = 0; k < 3; ++k)
        CHECK(std::lround(255.0 * shaders_cpu::srgb_encode(shaders_cpu::tone(static_cast<double>(c[k])))) == rgb[k]);
  }
}

TEST_CASE("The noise estimate tells the true scatter of the pixels", "[render]") {
  // Sixteen renders with different seeds: the root mean square over pixels of their standard deviation is the truth.
  constexpr int kSeeds = 16;
  for (const int samples : {8, 64}) {
    Studio studio(24, samples);
    studio.job.lighting.lamps.clear();  // the rim of a bright lamp in view would drown all other pixels
    std::vector<test::Mean> pixels(24 * 24);
    test::Mean claimed_square;
    std::vector<bool> covered(pixels.size(), false);
    for (int s = 0; s < kSeeds; ++s) {
      studio.job.seed = static_cast<std::uint64_t>(100 + s);
      const Film film = render(studio.job, Silent());
      claimed_square.add(film.noise * film.noise);
      for (std::size_t i = 0; i < pixels.size(); ++i) {
        pixels[i].add(static_cast<double>(luminance(film.radiance[i])));
        if (film.coverage[i] > 0.0f) covered[i] = true;
      }
    }
    double square = 0.0;
    int count = 0;
    for (std::size_t i = 0; i < pixels.size(); ++i)
      if (covered[i]) {
        square += pixels[i].variance();
        ++count;
      }
    const double truth = std::sqrt(square / count), claimed = std::sqrt(claimed_square.value());
    INFO("samples " << samples << ": claimed " << claimed << ", true " << truth);
    CHECK(claimed == Approx(truth).epsilon(0.05));
  }
}

TEST_CASE("More samples bring less noise, faster than independent ones", "[render]") {
  Studio few(32, 16), many(32, 256);
  few.job.lighting.lamps.clear();
  many.job.lighting.lamps.clear();
  CHECK(render(many.job, Silent()).noise < render(few.job, Silent()).noise / 4.5);
}

TEST_CASE("Samples are rounded up to a power of two of at least 2", "[render]") {
  CHECK(samples_taken(-3) == 2);
  CHECK(samples_taken(1) == 2);
  CHECK(samples_taken(48) == 64);
  CHECK(samples_taken(64) == 64);
  CHECK(samples_taken(65) == 128);
  Studio studio(8, 5);
  const Film film = render(studio.job, Silent());
  CHECK(film.mean_samples == 8.0);
  CHECK(film.max_samples == 8.0);
  CHECK(film.rays_camera == 64u * (8u + 1u));  // all pixels lie within the bounds; one more ray each for the facts
}

TEST_CASE("Progress is told within (0, 1] and ends at 1 once", "[render]") {
  const Recorder recorder;
  render(Studio(40, 2).job, recorder);
  CHECK(recorder.calls == 9);
  CHECK(recorder.ends == 1);
  CHECK(recorder.out_of_range == 0);
}

TEST_CASE("An empty scene or an empty picture is no error", "[render]") {
  const test::Void nothing;
  RenderJob job;
  job.shell = &nothing;
  job.camera = test::camera_from_above(8, 1.0);
  const Film film = render(job, Silent());
  CHECK(film.noise == 0.0);
  CHECK(std::all_of(film.coverage.begin(), film.coverage.end(), [](float c) { return c == 0.0f; }));
  CHECK(std::all_of(film.radiance.begin(), film.radiance.end(), [](const Vec3f& c) { return c == Vec3f(0.0f); }));
  job.camera.width_px = job.camera.height_px = 0;
  CHECK(render(job, Silent()).size() == 0);
}

TEST_CASE("Pixels whose noise would be seen take more samples, others do not, and the light stays the same", "[render]") {
  // A pale ball within reach of a small strong lamp: even where the whole lamp is seen, noisy in the half shadow.
  const test::Ball ball(Vec3f(0.0f), 1.0f);
  RenderJob job;
  job.shell = &ball;
  job.camera = test::camera_from_above(24, 2.4);
  job.lighting = test::white_dome();
  job.materials = test::of_albedo(0.8f);
  job.samples_per_pixel = 16;
  job.most_samples = 1024;
  const Film even = render(job, Silent());  // no noise under an even dome but at the outline, which does not count
  CHECK(even.mean_samples == 16.0);
  CHECK(even.max_samples == 16.0);

  job.lighting.dome.radiance = Vec3f(0.0f);
  job.lighting.lamps.push_back({Vec3f(2.4f, 0.0f, 1.2f), 1.0f, Vec3f(3.0f)});  // beside the picture
  const Film more = render(job, Silent());
  CHECK(more.max_samples > 64.0);
  CHECK(more.mean_samples > 16.0);
  CHECK(more.mean_samples < 0.7 * more.max_samples);
  job.most_samples = 0;
  const Film base = render(job, Silent());
  CHECK(base.max_samples == 16.0);
  // Against a picture of many samples: no pixel off by more than four times the noise that may be seen, on the scale of print.
  job.samples_per_pixel = 8192;
  const Film reference = render(job, Silent());
  const auto printed = [](const Vec3f& c) { return shaders_cpu::srgb_encode(shaders_cpu::tone(static_cast<double>(c.y))); };
  double bias = 0.0, error = 0.0, base_error = 0.0;
  for (std::size_t i = 0; i < reference.size(); ++i) {
    if (reference.coverage[i] < 1.0f) continue;
    const double off = printed(more.radiance[i]) - printed(reference.radiance[i]);
    CHECK(std::abs(off) < 4.0 * kSeenNoise);
    bias += off / static_cast<double>(reference.size());
    error += off * off;
    base_error += std::pow(printed(base.radiance[i]) - printed(reference.radiance[i]), 2);
  }
  CHECK(error < 0.3 * base_error);
  CHECK(std::abs(bias) < 0.1 * kSeenNoise);
}
