// SPDX-License-Identifier: Apache-2.0
// What the compiled solid consists of, for the record.
#pragma once

#include "trace/embree_solid.h"

#include <nlohmann/json.hpp>

namespace whorl::app {

nlohmann::ordered_json solid_counters(const trace::EmbreeSolid& solid);

}  // namespace whorl::app
