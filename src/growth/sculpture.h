// SPDX-License-Identifier: Apache-2.0
// Sculpture fused with the wall: cords, ribs and nodules as raised or sunk places in the coordinates of growth.
#pragma once

#include "math/interval.h"

#include <cstdint>
#include <vector>

namespace whorl::growth {

/// One series of like places: a cord, a set of ribs, a row of nodules. Angles in radians. Growth is counted along growth
/// lines, so that what has one growth lies parallel to the lip. Profiles are Wyvill's (1 - u^2)^3: no edge, no kink.
struct Relief {
  double height = 0.0;        // at the crest, in half-breadths of the section there; negative cuts
  double psi = 0.0;           // direction of the middle round the section
  double psi_reach = 0.0;     // half-width round the section; 0: all the way round
  double spacing = 0.0;       // growth from one crest to the next; 0: unbroken along growth
  double crest = 0.0;         // growth of one of the crests
  double growth_reach = 0.0;  // half-length along growth
  double onset = 0.0, end = 0.0;
  double irregularity = 0.0;  // 0 .. 1: crests shift by up to a quarter of their spacing and vary by half in height
  std::uint64_t seed = 0;
  double power = 1.0;         // of the whorl's size with which it grows: 1 in proportion, 0 alike on every whorl
  double least_scale = 1.0;   // size of the whorl at the onset / at the lip
};

/// Sculpture fused with a whorl rises to at most this share of the outline's own scale: farther out the field no longer has a
/// length for it (field/relief_fade.h). What stands higher is a solid of its own.
inline constexpr double kHighestRelief = 0.24;

/// How far the surface stands above the plain one, in half-breadths, measured along its normal in space. The sum of its reliefs. Total, thread-safe.
class Sculpture {
 public:
  std::vector<Relief> reliefs;

  bool empty() const { return reliefs.empty(); }
  /// `scale`: size of the whorl there / at the lip.
  double height(double growth, double psi, double scale) const noexcept;
  /// Bounds over a range of growth and the section angles [psi_from, psi_from + psi_span]; never too narrow.
  Interval range(Interval growth, double psi_from, double psi_span, Interval scale) const noexcept;
  /// Upper bounds of the derivatives' absolute values by growth, by section angle and by the logarithm of the scale, over the same.
  struct Slopes {
    double by_growth = 0.0, by_psi = 0.0, by_log_scale = 0.0;
  };
  Slopes slopes(Interval growth, double psi_from, double psi_span, Interval scale) const noexcept;
  /// Bounds of the height in one direction over all of growth.
  Interval extremes(double psi) const noexcept;
  /// The same over all directions; holds 0.
  Interval extremes() const noexcept;
};

}  // namespace whorl::growth
