// SPDX-License-Identifier: Apache-2.0
// Where in an input file something stands.
#pragma once

#include <cstdint>

namespace whorl::diagnostics {

/// One-based line and column; 0 where there is none (a default, or a file as a whole).
struct Position {
  std::uint32_t line = 0, column = 0;
};

}  // namespace whorl::diagnostics
