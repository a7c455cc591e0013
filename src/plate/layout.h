// SPDX-License-Identifier: Apache-2.0
// The plate on paper: views with their extents in, whole-pixel rectangles at one common scale out.
#pragma once

#include "diagnostics/position.h"

#include <limits>
#include <string>
#include <vector>

namespace whorl::plate {

/// How far a view's picture reaches from the projected pole (which lies on the projected axis), mm of shell.
/// A side may be negative where the picture does not reach as far as the pole.
struct Extents {
  double left = 0.0, right = 0.0, above = 0.0, below = 0.0;
  /// How far it reaches into the upper left corner, where the letter goes: the largest sum of a point's distances to the left of
  /// and above the pole. Not known: the ellipse in the box is taken for the picture.
  double upper_left = std::numeric_limits<double>::quiet_NaN();
  double width() const { return left + right; }
  double height() const { return above + below; }
};

/// How a panel stands in its row.
enum class Stance {
  kUpright,   // axis upright: apex and base on the row's common lines
  kAlongAxis, // seen along the axis: the axis point in the middle of the row's height
  kOblique,   // its picture in the middle of the row's height
};

struct PixelRect {
  int x = 0, y = 0, width = 0, height = 0;
  int right() const { return x + width; }
  int bottom() const { return y + height; }
};

struct LayoutView {
  Extents extents_mm;
  Stance stance = Stance::kUpright;
  double scale = 1.0;  // relative to the plate's common scale; other than 1 gets a bar of its own
  double pair_spacing_mm = 0.0;  // of a stereo pair: between its pictures' poles on paper; 0 for one picture
  bool labelled = false;         // words stand above the picture, beside the letter
};

struct LayoutRequest {
  double width_mm = 180.0, resolution_ppi = 600.0, gap_mm = 4.0;
  int columns = 3;
  double letter_room_mm = 3.2;  // width on paper that the widest panel letter needs; 0 without letters
  double bar_mm = 0.0;  // 0 = by the 1-2-5 rule; of the common bar, others always follow the rule
  std::vector<LayoutView> views;  // in reading order
  std::string source;             // for errors: the scene file and the places in it
  diagnostics::Position plate_where, bar_where;
};

struct LayoutPanel {
  PixelRect rect;            // in the figure
  double paper_scale = 0.0;  // mm on paper for a mm of shell
  double mm_per_pixel = 0.0; // mm of shell
  double pole_x = 0.0, pole_y = 0.0;  // the projected pole in the figure, pixels from its top left corner
  double pair_spacing = 0.0;          // pixels; the poles of a pair stand half of it to the left and right of `pole_x`
  int letter_left = 0, letter_top = 0;  // where the letter's ink begins
};

/// A scale bar. Its left end is on a pixel's edge; its right end need not be.
struct LayoutBar {
  double length_mm = 0.0, length_px = 0.0, mm_per_pixel = 0.0;
  int left = 0, top = 0, thickness = 0;
  int label_base = 0;  // base line of the label, which is centred over the bar, or ends with it where it is the longer
  int panel = -1;      // index of the panel it belongs to, -1 for all that share the common scale
};

struct Layout {
  int width = 0, height = 0;
  double resolution_ppi = 0.0;
  double paper_mm_per_pixel = 0.0;  // exactly 25.4 / ppi, so that the files' resolution tag and the bars agree
  double common_scale = 0.0;        // mm on paper for a mm of shell
  std::vector<LayoutPanel> panels;
  std::vector<LayoutBar> bars;
};

/// Lengths on paper, mm.
inline constexpr double kQuietMargin = 0.3;       // round each picture, so that the filter's skirt is not cut off
inline constexpr double kBarThickness = 0.7;      // trade practice: 0.5 .. 1 mm
inline constexpr double kBarClearance = 1.6;      // from the pictures down to the bar's label
inline constexpr double kLabelClearance = 0.8;    // from the label's base line down to the bar
inline constexpr double kLetterInset = 0.6;       // from the panel's corner to the letter's ink
inline constexpr double kSmallestCell = 2.0;
inline constexpr double kMostPixels = 100e6;
/// Letters 9 pt bold, labels 8 pt (journals ask 8 to 12 pt).
inline constexpr double kLetterPoints = 9.0, kLabelPoints = 8.0;
/// Cap height of the sans-serif face, as a fraction of its size (1409 of 2048 units in Liberation Sans).
inline constexpr double kCapHeight = 1409.0 / 2048.0;

/// Width of a figure in pixels: to the nearest whole pixel, halves up (`width_mm` / 25.4 x `ppi`).
int pixels_across(double width_mm, double resolution_ppi);

/// Lays the plate out at the largest common scale that fits the width; the height follows.
/// Throws InvalidInput on [plate] for cells under 2 mm on paper, more than 100 megapixels, or a stated bar that is longer
/// than the plate. Needs at least one view, each with a positive width and height.
Layout lay_out(const LayoutRequest& request);

}  // namespace whorl::plate
