// SPDX-License-Identifier: Apache-2.0
// Finds, before toml++ sees a text, the things on which its behaviour is undefined.
#pragma once

#include "specimen/problem_list.h"

#include <string_view>

namespace whorl::specimen {

/// Complains of the first
/// - character beyond ASCII outside quotes and comments (where toml++ 3.3 asks whether U+00A1 .. U+0499 and some others
///   are spaces, it reaches a place declared unreachable);
/// - quote in the middle of a word, behind which toml++ may look for the same spaces;
/// - backslash with a character beyond ASCII next to it, spaces and line ends left aside: for the same reason;
/// - table whose name does not begin like a name (toml++ issue 294: the two bytes `[&`).
/// Of these only the third can be TOML: a line that goes on after a backslash. `text` is well-formed UTF-8; where it is
/// no TOML, what comes after the first fault may be misjudged.
void guard_toml(std::string_view text, ProblemList& problems);

}  // namespace whorl::specimen
