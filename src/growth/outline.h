// SPDX-License-Identifier: Apache-2.0
// Outlines of the whorl section: the outer one from its lobes, the lumen's by taking off the wall along the normal.
#pragma once

#include "growth/coiling_law.h"
#include "math/periodic_spline.h"

#include <optional>
#include <vector>

namespace whorl::growth {

/// A closed curve round the section's centre: `reach` at a section angle, in section coordinates (1 = the plain ellipse).
/// `normal_scale` = 1 / (half-breadth * |grad t|) at t = 1, with t = |q| / reach in space, so that
/// half_breadth * (1 - t^2) / 2 * normal_scale is a length along the surface's normal near the surface.
struct Outline {
  PeriodicSpline reach, normal_scale;
  bool operator==(const Outline&) const = default;
};

/// 1 plus all lobes. A lobe is reach * exp(kappa (cos(psi - at) - 1)) (the von Mises bell, smooth and periodic) with
/// kappa such that it stands at half its reach half its width away.
PeriodicSpline outer_reach(const std::vector<specimen::Lobe>& lobes);

/// Outward unit normal of the tube's surface: along rho, along z, along growth (azimuth).
struct SurfaceNormal {
  double rho, z, along;
  double gradient;  // |grad t| in space, per unit of length
};
SurfaceNormal surface_normal(const CoilingLaw& law, double theta, const PeriodicSpline& reach, double psi);

Outline with_normal_scale(const CoilingLaw& law, double theta, PeriodicSpline reach);

/// Wall thickness as a function of the growth angle, and of where the growth front stood when that part was laid down.
struct WallLaw {
  double at_lip = 0.0;           // ordinary wall at the lip, in the law's unit of length
  double lip_thickness = 0.0;    // at the rim
  bool proportional = true;      // else constant, but never over kMostOfTube of the early tube
  double tan_inclination = 0.0;  // of the aperture

  /// The lip's thickness is whole over the last kLipWhole of growth and fades into the wall by kLipFades.
  static constexpr double kLipWhole = radians(15.0), kLipFades = radians(45.0);
  /// Under a constant wall the early whorls would fill up: their wall stops at this part of the lesser half-extent.
  static constexpr double kMostOfTube = 0.4;

  double thickness(const CoilingLaw& law, double theta, HalfPlanePoint at) const;
};

/// The lumen's outline in the half-plane at `theta`: every point is at least the wall's thickness away from the outer
/// surface, measured in space. Empty where the wall leaves less than kLeastLumen of the section.
inline constexpr double kLeastLumen = 0.05;
std::optional<PeriodicSpline> hollow_reach(const CoilingLaw& law, double theta, const PeriodicSpline& reach,
                                           const WallLaw& wall);

/// Growth angle by which the front leads at a point of the half-plane: positive towards the apex in prosocline shells.
/// Bounded by a quarter turn also at the axis.
double front_lead(double tan_inclination, double depth_of_centre, HalfPlanePoint at);

}  // namespace whorl::growth
