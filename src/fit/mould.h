// SPDX-License-Identifier: Apache-2.0
// The shell round an internal mould.
#pragma once

#include "fit/parameters.h"

namespace whorl::fit {

/// The values of the shell whose lumen has the form of `mould`, with a wall of `fixed.wall_mm` at the lip that grows with the whorl:
/// size, D, T and S differ, the rest stays. The lumen's extents along and across the whorl section are the mould's at the lip, and at
/// every stage where one expansion holds. Empty where the wall closes the umbilicus beyond the axis more than a shell can have it.
std::optional<Values> shell_round(const Values& mould, const Fixed& fixed);

}  // namespace whorl::fit
