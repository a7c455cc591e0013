// SPDX-License-Identifier: Apache-2.0
// What hatching and tints mean, printed on the plate where it has room for that; the caption says it in any case.
#pragma once

#include "plate/figure_plan.h"
#include "plate/ink.h"
#include "specimen/provenance.h"
#include "transport/film.h"

#include <vector>

namespace whorl::plate {

struct LegendEntry {
  specimen::Provenance provenance = specimen::Provenance::kNone;
  PixelRect swatch;  // in the figure
  Ink words;
};

/// One entry for each way of not being observed that some picture shows, in a row at the figure's lower left, clear of pictures, bars
/// and letters. Empty where there is nothing to explain, or no room. `films` as for compose.
std::vector<LegendEntry> legend_of(const FigurePlan& plan, const std::vector<transport::Film>& films);

/// Display-linear tone of a swatch before hatching or tint: that of a shell in the light.
inline constexpr double kSwatchTone = 0.45;

}  // namespace whorl::plate
