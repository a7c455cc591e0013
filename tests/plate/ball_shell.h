// SPDX-License-Identifier: Apache-2.0
// A stand-in for a shell: balls along a coil, with closed forms for what a picture of them shows.
#pragma once

#include "plate/figure_plan.h"
#include "specimen/specimen.h"
#include "transport/film.h"

#include <vector>

namespace whorl::test_plate {

struct Ball {
  Vec3 centre_mm;  // in the frame of the dextral solid
  double radius_mm = 1.0;
  Vec3f albedo{0.8f, 0.7f, 0.55f};
};

/// An invented specimen with a plate of three views at the given resolution.
specimen::Specimen demo_specimen(double resolution_ppi = 150.0);
void add_panel(specimen::Specimen& specimen, specimen::ViewName view, double scale = 1.0);

/// Balls along the coil of `specimen`, about `height_mm` high; the last, darker one marks the aperture.
std::vector<Ball> coil_of_balls(const specimen::Specimen& specimen, double height_mm);

/// Silhouettes of the balls; a cut view counts the halves that are left.
std::vector<plate::Extents> extents_of(const std::vector<Ball>& balls, const std::vector<plate::View>& views);

/// Matt balls in light from the upper left, 4 x 4 samples a pixel on a box filter.
transport::Film film_of(const std::vector<Ball>& balls, const plate::FigurePanel& panel);
std::vector<transport::Film> films_of(const std::vector<Ball>& balls, const plate::FigurePlan& plan);

}  // namespace whorl::test_plate
