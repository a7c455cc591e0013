// SPDX-License-Identifier: Apache-2.0
// What the mouth as a portal is worth: the error that remains after the same time, with it and without.
#pragma once

namespace whorl::bench {

/// Renders the mouths of demo scenes small, often enough to know their errors.
void run_portal();

}  // namespace whorl::bench
