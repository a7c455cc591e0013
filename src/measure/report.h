// SPDX-License-Identifier: Apache-2.0
// Measurements as JSON for programs and as a table for people.
#pragma once

#include "measure/measurements.h"

#include <nlohmann/json.hpp>

#include <string>

namespace whorl::measure {

/// The object that `measure --json` prints: values by name, `raup`, and under `detail` each with method and error.
nlohmann::ordered_json to_json(const Measurements& measurements);

/// One line a measurement: name, value with unit, error.
std::string to_table(const Measurements& measurements);

}  // namespace whorl::measure
