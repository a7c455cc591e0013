// SPDX-License-Identifier: Apache-2.0
// The EXR file: its layers as the contract of outputs lists them, in place and unfiltered.
#include "plate/image_exr.h"

#include "plate/ball_shell.h"
#include "support/catch.h"
#include "support/independent_reader.h"
#include "support/program.h"
#include "support/read_image.h"

#include <algorithm>
#include <cmath>
#include <string>

namespace whorl::plate {
namespace {

struct Rendered {
  specimen::Specimen specimen = test_plate::demo_specimen(72.0);
  FigurePlan plan;
  std::vector<transport::Film> films;
  PictureTags tags;

  Rendered() {
    const auto balls = test_plate::coil_of_balls(specimen, 24.0);
    const auto views = views_of(specimen);
    plan = plan_figure(specimen, views, test_plate::extents_of(balls, views));
    films = test_plate::films_of(balls, plan);
    tags.resolution_ppi = 72.0;
    tags.software = "Whorlwright";
  }
};

}  // namespace

TEST_CASE("exrheader lists the layers of the contract with their types, the density in inches and no date", "[plate][exr]") {
  const Rendered shell;
  const support::ScratchFolder folder;
  const auto path = folder.path() / "figure.exr";
  write_exr(path, shell.plan, shell.films, shell.tags);
  const auto opinion = support::ask("exrheader", path);
  if (!opinion) return;
  INFO(opinion->words);
  CHECK(opinion->code == 0);
  for (const char* layer : {"R", "G", "B", "A", "albedo.R", "albedo.G", "albedo.B", "part", "panel"})
    CHECK(opinion->words.find("    " + std::string(layer) + ", 16-bit floating-point") != std::string::npos);
  for (const char* layer : {"Z", "N.X", "N.Y", "N.Z", "turn", "around"})
    CHECK(opinion->words.find("    " + std::string(layer) + ", 32-bit floating-point") != std::string::npos);
  CHECK(opinion->words.find("xDensity (type float): 72") != std::string::npos);
  CHECK(opinion->words.find("pixelAspectRatio (type float): 1") != std::string::npos);
  CHECK(opinion->words.find("compression (type compression): zip, multi-scanline blocks") != std::string::npos);
  CHECK(opinion->words.find("\"    :  :     :  :  \"") != std::string::npos);
}

TEST_CASE("Each panel's light and facts stand in its rectangle of the EXR, and nothing stands outside", "[plate][exr]") {
  const Rendered shell;
  const support::ScratchFolder folder;
  const auto path = folder.path() / "figure.exr";
  write_exr(path, shell.plan, shell.films, shell.tags);
  const support::ReadImage image = support::read_image(path);
  REQUIRE(image.width == shell.plan.width);
  REQUIRE(image.height == shell.plan.height);
  REQUIRE(image.channels.size() == 15);

  bool light_close = true, facts_equal = true, outside_empty = true;
  const auto close_to_half = [](float stored, float given) {  // half a unit in the last place of a half
    return std::abs(stored - given) <= 5e-4f * std::abs(given) + 1e-7f;
  };
  const std::size_t r = image.channel("R"), a = image.channel("A"), z = image.channel("Z"), nx = image.channel("N.X"),
                    green = image.channel("albedo.G"), turn = image.channel("turn"), around = image.channel("around"),
                    part = image.channel("part"), number = image.channel("panel");
  for (int y = 0; y < image.height; ++y)
    for (int x = 0; x < image.width; ++x) {
      const auto in = [x, y](const FigurePanel& p) {
        return x >= p.rect.x && x < p.rect.right() && y >= p.rect.y && y < p.rect.bottom();
      };
      const auto found = std::find_if(shell.plan.panels.begin(), shell.plan.panels.end(), in);
      if (found == shell.plan.panels.end()) {
        for (std::size_t c = 0; c < 15; ++c) outside_empty = outside_empty && image.at(x, y, c) == 0.0f;
        continue;
      }
      const std::size_t p = static_cast<std::size_t>(found - shell.plan.panels.begin());
      const transport::Film& film = shell.films[p];
      const std::size_t at = film.index(x - found->rect.x, y - found->rect.y);
      const transport::PixelFacts& facts = film.facts[at];
      light_close = light_close && close_to_half(image.at(x, y, r), film.radiance[at].x) &&
                    close_to_half(image.at(x, y, a), film.coverage[at]) &&
                    close_to_half(image.at(x, y, green), facts.albedo.y);
      facts_equal = facts_equal && image.at(x, y, z) == facts.depth_mm && image.at(x, y, nx) == facts.normal.x &&
                    image.at(x, y, turn) == facts.turn && image.at(x, y, around) == facts.around_deg &&
                    image.at(x, y, part) == static_cast<float>(facts.part) && image.at(x, y, number) == static_cast<float>(p + 1);
    }
  CHECK(light_close);
  CHECK(facts_equal);
  CHECK(outside_empty);
}

TEST_CASE("The same films give the same EXR bytes", "[plate][exr]") {
  const Rendered shell;
  const support::ScratchFolder folder;
  write_exr(folder.path() / "a.exr", shell.plan, shell.films, shell.tags);
  write_exr(folder.path() / "b.exr", shell.plan, shell.films, shell.tags);
  CHECK(support::read_file(folder.path() / "a.exr") == support::read_file(folder.path() / "b.exr"));
}

TEST_CASE("Light beyond the range of half floats is stored as the largest half, not as infinity", "[plate][exr]") {
  Rendered shell;
  const FigurePanel& panel = shell.plan.panels[0];
  shell.films[0].radiance[shell.films[0].index(1, 1)] = Vec3f(1e9f, 1.0f, 0.0f);
  const support::ScratchFolder folder;
  const auto path = folder.path() / "lamp.exr";
  write_exr(path, shell.plan, shell.films, shell.tags);
  CHECK(support::read_image(path).at(panel.rect.x + 1, panel.rect.y + 1, "R") == 65504.0f);
}

}  // namespace whorl::plate
