// SPDX-License-Identifier: Apache-2.0
// Films, letters and bars become the one picture that is printed.
#pragma once

#include "plate/figure_plan.h"
#include "plate/picture.h"
#include "transport/film.h"

#include <vector>

namespace whorl::plate {

/// Radiance -> tone curve -> over the ground in display-linear light -> sRGB. On white or black ground 8 bits without alpha; on
/// clear ground 16 bits with straight alpha. Ink (letters, bars, labels) is black, on black ground white.
/// One film a panel, of its size; a film of no size leaves its panel empty.
/// Throws FileTrouble where the typeface is missing, std::logic_error for films that do not go with the plan.
Picture compose(const FigurePlan& plan, const std::vector<transport::Film>& films, specimen::Background ground);

/// Indices of panels whose letter covers some of a picture, which a reader might take for a mark on the shell.
std::vector<int> letters_over_pictures(const FigurePlan& plan, const std::vector<transport::Film>& films);

}  // namespace whorl::plate
