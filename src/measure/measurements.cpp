// SPDX-License-Identifier: Apache-2.0
// Puts the measurements of a shell together.
#include "measure/measurements.h"

#include "measure/integrals.h"
#include "measure/mouth.h"
#include "measure/support.h"
#include "measure/wall.h"
#include "measure/whorl_section.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::measure {
namespace {

// Sections are read this far behind the lip, clear of its thickening.
constexpr double kBehindLip = radians(60.0);


void measure_sections(const field::Field& field, double error, Measurements& m) {
  const double theta = field.scene().law.theta_lip - kBehindLip;
  const WhorlSection last = whorl_section(field, theta);
  const WhorlSection before = whorl_section(field, theta - kTwoPi);
  const std::string where = fmt::format("in the half-plane {:.0f} degrees behind the lip", degrees(kBehindLip));
  if (last.empty()) return;
  const double inner = last.rho_min;
  m.raup_D = {inner / last.rho_max, 2.0 * error / last.rho_max,
              "inner over outer margin of the last whorl, " + where};
  m.raup_S = {(last.z_max - last.z_min) / (last.rho_max - inner), 2.0 * error / (last.rho_max - inner),
              "whorl section's extent along the axis over that across it, " + where};
  const bool pair = !before.empty() && theta - kTwoPi > field.scene().law.theta_start;
  if (!pair) {
    const std::string none = "not measurable: fewer than two whorls";
    m.raup_W = m.raup_T = m.apical_angle_deg = {0.0, 0.0, none};
    return;
  }
  m.raup_W = {last.rho_max / before.rho_max, 2.0 * error / before.rho_max,
              "outer margins of the last two whorls from the axis, one turn apart, " + where};
  const double last_z = 0.5 * (last.z_min + last.z_max), before_z = 0.5 * (before.z_min + before.z_max);
  const double shrink = before.rho_max / last.rho_max, centre = 0.5 * (inner + last.rho_max);
  m.raup_T = {(last_z - before_z) / (centre * (1.0 - shrink)), 4.0 * error / (centre * (1.0 - shrink)),
              "shift of the section's middle along the axis over that away from it, one turn apart, " + where};
  m.apical_angle_deg = {2.0 * degrees(touching_angle(last, before)), 0.02,
                        "twice the lean of the line that touches the last two whorls, " + where};
}

}  // namespace

Measurements measure_shell(const trace::EmbreeSolid& solid, specimen::Mineral mineral, const MeasureOptions& options) {
  const field::Field& field = solid.field();
  const scene::Scene& scene = field.scene();
  const double error = 2.0 * solid.cells().tolerance_mm;  // both ends of a length
  Measurements m;
  constexpr int kGrid = 192;
  const double base = support(solid, {0, 0, 1}, kGrid), apex = -support(solid, {0, 0, -1}, kGrid);
  m.shell_height = {base - apex, error, "extent along the axis, apex to the most basal point, lip included"};
  m.shell_width = {width_across_axis(solid), 2.0 * error, "greatest extent across the axis, lip included"};

  const MouthExtent mouth = mouth_extent(field);
  m.aperture_height = {mouth.height, 2.0 * mouth.resolution,
                       "extent along the axis of the mouth at the growth front, lip and columella included, earlier whorls excluded"};
  m.aperture_width = {mouth.width, 2.0 * mouth.resolution,
                      "extent away from the axis of the mouth at the growth front, lip and columella included, earlier whorls excluded"};
  double suture;
  if (suture_depth(solid, suture)) {
    m.last_whorl_height = {base - suture, error,
                           "along the axis, from the suture on the flank opposite to the aperture to the base"};
    m.spire_height = {suture - apex, error, "shell_height - last_whorl_height"};
  } else {
    m.last_whorl_height = {base - apex, error, "no suture shows on the flank opposite to the aperture: the whole height"};
    m.spire_height = {0.0, error, "shell_height - last_whorl_height"};
  }

  const double around_lip = scene.law.distance + scene.law.half_breadth;
  m.whorls = {scene.law.theta_lip / kTwoPi, solid.cells().tolerance_mm / (kTwoPi * around_lip),
              "growth angle of the lip over a whole turn, counted from the pole"};
  measure_sections(field, error, m);

  const WallThickness wall = wall_thickness(solid);
  m.wall_thickness_lip = {wall.at_lip, wall.at_lip_spread, "median along the normal, just behind the rim"};
  m.wall_thickness_min = {wall.least, error,
                          fmt::format("least along the normal over the tube after the first half whorl, at whorl {:.2f}",
                                      wall.least_whorl)};

  const Integrals integrals = integrate(solid, options);
  m.outer_volume = integrals.outer_volume;
  m.lumen_volume = integrals.lumen_volume;
  m.wall_volume = integrals.wall_volume;
  m.outer_area = integrals.outer_area;
  m.inner_area = integrals.inner_area;
  constexpr double kCm3PerMm3 = 1e-3;
  const double density = mineral_density(mineral) * kCm3PerMm3;
  m.mass_g = {m.wall_volume.value * density, m.wall_volume.error * density,
              fmt::format("wall_volume times the mineral's density, {:g} g/cm3", mineral_density(mineral))};
  return m;
}

}  // namespace whorl::measure
