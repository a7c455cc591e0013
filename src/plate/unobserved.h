// SPDX-License-Identifier: Apache-2.0
// How a plate draws parts of the shell that were not observed, so that grey print still shows it.
#pragma once

#include "plate/figure_plan.h"
#include "specimen/provenance.h"
#include "transport/film.h"

#include <string>

namespace whorl::plate {

/// Hatching lies in the plane of the paper, at one spacing over all panels: lines that rise to the right where the law interpolates,
/// that fall to the right where it extrapolates, both where a part is assumed. A tint takes colour and contrast away, the more the
/// less is known.
class UnobservedStyle {
 public:
  UnobservedStyle(const FigurePlan& plan, const FigurePanel& panel);

  /// `seen` (display-linear) as it is printed at a pixel of the figure.
  Vec3 drawn(const Vec3& seen, const transport::PixelFacts& facts, int x, int y) const;

 private:
  double line_cover(double across_px) const;

  specimen::Unobserved how_;
  double spacing_px_;
};

/// "Hatching: interpolated parts have lines that rise to the right, ..": what a reader must know; "" where all is drawn alike.
std::string unobserved_words(const FigurePlan& plan);

/// Whether a panel tells the observed from the rest. A radiograph shows all parts behind each other.
bool tells_unobserved(const FigurePlan& plan, const FigurePanel& panel);

}  // namespace whorl::plate
