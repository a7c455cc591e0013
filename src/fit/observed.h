// SPDX-License-Identifier: Apache-2.0
// Which stretches of growth the readings tell of: what was observed of a specimen that does not state what is preserved.
#pragma once

#include "fit/fit.h"
#include "specimen/provenance.h"

#include <vector>

namespace whorl::fit {

/// Whorls from the pole, in order, apart from each other. A reading tells of the growth that its definition spans, a series of all
/// between its first and its last value, a whole silhouette and a count of whorls of all from the embryonic shell's end to the lip.
std::vector<specimen::Stretch> observed_stretches(const Fit& fit);

/// What of the shell the readings tell of there.
specimen::PreservedParts observed_parts(const specimen::MeasuredSpecimen& measured);

/// The tables [[preserved]] of the fitted shell's scene: as the measurement file states them, or by the readings, counted from the lip.
std::vector<specimen::Preserved> preserved_of(const Fit& fit, const specimen::MeasuredSpecimen& measured);

/// "the outside, whorls 3 to 6.5": for the report.
std::vector<std::string> preserved_words(const std::vector<specimen::Preserved>& stretches);

}  // namespace whorl::fit
