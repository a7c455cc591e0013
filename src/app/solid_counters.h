// SPDX-License-Identifier: Apache-2.0
// What the compiled solid consists of, for the record.
#pragma once

#include "trace/attached_solids.h"
#include "trace/embree_solid.h"

#include <nlohmann/json.hpp>

namespace whorl::app {

/// `attached` may be null. Lamellae and stripes count by their pieces.
nlohmann::ordered_json solid_counters(const trace::EmbreeSolid& solid, const trace::AttachedSolids* attached);

}  // namespace whorl::app
