// SPDX-License-Identifier: Apache-2.0
// The colour profile that goes into TIFF files.
#pragma once

#include <string>

namespace whorl::plate {

/// An ICC display profile, version 2.4, of the sRGB colour space: three colorants adapted to D50 and a curve of 1024
/// entries. Method: ICC.1:2001-04; primaries, white and transfer function of IEC 61966-2-1; Bradford adaptation.
std::string srgb_profile();

}  // namespace whorl::plate
