// SPDX-License-Identifier: Apache-2.0
// The race's outcome as a plain-text table and as JSON.
#pragma once

#include "race.h"
#include "shape.h"

#include <nlohmann/json.hpp>

#include <string>
#include <vector>

namespace whorl::bench {

/// One shape's table.
std::string table_text(const Shape& shape, const std::vector<const Contender*>& contenders, const std::vector<Result>& results);
nlohmann::ordered_json table_json(const Shape& shape, const std::vector<const Contender*>& contenders,
                                  const std::vector<Result>& results);

/// What the rough trial program reached that the design rests on (design: field, section 4), on two cores of their own.
std::string trial_text();

}  // namespace whorl::bench
