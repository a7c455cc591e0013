// SPDX-License-Identifier: Apache-2.0
// What a hundred thousand and a million elements on one shell cost, against the bare shell.
#pragma once

#include <cstddef>

namespace whorl::bench {

/// Prints memory, time to build and rays a second; `pixels` camera rays a view.
void run_attached(std::size_t pixels, int rounds);

}  // namespace whorl::bench
