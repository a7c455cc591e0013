// SPDX-License-Identifier: Apache-2.0
// The plate's entry point: films in, the figure's five files out.
#pragma once

#include "plate/figure_plan.h"
#include "plate/record.h"
#include "specimen/specimen.h"
#include "transport/film.h"

#include <filesystem>
#include <string>
#include <vector>

namespace whorl::plate {

/// The name of the figure's files without extension: that of the scene file, "figure" for standard input.
std::string figure_stem(const std::string& source);

/// Writes FOLDER/STEM.png, .tif, .exr, .txt and, last, .json; returns their paths in that order. Each appears whole or not
/// at all. `plan` comes from plan_figure, `films` goes with its panels (a film of no size leaves its panel empty).
/// The folder must be there. Throws FileTrouble.
std::vector<std::filesystem::path> write_figure(const FigurePlan& plan, const specimen::Specimen& specimen,
                                                const std::vector<transport::Film>& films, const RunFacts& run,
                                                const std::filesystem::path& folder, const std::string& stem);

}  // namespace whorl::plate
