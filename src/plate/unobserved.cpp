// SPDX-License-Identifier: Apache-2.0
// Lines and tints over the developed picture.
#include "plate/unobserved.h"

#include "math/basis3f.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace whorl::plate {
namespace {

using specimen::Provenance;
using specimen::Unobserved;

/// Breadth of a line over the spacing: fine enough for the form to be seen between lines, broad enough for print.
constexpr double kLine = 0.16;
/// Lines need light under them, or shadow swallows them: hatched parts are lightened by so much towards white.
constexpr double kUnderLines = 0.15;
/// How far a tint takes a part towards white, and how much of its colour.
double tint_of(Provenance provenance) {
  switch (provenance) {
    case Provenance::kInterpolated: return 0.2;
    case Provenance::kExtrapolated: return 0.38;
    case Provenance::kAssumed: return 0.6;
    default: return 0.0;
  }
}

Vec3 towards_white(const Vec3& colour, double share) { return colour * (1.0 - share) + Vec3(share); }

}  // namespace

bool tells_unobserved(const FigurePlan& plan, const FigurePanel& panel) {
  return plan.provenance && plan.unobserved != Unobserved::kPlain && panel.look != specimen::PanelLook::kRadiograph;
}

UnobservedStyle::UnobservedStyle(const FigurePlan& plan, const FigurePanel& panel)
    : how_(tells_unobserved(plan, panel) ? plan.unobserved : Unobserved::kPlain),
      spacing_px_(plan.hatch_mm * plan.resolution_ppi / kMmPerInch) {}

// Share of a pixel under the lines, `across_px` from one of them: of a pixel's breadth round its centre.
double UnobservedStyle::line_cover(double across_px) const {
  const double half = 0.5 * kLine * spacing_px_, from_line = std::abs(std::remainder(across_px, spacing_px_));
  return std::max(0.0, std::min(from_line + 0.5, half) - std::max(from_line - 0.5, -half));
}

Vec3 UnobservedStyle::drawn(const Vec3& seen, const transport::PixelFacts& facts, int x, int y) const {
  const auto provenance = static_cast<Provenance>(facts.provenance);
  if (how_ == Unobserved::kPlain || provenance == Provenance::kNone || provenance == Provenance::kObserved) return seen;
  if (how_ == Unobserved::kTint) {
    const double tint = tint_of(provenance);
    const Vec3 grey(luminance(Vec3f(seen)));
    return towards_white(seen * (1.0 - tint) + grey * tint, tint);
  }
  const double rising = (x + y + 1.0) / std::numbers::sqrt2, falling = (x - y) / std::numbers::sqrt2;
  double lines = 0.0;
  if (provenance != Provenance::kExtrapolated) lines = line_cover(rising);
  if (provenance != Provenance::kInterpolated) lines = std::max(lines, line_cover(falling));
  return towards_white(seen, kUnderLines) * (1.0 - lines);
}

std::string unobserved_words(const FigurePlan& plan) {
  const bool any = std::any_of(plan.panels.begin(), plan.panels.end(), [&](const FigurePanel& p) { return tells_unobserved(plan, p); });
  if (!any) return "";
  if (plan.unobserved == Unobserved::kTint)
    return "Parts that were not observed are drawn paler: interpolated, extrapolated and assumed ones in this order.";
  return fmt::format("Parts that were not observed are hatched at {:g} mm: interpolated ones with lines that rise to the right, extrapolated "
                     "ones with lines that fall to the right, assumed ones with both.",
                     plan.hatch_mm);
}

}  // namespace whorl::plate
