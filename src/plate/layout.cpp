// SPDX-License-Identifier: Apache-2.0
// Columns by width, rows by height, bars below: the arithmetic of a plate.
#include "plate/layout.h"

#include "diagnostics/error.h"
#include "math/vec.h"
#include "plate/scale_bar.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <optional>

namespace whorl::plate {
namespace {

constexpr double kPointsPerInch = 72.0;
/// Room that a panel letter needs in height, mm on paper: 9 pt bold with its brackets.
constexpr double kLetterRoomHigh = 3.0;
/// Room for a bar's label of 8 pt, mm on paper: "500 µm".
constexpr double kLabelRoom = 11.0;
/// A letter may stand in the corner of a picture's box only outside the inscribed ellipse grown by this much.
constexpr double kCornerSafety = 1.15;

[[noreturn]] void refuse(const LayoutRequest& request, diagnostics::Position where, const std::string& message) {
  throw diagnostics::InvalidInput(request.source, {{where, message}});
}

int whole(double value) { return static_cast<int>(std::lround(value)); }

/// The lengths on paper that everything is built from, in pixels.
struct Measures {
  double per_mm;  // pixels for a mm on paper
  int margin, gap, strip, thickness;
  int label_rise, bar_rise, bar_block;  // from the top of a bar's block: to the label's base, to the bar, to its end

  explicit Measures(const LayoutRequest& request) : per_mm(request.resolution_ppi / kMmPerInch) {
    // The pixel filter reaches under two pixels; the third is for rounding.
    margin = std::max(3, static_cast<int>(std::ceil(kQuietMargin * per_mm)));
    gap = std::max(0, whole(request.gap_mm * per_mm));
    const double letter_cap = kCapHeight * kLetterPoints / kPointsPerInch * request.resolution_ppi;
    strip = static_cast<int>(std::ceil(letter_cap + 2.0 * kLetterInset * per_mm));
    thickness = std::max(1, whole(kBarThickness * per_mm));
    const double label_cap = kCapHeight * kLabelPoints / kPointsPerInch * request.resolution_ppi;
    label_rise = whole(kBarClearance * per_mm + label_cap);
    bar_rise = label_rise + whole(kLabelClearance * per_mm);
    bar_block = bar_rise + thickness + margin;
  }
};

struct Column {
  int left = 0, right = 0;
};

/// Pixels for a mm of shell: the most that fill `room` and leave each half of a stereo pair within its spacing.
template <class Widths>
double largest_scale(const LayoutRequest& request, const Measures& px, double room, const Widths& widths) {
  const auto sum = [&](double scale) {
    double total = 0.0;
    for (const double one : widths(scale)) total += one;
    return total;
  };
  double most = std::numeric_limits<double>::infinity();
  bool paired = false;
  for (const LayoutView& view : request.views) {
    if (view.pair_spacing_mm == 0.0) continue;
    paired = true;
    most = std::min(most, (view.pair_spacing_mm * px.per_mm - 2.0 * px.margin) / (view.scale * view.extents_mm.width()));
  }
  if (!paired) return room / sum(1.0);
  if (sum(0.0) >= room)
    refuse(request, request.plate_where,
           fmt::format("stereo pairs and the panels beside them leave no room on a plate of {} mm; make `width` larger, or "
                       "`columns`, `gap` or the `spacing` of [stereo] smaller",
                       plain_number(request.width_mm)));
  if (sum(most) <= room) return most;
  double low = 0.0, high = most;  // the sum rises with the scale
  for (int i = 0; i < 100; ++i) {
    const double middle = 0.5 * (low + high);
    (sum(middle) <= room ? low : high) = middle;
  }
  return low;
}

/// Sets the common scale and returns the columns; each is wide enough on both sides of its centre line, where the axes are.
std::vector<Column> set_columns(const LayoutRequest& request, const Measures& px, int count, Layout& layout) {
  const auto column_of = [count](std::size_t i) { return i % static_cast<std::size_t>(count); };
  const auto widths = [&](double pixels_per_shell_mm) {
    std::vector<double> wide(static_cast<std::size_t>(count), 0.0);
    for (std::size_t i = 0; i < request.views.size(); ++i) {
      const LayoutView& view = request.views[i];
      double& widest = wide[column_of(i)];
      widest = std::max(widest, 2.0 * view.scale * std::max(view.extents_mm.left, view.extents_mm.right) * pixels_per_shell_mm +
                                    view.pair_spacing_mm * px.per_mm);
    }
    return wide;
  };
  const int fixed = (count - 1) * px.gap + count * 2 * px.margin;
  const double room = layout.width - fixed;
  if (room < kSmallestCell * px.per_mm * count)
    refuse(request, request.plate_where,
           fmt::format("the plate is too narrow: {} column{} with gaps of {} mm leave {:.1f} mm of {} mm for pictures, and "
                       "each needs at least {} mm; make `width` larger, or `columns` or `gap` smaller",
                       count, count == 1 ? "" : "s", plain_number(request.gap_mm), std::max(0.0, room / px.per_mm),
                       plain_number(request.width_mm), kSmallestCell));
  const double pixels_per_shell_mm = largest_scale(request, px, room, widths);
  layout.common_scale = pixels_per_shell_mm * layout.paper_mm_per_pixel;

  std::vector<Column> columns;
  double at = 0.0, used = 0.0;
  const std::vector<double> pictures = widths(pixels_per_shell_mm);
  for (const double one : pictures) used += one;
  const double spare = std::max(0.0, room - used) / count;  // where a stereo pair, not the width, sets the scale
  for (const double one : pictures) {
    const double wide = one + spare + 2.0 * px.margin;
    columns.push_back({whole(at), whole(at + wide)});
    at += wide + px.gap;
  }
  return columns;
}

/// Heights of a row's pictures in pixels: upright views share the pole's line, the others stand about the row's middle.
struct RowHeight {
  double upright_above = -1e300, upright_below = -1e300, tallest = 0.0;
  bool any_upright = false;

