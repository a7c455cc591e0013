// SPDX-License-Identifier: Apache-2.0
// From the scene file's plate to panels with cameras.
#include "plate/figure_plan.h"

#include "diagnostics/error.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace whorl::plate {
namespace {

Stance stance_of(const View& view) {
  if (view.elevation_deg == 0.0) return Stance::kUpright;
  if (std::abs(view.elevation_deg) == 90.0) return Stance::kAlongAxis;
  return Stance::kOblique;
}

/// Width of the widest letter in 9 pt bold, mm on paper: a "W", with its brackets, or two of it after the 26th panel.
double letter_room_mm(specimen::Letters letters, std::size_t count) {
  constexpr double kWidest = 3.2, kBrackets = 2.2;
  if (letters == specimen::Letters::kNone) return 0.0;
  return (count > 26 ? 2.0 : 1.0) * kWidest + (letters == specimen::Letters::kLowerInBrackets ? kBrackets : 0.0);
}

}  // namespace

transport::Camera FigurePanel::camera(double front_mm) const {
  transport::Camera camera;
  camera.page = view.page_to_shell;
  camera.width_px = rect.width;
  camera.height_px = rect.height;
  camera.mm_per_px = mm_per_pixel;
  camera.anchor_mm = Vec3(0.0);
  camera.anchor_px = pole_px;
  camera.front_mm = front_mm;
  return camera;
}

std::vector<View> views_of(const specimen::Specimen& specimen) {
  const double lip_rad = kTwoPi * specimen.growth.whorls.value;
  std::vector<View> views;
  for (const specimen::Panel& panel : specimen.plate.panels)
    views.push_back(make_view(panel, lip_rad, specimen.identity.coiling.value));
  return views;
}

Extents extents_in(const View& view, const std::vector<Vec3>& points_mm) {
  Extents extents;
  bool first = true;
  for (const Vec3& point : points_mm) {
    const Vec3 page = view.page_to_shell.to_frame(point);
    if (view.cut && page.z > 0.0) continue;
    const Extents one{-page.x, page.x, page.y, -page.y, page.y - page.x};
    if (first) extents = one;
    first = false;
    extents.left = std::max(extents.left, one.left);
    extents.right = std::max(extents.right, one.right);
    extents.above = std::max(extents.above, one.above);
    extents.below = std::max(extents.below, one.below);
    extents.upper_left = std::max(extents.upper_left, one.upper_left);
  }
  return extents;
}

std::string panel_letter(int index, specimen::Letters letters) {
  if (letters == specimen::Letters::kNone) return "";
  const char first = letters == specimen::Letters::kUpper ? 'A' : 'a';
  std::string text;
  for (int rest = index; rest >= 0; rest = rest / 26 - 1) text.insert(text.begin(), static_cast<char>(first + rest % 26));
  return letters == specimen::Letters::kLowerInBrackets ? "(" + text + ")" : text;
}

FigurePlan plan_figure(const specimen::Specimen& specimen, const std::vector<View>& views,
                       const std::vector<Extents>& extents_mm) {
  const specimen::Plate& plate = specimen.plate;
  if (views.empty() || views.size() != plate.panels.size() || views.size() != extents_mm.size())
    throw std::logic_error("plan_figure: panels, views and extents must go together, and there must be some");

  LayoutRequest request;
  request.width_mm = plate.width_mm;
  request.resolution_ppi = plate.resolution_ppi;
  request.gap_mm = plate.gap_mm;
  request.columns = plate.columns;
  request.letter_room_mm = letter_room_mm(plate.letters, views.size());
  request.bar_mm = plate.bar_mm;
  request.source = specimen.source;
  request.plate_where = plate.width_mm.where;
  request.bar_where = plate.bar_mm.where;
  for (std::size_t i = 0; i < views.size(); ++i) {
    if (!(extents_mm[i].width() > 0.0 && extents_mm[i].height() > 0.0))
      throw diagnostics::InvalidInput(
          specimen.source,
          {{plate.panels[i].view.where,
            fmt::format("panel {} ({}) shows nothing of the shell; choose another view", i + 1, views[i].label)}});
    request.views.push_back({extents_mm[i], stance_of(views[i]), plate.panels[i].scale});
  }

  const Layout layout = lay_out(request);
  FigurePlan plan;
  plan.width = layout.width;
  plan.height = layout.height;
  plan.resolution_ppi = layout.resolution_ppi;
  plan.common_scale = layout.common_scale;
  plan.bars = layout.bars;
  for (std::size_t i = 0; i < views.size(); ++i) {
    const LayoutPanel& place = layout.panels[i];
    FigurePanel panel;
    panel.view = views[i];
    panel.letter = panel_letter(static_cast<int>(i), plate.letters);
    panel.extents_mm = extents_mm[i];
    panel.rect = place.rect;
    panel.relative_scale = plate.panels[i].scale;
    panel.paper_scale = place.paper_scale;
    panel.mm_per_pixel = place.mm_per_pixel;
    panel.pole_px = Vec2(place.pole_x - place.rect.x, place.pole_y - place.rect.y);
    panel.letter_left = place.letter_left;
    panel.letter_top = place.letter_top;
    plan.panels.push_back(panel);
  }
  return plan;
}

}  // namespace whorl::plate
