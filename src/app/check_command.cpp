// SPDX-License-Identifier: Apache-2.0
// The command 'check': is the scene file valid, and what does it state?
#include "app/commands.h"

#include "compile/compile.h"
#include "compile/compile.h"
#include "diagnostics/error.h"
#include "specimen/key_table.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <cstdio>

namespace whorl::app {
namespace {

using namespace specimen;

/// The scene file's own word for an enumeration's value; the key table lists the words in the enumeration's order.
template <class Enumeration>
std::string_view word_of(std::string_view table, std::string_view key, Enumeration value) {
  return words_of(*find_key(table, key)).at(static_cast<std::size_t>(value));
}

std::string expansion_text(const Stages& stages) {
  std::string text = fmt::format("W {}", stages.front().W);
  for (std::size_t i = 1; i < stages.size(); ++i) text += fmt::format(", {} at whorl {}", stages[i].W, stages[i].whorl);
  return text;
}

std::string view_text(const Panel& panel) {
  if (panel.view.value == ViewName::kFree) {
    return fmt::format("azimuth {} elevation {}", panel.azimuth_deg, panel.elevation_deg);
  }
  return std::string(word_of("panel", "view", panel.view.value));
}

std::string summary(const Specimen& read, const scene::Scene& compiled) {
  const Plate& plate = read.plate;
  std::string kind(keys_of("size").at(static_cast<std::size_t>(read.size.kind.value)));
  for (char& letter : kind) letter = letter == '_' ? ' ' : letter;
  std::vector<std::string> views;
  for (const Panel& panel : plate.panels) views.push_back(view_text(panel));
  return fmt::format("{}: valid\n", read.source == "-" ? "standard input" : read.source) +
         fmt::format("  specimen  {}, {}\n", read.identity.name.value,
                     word_of("specimen", "coiling", read.identity.coiling.value)) +
         fmt::format("  growth    {} whorls, {}, D {}, T {}\n", read.growth.whorls.value,
                     expansion_text(read.growth.W.value), read.growth.D.value, read.growth.T.value) +
         fmt::format("  size      {} {} mm, which makes the shell {:.2f} mm high\n", kind, read.size.mm.value,
                     compiled.height_mm) +
         fmt::format("  plate     {} mm wide at {} pixels per inch, {}\n", plate.width_mm.value,
                     plate.resolution_ppi.value, word_of("plate", "quality", plate.quality.value)) +
         fmt::format("  panels    {}\n", fmt::join(views, ", "));
}

}  // namespace

int check_command(const Options& options, Progress&) {
  const Specimen read = read_scene_file(options.scene);
  compile::compile_scene(read);  // what only the geometry shows: walls, lamps, the axis
  const scene::Scene compiled = compile::compile_scene(read);
  std::fputs(summary(read, compiled).c_str(), stdout);
  return static_cast<int>(diagnostics::ExitCode::kDone);
}

}  // namespace whorl::app