  void add(const LayoutView& view, double px_per_mm) {
    const double above = view.extents_mm.above * px_per_mm, below = view.extents_mm.below * px_per_mm;
    if (view.stance == Stance::kUpright && view.scale == 1.0) {
      upright_above = std::max(upright_above, above);
      upright_below = std::max(upright_below, below);
      any_upright = true;
      tallest = std::max(tallest, upright_above + upright_below);
    } else if (view.stance == Stance::kAlongAxis) {
      tallest = std::max(tallest, 2.0 * std::max(above, below));
    } else {
      tallest = std::max(tallest, above + below);
    }
  }

  /// From the middle of the row down to the pole.
  double pole(const LayoutView& view, double px_per_mm) const {
    if (view.stance == Stance::kUpright && view.scale == 1.0) return 0.5 * (upright_above - upright_below);
    if (view.stance == Stance::kAlongAxis) return 0.0;
    return 0.5 * (view.extents_mm.above - view.extents_mm.below) * px_per_mm;
  }
};

/// Whether a letter in the top left corner of the panel may touch the picture.
bool corner_taken(const LayoutPanel& panel, const Extents& extents, const LayoutRequest& request, const Measures& px) {
  const double letter_x = panel.rect.x + (kLetterInset + request.letter_room_mm) * px.per_mm;
  const double letter_y = panel.rect.y + (kLetterInset + kLetterRoomHigh) * px.per_mm;
  // The picture lies on one side of a diagonal; the letter has to lie on the other.
  if (!std::isnan(extents.upper_left))
    return (panel.pole_x - 0.5 * panel.pair_spacing - letter_x) + (panel.pole_y - letter_y) < extents.upper_left / panel.mm_per_pixel + px.margin;
  const double a = 0.5 * extents.width() / panel.mm_per_pixel * kCornerSafety;
  const double b = 0.5 * extents.height() / panel.mm_per_pixel * kCornerSafety;
  const double centre_x = panel.pole_x - 0.5 * panel.pair_spacing + 0.5 * (extents.right - extents.left) / panel.mm_per_pixel;
  const double centre_y = panel.pole_y + 0.5 * (extents.below - extents.above) / panel.mm_per_pixel;
  const double x = std::max(0.0, centre_x - letter_x) / a, y = std::max(0.0, centre_y - letter_y) / b;
  return x * x + y * y < 1.0;
}

LayoutBar make_bar(double length_mm, double mm_per_pixel, int right_end, int block_top, const Measures& px, int panel) {
  LayoutBar bar;
  bar.length_mm = length_mm;
  bar.mm_per_pixel = mm_per_pixel;
  bar.length_px = length_mm / mm_per_pixel;
  bar.left = static_cast<int>(std::floor(right_end - bar.length_px));
  bar.label_base = block_top + px.label_rise;
  bar.top = block_top + px.bar_rise;
  bar.thickness = px.thickness;
  bar.panel = panel;
  return bar;
}

/// The bar of all panels that share the common scale, and the cell under which it stands: the last of them.
struct CommonBar {
  double length_mm = 0.0, length_px = 0.0;
  std::size_t last_panel = 0;
};

std::optional<CommonBar> common_bar(const LayoutRequest& request, const Measures& px, const Layout& layout) {
  std::optional<CommonBar> bar;
  const double mm_per_pixel = layout.paper_mm_per_pixel / layout.common_scale;
  for (std::size_t i = 0; i < request.views.size(); ++i) {
    if (request.views[i].scale != 1.0) continue;
    if (!bar)
      bar = {request.bar_mm > 0.0 ? request.bar_mm : automatic_bar_mm(request.views[i].extents_mm.width()), 0.0, i};
    bar->last_panel = i;
  }
  if (!bar) return bar;
  bar->length_px = bar->length_mm / mm_per_pixel;
  if (bar->length_px > layout.width - 2 * px.margin)
    refuse(request, request.bar_where,
           fmt::format("a scale bar of {} mm is longer than the plate, which shows {} mm of shell from edge to edge; state a "
                       "shorter `bar`, or \"auto\"",
                       plain_number(bar->length_mm), plain_number(layout.width * mm_per_pixel)));
  return bar;
}

/// Places the common bar at the right of its row [first, last): in empty cells if there are some with room, else below. It keeps
/// away from panels of another scale, whose bars begin at `bars_top`.
void place_common_bar(const CommonBar& bar, const LayoutRequest& request, const Measures& px,
                      const std::vector<Column>& columns, std::size_t first, std::size_t last, int bars_top, Layout& layout) {
  const Column& home = columns[bar.last_panel - first];
  const bool ends_row = bar.last_panel + 1 == last;
  const bool alone = std::all_of(request.views.begin() + static_cast<std::ptrdiff_t>(first),
                                 request.views.begin() + static_cast<std::ptrdiff_t>(last),
                                 [](const LayoutView& view) { return view.scale == 1.0; });
  const int need = static_cast<int>(std::ceil(std::max(bar.length_px, kLabelRoom * px.per_mm))) + 2 * px.margin;
  const PixelRect& row = layout.panels[bar.last_panel].rect;
  int right = ends_row ? layout.width : home.right;
  int block_top = layout.height;
  if (ends_row && last - first < columns.size() && need <= layout.width - columns[last - first].left &&
      px.bar_block <= row.height) {
    block_top = row.bottom() - px.bar_block;
  } else if (alone || need <= right - home.left) {
    block_top = bars_top;
  } else {
    right = layout.width;
  }
  layout.height = std::max(layout.height, block_top + px.bar_block);
  const double mm_per_pixel = layout.panels[bar.last_panel].mm_per_pixel;
  layout.bars.push_back(make_bar(bar.length_mm, mm_per_pixel, right - px.margin, block_top, px, -1));
}

/// Lays out views [first, last) as one row that begins at the figure's present height.
void add_row(const LayoutRequest& request, const Measures& px, const std::vector<Column>& columns,
             const std::optional<CommonBar>& bar, std::size_t first, Layout& layout) {
  const std::size_t last = std::min(first + columns.size(), request.views.size());
  RowHeight row;
  for (std::size_t i = first; i < last; ++i)
    row.add(request.views[i], layout.common_scale * request.views[i].scale / layout.paper_mm_per_pixel);
  const int top = layout.height;
  const int height = static_cast<int>(std::ceil(row.tallest)) + 2 * px.margin;
  bool lift = false;
  for (std::size_t i = first; i < last; ++i) {
    const LayoutView& view = request.views[i];
    LayoutPanel panel;
    panel.paper_scale = layout.common_scale * view.scale;
    panel.mm_per_pixel = layout.paper_mm_per_pixel / panel.paper_scale;
    const Column& column = columns[i - first];
    panel.rect = {column.left, top, column.right - column.left, height};
    panel.pole_x = panel.rect.x + 0.5 * panel.rect.width;
    panel.pole_y = top + 0.5 * height + row.pole(view, 1.0 / panel.mm_per_pixel);
    panel.pair_spacing = view.pair_spacing_mm * px.per_mm;
    lift = lift || view.labelled || (request.letter_room_mm > 0.0 && corner_taken(panel, view.extents_mm, request, px));
    layout.panels.push_back(panel);
  }
  const int strip = lift ? px.strip : 0;
  const int inset = whole(kLetterInset * px.per_mm);
  layout.height = top + strip + height;
  const int bars_top = layout.height;
  for (std::size_t i = first; i < last; ++i) {
    LayoutPanel& panel = layout.panels[i];
    panel.letter_left = panel.rect.x + inset;
    panel.letter_top = top + inset;
    panel.rect.y += strip;
    panel.pole_y += strip;
    const LayoutView& view = request.views[i];
    if (view.scale == 1.0) continue;
    layout.bars.push_back(make_bar(automatic_bar_mm(view.extents_mm.width()), panel.mm_per_pixel,
                                   panel.rect.right() - px.margin, bars_top, px, static_cast<int>(i)));
    layout.height = bars_top + px.bar_block;
  }
  if (bar && bar->last_panel >= first && bar->last_panel < last)
    place_common_bar(*bar, request, px, columns, first, last, bars_top, layout);
}

void check_cells(const LayoutRequest& request, const Layout& layout) {
  for (std::size_t i = 0; i < request.views.size(); ++i) {
    const Extents& extents = request.views[i].extents_mm;
    const double across = std::min(extents.width(), extents.height()) * layout.panels[i].paper_scale;
    if (across < kSmallestCell)
      refuse(request, request.plate_where,
             fmt::format("panel {} would be only {:.2f} mm across on paper, and at least {} mm is allowed; make `width` or the "
                         "panel's `scale` larger, or `columns` or `gap` smaller",
                         i + 1, across, kSmallestCell));
  }
  const double pixels = static_cast<double>(layout.width) * layout.height;
  if (pixels > kMostPixels)
    refuse(request, request.plate_where,
           fmt::format("the plate would have {} x {} pixels, {:.0f} megapixels, and at most {:.0f} are allowed; make "
                       "`resolution` or `width` smaller, or `columns` larger",
                       layout.width, layout.height, pixels / 1e6, kMostPixels / 1e6));
}

}  // namespace

int pixels_across(double width_mm, double resolution_ppi) {
  return static_cast<int>(std::floor(std::min(width_mm / kMmPerInch * resolution_ppi + 0.5, 1e9)));
}

Layout lay_out(const LayoutRequest& request) {
  const Measures px(request);
  Layout layout;
  layout.resolution_ppi = request.resolution_ppi;
  layout.paper_mm_per_pixel = kMmPerInch / request.resolution_ppi;
  layout.width = pixels_across(request.width_mm, request.resolution_ppi);
  const int count = std::clamp(request.columns, 1, static_cast<int>(request.views.size()));
  const std::vector<Column> columns = set_columns(request, px, count, layout);
  const std::optional<CommonBar> bar = common_bar(request, px, layout);
  for (std::size_t first = 0; first < request.views.size(); first += columns.size()) {
    if (first > 0) layout.height += px.gap;
    add_row(request, px, columns, bar, first, layout);
  }
  check_cells(request, layout);
  return layout;
}

}  // namespace whorl::plate
