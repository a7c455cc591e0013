// SPDX-License-Identifier: Apache-2.0
// The trade's indices, of the fitted shell and from the readings alone, with their errors.
#pragma once

#include "fit/fit.h"

namespace whorl::fit {

inline constexpr const char* kIsometricUmbilicus = "uw if isometric";

/// Of the fitted shell where it has the measures; from the readings where all that an index needs was read at one stage.
std::vector<IndexResult> indices_of(const Fit& fit);

}  // namespace whorl::fit
