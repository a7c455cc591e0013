// SPDX-License-Identifier: Apache-2.0
// Finds, before toml++ sees a text, the two things on which its behaviour is undefined.
#pragma once

#include "specimen/problem_list.h"

#include <string_view>

namespace whorl::specimen {

/// Complains of the first
/// - character beyond ASCII outside quotes and comments (toml++ up to 3.4 takes a table of spaces past its end for
///   U+00A1 .. U+0499 and some others), or
/// - table whose name does not begin like a name (toml++ issue 294: the two bytes `[&`).
/// Neither can be sound in a scene file. `text` is well-formed UTF-8; where it is no TOML, what comes after the first fault
/// may be misjudged.
void guard_toml(std::string_view text, ProblemList& problems);

}  // namespace whorl::specimen
