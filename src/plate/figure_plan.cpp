// SPDX-License-Identifier: Apache-2.0
// From the scene file's plate to panels with cameras.
#include "plate/figure_plan.h"

#include "diagnostics/error.h"
#include "plate/text_mask.h"

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

std::string sheet_note(const specimen::ContactSheet& sheet, std::size_t index) {
  const std::size_t across = sheet.W.value.size();
  return fmt::format("W {:g}, T {:g}", sheet.W.value[index % across], sheet.T.value[index / across]);
}

/// Behind the letter, on its base line.
void put_label(const specimen::Specimen& specimen, const LayoutRequest& request, const LayoutPanel& place, FigurePanel& panel) {
  const double per_mm = request.resolution_ppi / kMmPerInch;
  constexpr double kSpace = 1.2;  // mm, between letter and label
  panel.label_left = place.letter_left + static_cast<int>(std::lround((request.letter_room_mm > 0.0 ? request.letter_room_mm + kSpace : 0.0) * per_mm));
  panel.label_base = place.letter_top + static_cast<int>(std::lround(kCapHeight * kLetterPoints / 72.0 * request.resolution_ppi));
  const TextMask mask = text_mask(panel.label, kLabelPoints, request.resolution_ppi, Weight::kRegular);
  const int room = place.rect.right() - panel.label_left;
  if (mask.width > room)
    throw diagnostics::InvalidInput(
        specimen.source,
        {{specimen.plate.width_mm.where,
          fmt::format("\"{}\" is {:.1f} mm long in 8 pt, and its panel leaves {:.1f} mm for it; make `width` or the panel's "
                      "`scale` larger, or `columns` or `gap` smaller",
                      panel.label, mask.width / per_mm, std::max(0.0, room / per_mm))}});
}

/// Left picture on the left, for parallel viewing.
void part_pair(const FigurePanel& pair, double spacing_px, std::vector<FigurePanel>& panels) {
  FigurePanel left = pair, right = pair;
  left.view = eye_view(pair.view, Eye::kLeft);
  right.view = eye_view(pair.view, Eye::kRight);
  left.eye = Eye::kLeft;
  right.eye = Eye::kRight;
  // Between the pictures, in proportion to what each has on that side of its pole.
  const Extents& e = pair.extents_mm;
  const double between = std::clamp(e.right / e.width(), 0.0, 1.0);
  const int cut = static_cast<int>(std::lround(pair.pole_px.x + (between - 0.5) * spacing_px));
  left.rect.width = cut;
  right.rect.x += cut;
  right.rect.width -= cut;
  left.pole_px.x -= 0.5 * spacing_px;
  right.pole_px.x += 0.5 * spacing_px - cut;
  right.letter.clear();
  right.label.clear();
  panels.push_back(left);
  panels.push_back(right);
}

}  // namespace

std::vector<specimen::Specimen> sheet_shells(const specimen::Specimen& specimen) {
  std::vector<specimen::Specimen> shells;
  for (const double T : specimen.contact_sheet.T.value)
    for (const double W : specimen.contact_sheet.W.value) {
      specimen::Specimen shell = specimen;
      shell.growth.W.value = {{0.0, W}};
      shell.growth.W_distance.reset();
      shell.growth.W_depth.reset();
      shell.growth.W_section.reset();
      shell.growth.T.value = T;
      shell.preserved.clear();
      shells.push_back(std::move(shell));
    }
  return shells;
}

specimen::Specimen sheet_plate(const specimen::Specimen& specimen) {
  specimen::Specimen plate = specimen;
  const specimen::ContactSheet& sheet = specimen.contact_sheet;
  plate.plate.columns.value = static_cast<int>(sheet.W.value.size());
  plate.plate.letters.value = specimen::Letters::kNone;
  plate.preserved.clear();  // no specimen has those shells
  plate.plate.unobserved.value = specimen::Unobserved::kPlain;
  plate.plate.panels.assign(sheet.W.value.size() * sheet.T.value.size(), specimen.plate.panels.at(0));
  return plate;
}

bool bar_belongs_to(const LayoutBar& bar, const FigurePlan& plan, std::size_t index) {
  const FigurePanel& panel = plan.panels[index];
  if (bar.panel < 0) return panel.relative_scale == 1.0;
  return bar.panel == static_cast<int>(index) || (panel.eye == Eye::kRight && bar.panel + 1 == static_cast<int>(index));
}

std::string pair_label(const FigurePanel& picture) {
  const std::string& label = picture.view.label;
  return label.substr(0, label.size() - (picture.eye == Eye::kLeft ? kLeftEye : kRightEye).size());
}

std::string radiograph_label(const specimen::Radiograph& radiograph) {
  return fmt::format("computed radiograph, {:g} keV", radiograph.energy_kev.value);
}

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
    views.push_back(make_view(panel, specimen.stereo, lip_rad, specimen.identity.coiling.value));
  return views;
}

Extents extents_in(const View& view, const std::vector<Vec3>& points_mm) {
  if (view.stereo_deg > 0.0) {
    Extents wide = extents_in(eye_view(view, Eye::kLeft), points_mm);
    const Extents other = extents_in(eye_view(view, Eye::kRight), points_mm);
    wide.left = std::max(wide.left, other.left);
    wide.right = std::max(wide.right, other.right);
    wide.above = std::max(wide.above, other.above);
    wide.below = std::max(wide.below, other.below);
    return wide;  // with the corner that the left picture leaves to the letter
  }
  Extents extents;
  bool first = true;
  for (const Vec3& point : points_mm) {
    const Vec3 page = view.page_to_shell.to_frame(point);
    if (view.cut && view.fixed_page.to_frame(point).z > 0.0) continue;
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
    request.views.push_back({extents_mm[i], stance_of(views[i]), plate.panels[i].scale,
                             views[i].stereo_deg > 0.0 ? specimen.stereo.spacing_mm.value : 0.0,
                             plate.panels[i].look == specimen::PanelLook::kRadiograph || specimen.contact_sheet.wanted()});
  }

  const Layout layout = lay_out(request);
  FigurePlan plan;
  plan.width = layout.width;
  plan.height = layout.height;
  plan.resolution_ppi = layout.resolution_ppi;
  plan.common_scale = layout.common_scale;
  plan.bars = layout.bars;
  plan.provenance = !specimen.preserved.empty();
  plan.unobserved = plate.unobserved;
  plan.hatch_mm = plate.hatch_mm;
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
    panel.look = plate.panels[i].look;
    panel.shows = plate.panels[i].shows;
    if (specimen.contact_sheet.wanted()) panel.note = sheet_note(specimen.contact_sheet, i);
    if (panel.look == specimen::PanelLook::kRadiograph) panel.label = radiograph_label(specimen.radiograph);
    if (!panel.note.empty()) panel.label = panel.note + (panel.label.empty() ? "" : ", " + panel.label);
    if (!panel.label.empty()) put_label(specimen, request, place, panel);
    for (std::size_t k = 0; k < layout.bars.size(); ++k)
      if (layout.bars[k].panel == static_cast<int>(i)) plan.bars[k].panel = static_cast<int>(plan.panels.size());
    if (views[i].stereo_deg > 0.0)
      part_pair(panel, place.pair_spacing, plan.panels);
    else
      plan.panels.push_back(panel);
  }
  return plan;
}

}  // namespace whorl::plate
