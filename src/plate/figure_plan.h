// SPDX-License-Identifier: Apache-2.0
// The figure as it will be: for each panel where it stands, how it is seen and at which scale.
#pragma once

#include "plate/layout.h"
#include "plate/views.h"
#include "specimen/specimen.h"
#include "transport/camera.h"

#include <optional>
#include <string>
#include <vector>

namespace whorl::plate {

struct FigurePanel {
  View view;
  std::string letter;         // as it is printed, "" for none
  specimen::PanelLook look = specimen::PanelLook::kNatural;
  specimen::Shows shows = specimen::Shows::kShell;
  std::optional<Eye> eye;     // of a stereo pair: its left picture is followed at once by its right one
  std::string note;           // what is peculiar to this picture, for caption and label: "W 2, T 1"
  std::string label;          // words above the picture, "" for none
  Extents extents_mm;
  PixelRect rect;             // in the figure; the panel's film has this width and height
  double relative_scale = 1.0;  // to the figure's common scale
  double paper_scale = 0.0;   // mm on paper for a mm of shell: the magnification in print
  double mm_per_pixel = 0.0;  // mm of shell
  Vec2 pole_px;               // the projected pole in the panel, pixels from its top left corner, y down
  int letter_left = 0, letter_top = 0;  // in the figure
  int label_left = 0, label_base = 0;   // in the figure

  /// The view through which this panel is rendered. Rays start `front_mm` from the pole, towards the reader.
  transport::Camera camera(double front_mm) const;
};

struct FigurePlan {
  int width = 0, height = 0;        // pixels
  double resolution_ppi = 0.0;
  double common_scale = 0.0;        // mm on paper for a mm of shell
  std::vector<FigurePanel> panels;  // in reading order
  std::vector<LayoutBar> bars;
  bool provenance = false;          // the specimen states what is preserved: films tell what was observed
  specimen::Unobserved unobserved = specimen::Unobserved::kPlain;  // how the rest is drawn
  double hatch_mm = 0.0;            // spacing of hatching on paper
};

/// The shells of a contact sheet, row by row, and the specimen whose panels they fill: as many panels as shells, columns as W, no
/// letters.
std::vector<specimen::Specimen> sheet_shells(const specimen::Specimen& specimen);
specimen::Specimen sheet_plate(const specimen::Specimen& specimen);

/// The views that the scene file asks for, in its order; measure their extents and hand both to plan_figure, which parts stereo pairs.
std::vector<View> views_of(const specimen::Specimen& specimen);

/// The view's extents about the pole for a set of points in the frame of the dextral solid; empty for no points.
Extents extents_in(const View& view, const std::vector<Vec3>& points_mm);

/// `views` and `extents_mm` go with the panels of the scene file, one by one. Throws InvalidInput as lay_out does, and
/// for a view whose picture would have no width or height.
FigurePlan plan_figure(const specimen::Specimen& specimen, const std::vector<View>& views,
                       const std::vector<Extents>& extents_mm);

/// Whether a bar is that of panel `index`; both pictures of a stereo pair have one bar.
bool bar_belongs_to(const LayoutBar& bar, const FigurePlan& plan, std::size_t index);

/// The label of the view that a pair shows, for one of its pictures.
std::string pair_label(const FigurePanel& picture);

/// What stands on a radiograph, whatever else is said of it.
std::string radiograph_label(const specimen::Radiograph& radiograph);

/// "A", "b", "(c)"; after the 26th letter "AA", "AB". Counted from 0; "" for Letters::kNone.
std::string panel_letter(int index, specimen::Letters letters);

}  // namespace whorl::plate
