// SPDX-License-Identifier: Apache-2.0
// A fitted shell as a scene file, its comments telling what was fitted, held and assumed.
#pragma once

#include "fit/fit.h"

#include <string>

namespace whorl::fit {

/// Ready for `plate`. `source` is the measurement file's name. Only of a fit with a verdict other than kNotFixed.
std::string scene_text(const Fit& fit, const specimen::MeasuredSpecimen& measured, const std::string& source);

}  // namespace whorl::fit
