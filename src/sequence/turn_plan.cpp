// SPDX-License-Identifier: Apache-2.0
// Room for a whole turn at the plate's scale.
#include "sequence/turn_plan.h"

#include "diagnostics/error.h"
#include "plate/views.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::sequence {
namespace {

/// How far the shell reaches from the axis in any azimuth, and along it.
plate::Extents extents_of_turn(const std::vector<Vec3>& points_mm) {
  plate::Extents extents{0.0, 0.0, -1e300, -1e300};
  for (const Vec3& point : points_mm) {
    extents.right = std::max(extents.right, std::hypot(point.x, point.y));
    extents.above = std::max(extents.above, -point.z);  // the apex is at the pole, growth goes down the page
    extents.below = std::max(extents.below, point.z);
  }
  extents.left = extents.right;
  return extents;
}

/// The next even number of whole pixels.
double even(double pixels) { return 2.0 * std::ceil(0.5 * pixels); }

}  // namespace

TurnPlan plan_turn(const specimen::Specimen& specimen, const std::vector<Vec3>& points_mm, int frames) {
  const std::vector<plate::View> views = plate::views_of(specimen);
  std::vector<plate::Extents> extents;
  for (const plate::View& view : views) extents.push_back(plate::extents_in(view, points_mm));
  const plate::FigurePlan figure = plate::plan_figure(specimen, views, extents);

  TurnPlan plan;
  plan.frames = frames;
  plan.resolution_ppi = figure.resolution_ppi;
  plan.paper_scale = figure.common_scale;
  plan.mm_per_pixel = kMmPerInch / figure.resolution_ppi / figure.common_scale;
  plan.extents_mm = extents_of_turn(points_mm);
  plan.lip_rad = kTwoPi * specimen.growth.whorls;
  plan.coiling = specimen.identity.coiling;

  const double margin = std::max(3.0, std::ceil(plate::kQuietMargin / kMmPerInch * figure.resolution_ppi));
  const double half = std::ceil(plan.extents_mm.right / plan.mm_per_pixel) + margin;
  const double above = std::ceil(plan.extents_mm.above / plan.mm_per_pixel) + margin;
  const double below = std::ceil(plan.extents_mm.below / plan.mm_per_pixel) + margin;
  const double width = 2.0 * half, height = even(above + below);
  if (width * height > plate::kMostPixels)
    throw diagnostics::InvalidInput(
        specimen.source,
        {{specimen.plate.width_mm.where,
          fmt::format("a frame of the turn, drawn at the plate's scale, would have {:.0f} x {:.0f} pixels, {:.0f} megapixels, "
                      "and at most {:.0f} are allowed; make `resolution` or `width` smaller, or `columns` larger",
                      width, height, width * height / 1e6, plate::kMostPixels / 1e6)}});
  plan.width = static_cast<int>(width);
  plan.height = static_cast<int>(height);
  plan.pole_px = Vec2(half, above);
  return plan;
}

plate::FigurePlan TurnPlan::figure(int frame) const {
  plate::FigurePanel panel;
  panel.view = plate::make_view(specimen::ViewName::kFree, lip_rad, coiling, azimuth_deg(frame), 0.0);
  panel.extents_mm = extents_mm;
  panel.rect = {0, 0, width, height};
  panel.paper_scale = paper_scale;
  panel.mm_per_pixel = mm_per_pixel;
  panel.pole_px = pole_px;
  plate::FigurePlan plan;
  plan.width = width;
  plan.height = height;
  plan.resolution_ppi = resolution_ppi;
  plan.common_scale = paper_scale;
  plan.panels.push_back(panel);
  return plan;
}

std::vector<int> frames_of_slice(int frames, int part, int of) {
  std::vector<int> slice;
  for (int i = part - 1; i < frames; i += of) slice.push_back(i);
  return slice;
}

}  // namespace whorl::sequence
