// SPDX-License-Identifier: Apache-2.0
// The globose demo shell, bare and with beads all over it.
#include "attached_bench.h"

#include "cells_contender.h"
#include "compile/compile.h"
#include "race.h"
#include "specimen/scene_file.h"
#include "stopwatch.h"
#include "trace/united_solid.h"

#include <fmt/format.h>

#include <cstdio>
#include <fstream>
#include <iterator>
#include <memory>

namespace whorl::bench {
namespace {

constexpr double kToleranceOfHeight = 1e-5, kOffsetOfHeight = 1e-4;

struct Crowd {
  const char* name;
  int rows, per_whorl;
};
// Of four whorls; two in five of so many stand where the next whorl has its lumen, and are left out.
constexpr Crowd kCrowds[] = {{"bare", 0, 0}, {"100,000 beads", 220, 200}, {"1,000,000 beads", 700, 625}};

Shape shape_of(const Crowd& crowd) {
  std::ifstream file(std::string(WHORL_SCENE_DIR) + "/globose.toml");
  std::string text{std::istreambuf_iterator<char>(file), {}};
  if (crowd.rows > 0)
    text += fmt::format("\n[[attached]]\nshape = \"bead\"\nrows = {}\nper_whorl = {}\nwidth = 360\nat = 0\nheight = 0.03\nbreadth = 0.06\n"
                        "stagger = 0.5\ncolour = \"#604030\"\n",
                        crowd.rows, crowd.per_whorl);
  Shape shape;
  shape.name = crowd.name;
  const Stopwatch watch;
  shape.specimen = specimen::parse_scene(text, "globose");
  shape.scene = std::make_unique<scene::Scene>(compile::compile_scene(shape.specimen));
  shape.field = std::make_unique<field::Field>(*shape.scene);
  shape.seconds = watch.seconds();
  return shape;
}

class UnitedContender final : public Contender {
 public:
  UnitedContender(const trace::EmbreeSolid& shell, const trace::AttachedSolids* attached) : all_(shell, attached) {}
  bool closest(const trace::Ray& ray, Found& found) const override {
    trace::Hit hit;
    if (!all_.closest(ray, hit)) return false;
    found = {hit.t, hit.normal};
    return true;
  }
  bool occluded(const trace::Ray& ray) const override { return all_.occluded(ray); }

 private:
  trace::UnitedSolid all_;
};

}  // namespace

void run_attached(std::size_t pixels, int rounds) {
  std::printf("The globose demo shell with beads all over it: rays a second by processor time, each shell with its own rays (scattered and\n"
              "shadow rays start on what the camera's rays met).\n%-18s%10s%10s%10s%10s%10s |%9s%11s%9s | ratio to bare\n", "", "stand",
              "left out", "scene s", "build s", "MB", "camera", "scattered", "shadow");
  Result bare;
  for (const Crowd& crowd : kCrowds) {
    const Shape shape = shape_of(crowd);
    const Stopwatch watch;
    const CellsContender cells(*shape.field, {kToleranceOfHeight * shape.height_mm(), false});
    const double cells_s = watch.seconds();
    std::unique_ptr<trace::AttachedSolids> attached;
    if (crowd.rows > 0) attached = std::make_unique<trace::AttachedSolids>(*shape.field);
    const double all_s = watch.seconds();
    const UnitedContender united(cells.solid(), attached.get());
    const RaySets rays = make_ray_sets(shape, united, pixels, kOffsetOfHeight * shape.height_mm());
    const Result r = race({&united}, rays, rounds).front();
    if (crowd.rows == 0) bare = r;
    std::printf("%-18s%10zu%10zu%10.2f%10.2f%10.1f |%9.2f%11.2f%9.2f |", crowd.name, attached ? attached->size() : 0,
                attached ? attached->left_out() : 0, shape.seconds, crowd.rows > 0 ? all_s - cells_s : cells_s,
                1e-6 * static_cast<double>(attached ? attached->bytes() : cells.bytes), 1e-6 * r.rays_per_second[0],
                1e-6 * r.rays_per_second[1], 1e-6 * r.rays_per_second[2]);
    for (std::size_t k = 0; k < kKinds; ++k) std::printf("%6.2f", r.rays_per_second[k] / bare.rays_per_second[k]);
    std::printf("\n");
    std::fflush(stdout);
  }
}

}  // namespace whorl::bench
