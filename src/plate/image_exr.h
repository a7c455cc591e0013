// SPDX-License-Identifier: Apache-2.0
// Writes the figure's light and layers, as laid out, as OpenEXR.
#pragma once

#include "plate/figure_plan.h"
#include "plate/picture.h"
#include "transport/film.h"

#include <filesystem>
#include <vector>

namespace whorl::plate {

/// Scene-linear R G B A, premultiplied, without ground or ink, and the layers Z, N, albedo, turn, around, part, panel and, where the
/// specimen states what is preserved, provenance; outside the panels all are 0. The same films and tags give the same bytes. Appears whole or not at all. Throws FileTrouble.
/// `films` as for compose.
void write_exr(const std::filesystem::path& path, const FigurePlan& plan, const std::vector<transport::Film>& films,
               const PictureTags& tags);

}  // namespace whorl::plate
