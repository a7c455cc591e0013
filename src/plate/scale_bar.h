// SPDX-License-Identifier: Apache-2.0
// The scale bar: how long, and what stands over it.
#pragma once

#include <string>

namespace whorl::plate {

/// An automatic bar is at most this part of the view's width. It is then always over 14 % of it, since the next step of
/// 1-2-5 is at most 2.5 times as long; between 14 and 15 % no other step would lie in a window of 15 to 35 %.
inline constexpr double kLongestBar = 0.35;

/// The largest 1, 2 or 5 x 10^n mm that is not over kLongestBar of `view_width_mm` (> 0).
double automatic_bar_mm(double view_width_mm);

/// "5 mm", "2.5 mm"; under a millimetre "500 µm".
std::string bar_label(double length_mm);

/// A length in mm as it is written in text: at most four significant digits, no trailing zeros.
std::string plain_number(double value);

}  // namespace whorl::plate
