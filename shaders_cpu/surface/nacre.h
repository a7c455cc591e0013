// SPDX-License-Identifier: Apache-2.0
// Mother-of-pearl: tablets of aragonite between thin organic sheets, in tables made once by transfer matrices.
#pragma once

#include "math/vec.h"

#include <cstdint>
#include <vector>

namespace whorl::shaders_cpu {

/// Aragonite as light sees it that swings along the tablets (the indices 1.681 and 1.685 of its b and a axes; c stands across).
inline constexpr double kTabletIndex = 1.683;

struct NacreStack {
  double tablet_nm = 440.0;   // mean thickness of a tablet
  double spread_nm = 20.0;    // standard deviation between places too near to each other to be told apart
  double sheet_nm = 8.0;      // organic sheet between two tablets
  double sheet_index = 1.5;
  int layers = 30;            // tablets with their sheets; the wall below them counts as aragonite
};

/// Reflectance of a flat place for unpolarised light from air, per wavelength, averaged over the spread. `scale` times all thicknesses.
double nacre_reflectance(const NacreStack& stack, double wavelength_nm, double cosine, double scale = 1.0);

/// Colour of a rough surface whose facets are nacre: what single facets reflect, and what all of them do in sum.
/// Built in about a second; then tables only.
class NacreCoat {
 public:
  static constexpr int kNodes = 65, kScales = 17;
  /// Thickness relative to the stated mean that the tables hold.
  static constexpr float kLeastScale = 0.75f, kMostScale = 1.25f;

  /// `alpha`: GGX roughness, above 0 .. 1.
  NacreCoat(const NacreStack& stack, double alpha);

  float alpha() const noexcept { return alpha_; }
  /// Reflectance of a facet, linear sRGB, 0 .. 1.
  Vec3f facet(float cosine, float scale) const noexcept { return read(facet_, cosine, scale); }
  /// Share of light from a direction that the whole surface reflects; at most 1.
  Vec3f at(float cosine, float scale) const noexcept { return read(albedo_, cosine, scale); }
  /// 2 times the integral of at(c) c over c in [0, 1], of the interpolated table itself.
  Vec3f mean(float scale) const noexcept;

 private:
  Vec3f read(const std::vector<Vec3f>& table, float cosine, float scale) const noexcept;

  std::vector<Vec3f> facet_, albedo_;  // kScales rows of kNodes, at cosines (i / last)^2
  std::vector<Vec3f> mean_;
  float alpha_;
};

/// A smooth random surface between -1 and 1 over growth (whorls) and the way round the section, for thickness that drifts over a shell.
float nacre_drift(double turn, float around_deg, std::uint64_t seed) noexcept;

}  // namespace whorl::shaders_cpu
