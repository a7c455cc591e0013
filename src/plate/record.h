// SPDX-License-Identifier: Apache-2.0
// The record: everything that is needed to check a figure, or to draw it again.
#pragma once

#include "plate/figure_plan.h"
#include "specimen/provenance.h"
#include "specimen/specimen.h"
#include "transport/film.h"

#include <nlohmann/json.hpp>

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace whorl::plate {

/// What the plate cannot know by itself.
struct RunFacts {
  std::string version, build;  // of the program
  std::uint64_t seed = 0;
  int threads = 1;
  double seconds_compile = 0.0, seconds_render = 0.0;
  bool exact = false;                                      // primitives traced themselves, no cells
  specimen::Quality quality = specimen::Quality::kPrint;   // as used
  nlohmann::ordered_json measurements;                     // as `measure --json` writes it; null leaves it out
  nlohmann::ordered_json counters;                         // of the solid: cells, primitives, exact_cells ..; an object or null
  std::optional<specimen::ProvenanceShares> provenance;    // measured on the solid, where the specimen states what is preserved
};

/// Keys in a fixed order; all but `seconds` and `threads` depend only on scene, seed and build.
nlohmann::ordered_json make_record(const FigurePlan& plan, const specimen::Specimen& specimen,
                                   const std::vector<transport::Film>& films, const RunFacts& run);

}  // namespace whorl::plate
