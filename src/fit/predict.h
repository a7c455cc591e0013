// SPDX-License-Identifier: Apache-2.0
// The forward model: what a form measures, under every definition of the catalogue.
#pragma once

#include "fit/form.h"
#include "specimen/measurement_file.h"

#include <limits>

namespace whorl::fit {

inline constexpr double kNotMeasurable = std::numeric_limits<double>::quiet_NaN();

/// Growth angle at which a measurement was taken; NaN where the form never had that diameter.
double theta_of(const Form& form, const specimen::GrowthStage& stage);

/// Lengths in mm, angles in degrees, counts in whorls; kNotMeasurable where the form has no such measure (no suture shows,
/// no aperture is left open). `kWhorlWidthProportional` is the section's breadth; only its ratios have a meaning.
/// Takes microseconds, on the law's outlines; tests compare it with the solid.
double predict(const Form& form, specimen::Definition definition, const specimen::GrowthStage& stage);

}  // namespace whorl::fit
