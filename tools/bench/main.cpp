// SPDX-License-Identifier: Apache-2.0
// The benchmark's program; tools/bench/run builds and calls it.
#include "attached_bench.h"
#include "cells_contender.h"
#include "fit_time.h"
#include "portal_bench.h"
#include "race.h"
#include "report.h"
#include "triangles_contender.h"

#include "math/parallel.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <cstring>
#include <exception>
#include <string>

namespace whorl::bench {
namespace {

// Tolerances of cells: the trial's, and what a plate asks for (2e-6 of the height, see plate/studio.cpp).
constexpr double kTrialTolerance = 1e-4, kPlateTolerance = 2e-6;
// Rays from the surface start this far above it, in half-breadths: clear of the coarse mesh's error, too.
constexpr double kOffset = 2e-3;
constexpr double kCoarseVoxel = 1.0 / 30.0;  // in half-breadths
constexpr std::size_t kExactEvery = 16;

struct Settings {
  std::string shape;       // "" for all
  bool json = false, mesh = true, exact = true;
  std::size_t pixels = 700'000;  // a view, of three
  int rounds = 3;
  double most_triangles = 12e6;  // what limits time and memory
  std::size_t error_hits = 20'000;
};

void say(const std::string& what) { std::fprintf(stderr, "%s\n", what.c_str()); }

nlohmann::ordered_json run_shape(const ShapeName& name, const Settings& settings) {
  const Shape shape = load_shape(name);
  const field::Field& field = *shape.field;
  const double unit = shape.half_breadth_mm();
  say(fmt::format("{}: cells", shape.name));
  CellsContender plate(field, {kPlateTolerance * shape.height_mm(), false});
  plate.name = "cells at 2e-6 of the height";
  CellsContender trial(field, {kTrialTolerance * unit, false});
  trial.name = "cells at 1e-4 half-breadths";
  std::vector<const Contender*> contenders{&plate, &trial};

  say(fmt::format("{}: rays", shape.name));
  const RaySets rays = make_ray_sets(shape, plate, settings.pixels, kOffset * unit);

  std::unique_ptr<TrianglesContender> fine, coarse;
  if (settings.mesh) {
    say(fmt::format("{}: coarse mesh", shape.name));
    coarse = std::make_unique<TrianglesContender>(mesh_solid(field, plate.solid().cells(), kCoarseVoxel * unit));
    coarse->name = "Embree triangles, coarse";
    Result of_coarse, of_cells;
    measure_error(field, *coarse, rays, settings.error_hits, of_coarse);
    measure_error(field, trial, rays, settings.error_hits, of_cells);
    // A mesh errs by the square of its voxel, and its triangles are as many as the voxel's square goes into the area.
    const double wanted = std::sqrt(of_coarse.error_median_mm / of_cells.error_median_mm);
    const double finer = std::min(wanted, std::sqrt(settings.most_triangles / static_cast<double>(coarse->elements)));
    say(fmt::format("{}: fine mesh, voxels of 1/{:.0f} half-breadth ({})", shape.name, finer / kCoarseVoxel,
                    finer < wanted ? "as fine as the limit of triangles allows" : "to the cells' error"));
    fine = std::make_unique<TrianglesContender>(mesh_solid(field, plate.solid().cells(), kCoarseVoxel * unit / finer));
    fine->name = "Embree triangles";
    contenders.push_back(fine.get());
    contenders.push_back(coarse.get());
  }
  std::unique_ptr<CellsContender> exact;
  if (settings.exact) {
    exact = std::make_unique<CellsContender>(field, trace::SolidOptions{kTrialTolerance * unit, true});
    exact->name = "--exact in the cells at 1e-4";
    exact->every = kExactEvery;
    contenders.push_back(exact.get());
  }

  say(fmt::format("{}: {} camera, {} scattered, {} shadow rays, {} rounds", shape.name, rays.camera.size(), rays.scattered.size(),
                  rays.shadow.size(), settings.rounds));
  std::vector<Result> results = race(contenders, rays, settings.rounds);
  for (std::size_t i = 0; i < contenders.size(); ++i)
    measure_error(field, *contenders[i], rays, settings.error_hits, results[i]);
  if (!settings.json) std::printf("%s\n", table_text(shape, contenders, results).c_str());
  std::fflush(stdout);
  return table_json(shape, contenders, results);
}

int usage() {
  std::fputs(
      "usage: tools/bench/run [race] [--shape tall|globose|planispiral] [--json] [--no-mesh] [--no-exact] [--pixels N] [--rounds N]\n"
      "                             [--triangles N]\n"
      "       tools/bench/run fit [--json] [--rounds N]            one specimen with ten measurements\n"
      "       tools/bench/run attached [--pixels N] [--rounds N]   a hundred thousand and a million elements against the bare shell\n"
      "       tools/bench/run portal                               the mouth as a portal: error at equal time\n",
      stderr);
  return 2;
}

int run(int argc, char** argv) {
  Settings settings;
  std::string what = "race";
  int first = 1;
  if (argc > 1 && argv[1][0] != '-') what = argv[first++];
  if (what != "race" && what != "fit" && what != "attached" && what != "portal") return usage();
  for (int i = first; i < argc; ++i) {
    const std::string word = argv[i];
    const char* value = i + 1 < argc ? argv[i + 1] : nullptr;
    if (word == "--json") settings.json = true;
    else if (word == "--no-mesh") settings.mesh = false;
    else if (word == "--no-exact") settings.exact = false;
    else if (value == nullptr) return usage();
    else if (word == "--shape") settings.shape = value, ++i;
    else if (word == "--pixels") settings.pixels = std::strtoull(value, nullptr, 10), ++i;
    else if (word == "--rounds") settings.rounds = std::atoi(value), ++i;
    else if (word == "--triangles") settings.most_triangles = std::atof(value), ++i;
    else return usage();
  }
  if (settings.pixels < 10'000 || settings.rounds < 1 || !(settings.most_triangles >= 1e5)) return usage();
  if (what == "attached") return run_attached(settings.pixels, settings.rounds), 0;
  if (what == "portal") return run_portal(), 0;
  nlohmann::ordered_json all = {{"threads", thread_count()}, {"shapes", nlohmann::ordered_json::array()}};
  if (what == "fit") {
    all["fit"] = time_fit(settings.rounds);
    std::printf("%s\n", settings.json ? all.dump(2).c_str() : fit_text(all["fit"]).c_str());
    return 0;
  }
  if (!settings.json)
    std::printf("Millions of rays a second on %d threads (the best of %d rounds); then the ratio to the first row, within the same\n"
                "round; errors of hits in half-breadths of the aperture and, under *, in 1e-5 of the height; share of scattered\n"
                "and shadow rays that hit. The cells' rays bring back position, normal, part, turn and section angle, the\n"
                "triangles' position and normal.\n\n",
                thread_count(), settings.rounds);
  for (const ShapeName& name : kShapes)
    if (settings.shape.empty() || settings.shape == name.file) all["shapes"].push_back(run_shape(name, settings));
  if (all["shapes"].empty()) return usage();
  std::printf("%s", settings.json ? (all.dump(2) + "\n").c_str() : trial_text().c_str());
  return 0;
}

}  // namespace
}  // namespace whorl::bench

int main(int argc, char** argv) {
  try {
    return whorl::bench::run(argc, argv);
  } catch (const std::exception& error) {
    std::fprintf(stderr, "error: %s\n", error.what());
    return 1;
  }
}
