// SPDX-License-Identifier: Apache-2.0
// Views straight into the mouth, by the light of the page and by lamps.
#include "portal_bench.h"

#include "compile/compile.h"
#include "plate/views.h"
#include "specimen/scene_file.h"
#include "shaders_cpu/tone/srgb.h"
#include "stopwatch.h"
#include "trace/embree_solid.h"
#include "transport/materials.h"
#include "transport/path_tracer.h"

#include <cmath>
#include <cstdio>
#include <string>

namespace whorl::bench {
namespace {

constexpr int kPixels = 48, kSamples = 64, kRepeats = 4, kReference = 2048;

struct Case {
  const char *file, *name;
  bool lamps;
  float interior;  // albedo of the inside
};
constexpr Case kCases[] = {{"lit_within", "lamp and page, inside 0.8", true, 0.8f}, {"lit_within", "page, inside 0.8", false, 0.8f},
                           {"lit_within", "page, inside 0.4", false, 0.4f},         {"lit_within", "page, inside 0.2", false, 0.2f},
                           {"lit_within", "page, inside 0.05", false, 0.05f},       {"tall", "tall, page, inside 0.2", false, 0.2f},
                           {"tall", "tall, page, inside 0.05", false, 0.05f}};

double squared_error(const transport::Film& film, const transport::Film& reference) {
  double sum = 0.0;
  for (std::size_t i = 0; i < film.size(); ++i) {
    const Vec3f d = film.radiance[i] - reference.radiance[i];
    sum += static_cast<double>(d.dot(d)) / 3.0;
  }
  return sum / static_cast<double>(film.size());
}

}  // namespace

void run_portal() {
  std::printf("Views into the mouth, %d x %d pixels, %d samples, mean of %d pictures against one of %d samples. Error at equal time:\n"
              "squared error times processor time; the last column is without the portal over with it (above 1: the portal pays).\n"
              "%-30s%14s%12s%14s%12s%12s%14s\n",
              kPixels, kPixels, kSamples, kRepeats, kReference, "", "error with", "seconds", "error without", "seconds", "time ratio", "equal time");
  for (const Case& c : kCases) {
    const specimen::Specimen specimen = specimen::read_scene_file(std::string(WHORL_SCENE_DIR) + "/" + c.file + ".toml");
    const scene::Scene scene = compile::compile_scene(specimen);
    const field::Field field(scene);
    const trace::EmbreeSolid solid(field, {1e-5 * scene.height_mm, false});
    const plate::View view = plate::make_view(specimen::ViewName::kApertural, scene.law.theta_lip, specimen.identity.coiling);
    std::vector<transport::PlacedLamp> lamps;
    if (c.lamps)
      for (const scene::Lamp& lamp : scene.lamps) lamps.push_back({lamp.centre, lamp.radius, lamp.strength, lamp.temperature_k});
    transport::RenderJob job;
    job.shell = &solid;
    job.lighting = transport::light_page(specimen.light, lamps, view.fixed_page);
    specimen::Specimen coloured = specimen;
    const auto grey = static_cast<unsigned char>(std::lround(255.0 * shaders_cpu::srgb_encode(static_cast<double>(c.interior))));
    coloured.look.interior.value = {grey, grey, grey};
    job.materials = transport::make_materials(field, coloured);
    job.camera.page = view.page_to_shell;
    job.camera.width_px = job.camera.height_px = kPixels;
    job.camera.mm_per_px = 1.6 * std::max(scene.mouth.half_u.length(), scene.mouth.half_v.length()) / kPixels;
    job.camera.anchor_mm = scene.mouth.centre;
    job.camera.anchor_px = Vec2(0.5 * kPixels);
    job.camera.front_mm = 2.0 * scene.height_mm;
    const shaders_cpu::Portal portal{scene.mouth.centre, scene.mouth.half_u, scene.mouth.half_v, scene.mouth.outwards};
    job.lighting.portal = portal;
    job.samples_per_pixel = kReference;
    job.seed = 999;
    const transport::Film reference = transport::render(job, transport::Silent());
    job.samples_per_pixel = kSamples;
    double error[2] = {}, seconds[2] = {};
    for (int i = 0; i < kRepeats; ++i)
      for (const int with : {1, 0}) {
        job.seed = static_cast<std::uint64_t>(i + 1);
        if (with) job.lighting.portal = portal;
        else job.lighting.portal.reset();
        const Stopwatch watch;
        const transport::Film film = transport::render(job, transport::Silent());
        seconds[with] += watch.processor_seconds() / kRepeats;
        error[with] += squared_error(film, reference) / kRepeats;
      }
    std::printf("%-30s%14.3e%12.2f%14.3e%12.2f%12.2f%14.2f\n", c.name, std::sqrt(error[1]), seconds[1], std::sqrt(error[0]), seconds[0],
                seconds[1] / seconds[0], error[0] * seconds[0] / (error[1] * seconds[1]));
    std::fflush(stdout);
  }
}

}  // namespace whorl::bench
