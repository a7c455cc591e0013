// SPDX-License-Identifier: Apache-2.0
// One small function a definition.
#include "fit/predict.h"

#include "fit/extents.h"
#include "fit/whorl_ellipse.h"
#include "math/bracketed_root.h"

#include <cmath>

namespace whorl::fit {
namespace {

using growth::HalfPlanePoint;
using specimen::Definition;

double end_of(const Form& form) { return form.law.theta_lip; }

double diameter_at(const Form& form, double theta) {
  return WhorlEllipse(form.law, theta).outer() + WhorlEllipse(form.law, theta - kPi).outer();
}

std::optional<HalfPlanePoint> suture_at(const Form& form, double theta) {
  if (theta - kTwoPi < form.law.theta_start) return std::nullopt;  // the whorl before is embryonic shell
  return suture_point(WhorlEllipse(form.law, theta), WhorlEllipse(form.law, theta - kTwoPi));
}

double suture_depth_at(const Form& form, double theta) {
  const auto suture = suture_at(form, theta);
  return suture ? suture->z : kNotMeasurable;
}

// Not measurable where the last whorl hides the spire, so that no suture shows.
double last_whorl_height(const Form& form, double suture_theta) {
  return base_depth(form, end_of(form)) - suture_depth_at(form, suture_theta);
}

double between_sutures(const Form& form, double theta, bool along_axis) {
  const auto above = suture_at(form, theta), below = suture_at(form, theta + kTwoPi);
  if (!above || !below) return kNotMeasurable;
  return along_axis ? below->z - above->z : std::hypot(below->z - above->z, below->rho - above->rho);
}

// Whole angle, in degrees, of the lines that touch the section at theta and the one a turn before on their apical outside.
double touching_angle(const Form& form, double theta) {
  if (theta - kTwoPi < form.law.theta_start) return kNotMeasurable;
  const WhorlEllipse later(form.law, theta), earlier(form.law, theta - kTwoPi);
  const auto lead = [&](double beta) {
    return later.support(std::cos(beta), -std::sin(beta)) - earlier.support(std::cos(beta), -std::sin(beta));
  };
  // Whorls that touch the axis all reach equally far towards it, so that half a turn itself is a root without a meaning.
  constexpr double kMost = kPi - 1e-4;
  const double from = lead(0.0), to = lead(kMost);
  if (!(from > 0.0 && to < 0.0)) return kNotMeasurable;
  return 2.0 * degrees(bracketed_root(lead, 0.0, kMost, from, to));
}

double spire_angle(const Form& form) {
  const double theta = end_of(form) - kPi;
  const auto last = suture_at(form, theta), before = suture_at(form, theta - kTwoPi);
  if (!last || !before) return kNotMeasurable;
  return 2.0 * degrees(std::atan2(last->rho - before->rho, last->z - before->z));
}

// The last suture that crosses the spire in side view: from the flank half a turn before the lip's to the lip's own.
double crossing_angle(const Form& form, bool to_side) {
  const double theta = end_of(form);
  const auto low = suture_at(form, theta), high = suture_at(form, theta - kPi), above = suture_at(form, theta - 3.0 * kPi);
  if (!low || !high || (to_side && !above)) return kNotMeasurable;
  const double across = low->rho + high->rho, along = low->z - high->z;
  if (!to_side) return degrees(std::atan2(along, across));
  // Seen with the upper end on the left: the side runs towards the apex, inwards and up.
  const double in = high->rho - above->rho, up = high->z - above->z;
  return degrees(std::acos((across * in - along * up) / (std::hypot(across, along) * std::hypot(in, up))));
}

double umbilicus(const Form& form, double theta, bool seams) {
  double sum = 0.0;
  for (const double at : {theta, theta - kPi}) {
    const WhorlEllipse section(form.law, at);
    sum += seams ? umbilical_seam(section, WhorlEllipse(form.law, at - kTwoPi)).rho : section.inner();
  }
  return std::max(sum, 0.0);
}

double whorl_height(const Form& form, double theta, bool seam) {
  const WhorlEllipse section(form.law, theta);
  const double inner = seam ? umbilical_seam(section, WhorlEllipse(form.law, theta - kTwoPi)).rho : section.inner();
  return section.outer() - std::max(inner, 0.0);
}

double mouth(const Form& form, double theta, Definition definition) {
  const bool longest = definition == Definition::kApertureHeightLongest || definition == Definition::kApertureWidthAcrossLongest;
  const auto extents = mouth_extents(form, theta, longest);
  if (!extents) return kNotMeasurable;
  switch (definition) {
    case Definition::kApertureHeightAxial: return extents->height;
    case Definition::kApertureWidthAcross: return extents->width;
    case Definition::kApertureHeightLongest: return extents->longest;
    default: return extents->across_longest;
  }
}

}  // namespace

double theta_of(const Form& form, const specimen::GrowthStage& stage) {
  using Kind = specimen::GrowthStage::Kind;
  switch (stage.kind) {
    case Kind::kLip: return end_of(form);
    case Kind::kBehindLip: return end_of(form) - kTwoPi * stage.value;
    case Kind::kAtWhorl: return kTwoPi * stage.value;
    case Kind::kAtDiameter: break;
  }
  const auto excess = [&](double theta) { return std::log(diameter_at(form, theta) / stage.value); };
  const double now = excess(end_of(form));
  const double rate = form.law.by_section.rate(end_of(form));
  if (form.law.one_expansion && form.law.by_section.is_constant()) return end_of(form) - now / rate;
  // Bracket by the mean rate, then solve.
  double other = end_of(form) - 2.0 * now / rate, there = excess(other);
  for (int i = 0; i < 8 && (there > 0.0) == (now > 0.0); ++i) there = excess(other -= now / rate);
  if ((there > 0.0) == (now > 0.0)) return kNotMeasurable;
  return bracketed_root(excess, end_of(form), other, now, there);
}

double predict(const Form& form, Definition definition, const specimen::GrowthStage& stage) {
  using enum Definition;
  const growth::CoilingLaw& law = form.law;
  const double end = end_of(form), theta = theta_of(form, stage);
  if (std::isnan(theta)) return kNotMeasurable;
  switch (definition) {
    case kShellHeightAxial: return shell_height(form, theta);
    case kShellWidthAcross: return shell_width(form, theta);
    case kApertureHeightAxial:
    case kApertureHeightLongest:
    case kApertureWidthAcross:
    case kApertureWidthAcrossLongest: return mouth(form, theta, definition);
    case kLastWhorlHeightFlank: return last_whorl_height(form, end - kPi);
    case kLastWhorlHeightAboveAperture: return last_whorl_height(form, end);
    case kPenultimateHeightBetweenSutures:
      return suture_depth_at(form, end - kPi) - suture_depth_at(form, end - 3.0 * kPi);
    case kPenultimateWidthFlanks: return diameter_at(form, end - kTwoPi);
    case kSpireHeightLessAperture: return shell_height(form, end) - mouth(form, end, kApertureHeightAxial);
    case kSpireHeightLessLastWhorl: return shell_height(form, end) - last_whorl_height(form, end - kPi);
    case kSpireHeightDirect: return suture_depth_at(form, end) - apex_depth(form, end);
    case kApicalAngleEarly: return touching_angle(form, std::min(end, law.theta_start + 2.0 * kTwoPi));
    case kPleuralAngleLastTwo: return touching_angle(form, end);
    case kSpireAngleSutures: return spire_angle(form);
    case kSuturalAngleChord: return crossing_angle(form, true);
    case kSutureSlopeAcross: return crossing_angle(form, false);
    case kWhorlsPole: return end / kTwoPi;
    case kWhorlsNucleusLine:
    case kWhorlsSutureStart: return (end - law.theta_start) / kTwoPi;
    case kWhorlsNucleusLineQuarter: return (end - law.theta_start) / kTwoPi + 0.25;
    case kUmbilicusMargins: return umbilicus(form, theta, false);
    case kUmbilicusSeams: return umbilicus(form, theta, true);
    case kDiameterSumOfRadii: return diameter_at(form, theta);
    case kWhorlHeightMargin: return whorl_height(form, theta, false);
    case kWhorlHeightSeam: return whorl_height(form, theta, true);
    case kWhorlHeightBetweenSutures: return between_sutures(form, theta, true);
    case kWhorlWidthAlongAxis: {
      const WhorlEllipse section(law, theta);
      return section.bottom() - section.top();
    }
    case kWhorlWidthFlanks: return diameter_at(form, theta);
    case kWhorlWidthSection:
    case kWhorlWidthProportional: {
      const WhorlEllipse section(law, theta);
      return section.outer() - section.inner();
    }
    case kWhorlWidthBetweenSutures: return between_sutures(form, theta, false);
    case kAperturalHeightVenters: return WhorlEllipse(law, theta).outer() - WhorlEllipse(law, theta - kTwoPi).outer();
    case kLipInclinationProfile: return degrees(std::atan(form.tan_inclination));
    case kWallThicknessWall: return form.wall_mm;
    case kWallThicknessLip: return form.lip_mm;
  }
  return kNotMeasurable;
}

}  // namespace whorl::fit
