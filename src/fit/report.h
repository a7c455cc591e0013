// SPDX-License-Identifier: Apache-2.0
// A fit as a table for people, as JSON for programs, and as one row of many.
#pragma once

#include "fit/fit.h"

#include <nlohmann/json.hpp>

#include <optional>
#include <string>
#include <vector>

namespace whorl::fit {

/// For each reading what the solid of the fitted shell measures, where that was taken.
using OnSolid = std::vector<std::optional<double>>;

std::string to_table(const Fit& fit, const specimen::MeasuredSpecimen& measured, const OnSolid& on_solid);
nlohmann::ordered_json to_json(const Fit& fit, const specimen::MeasuredSpecimen& measured, const OnSolid& on_solid);

/// Header and rows of the table of many specimens, comma-separated.
std::string csv_header();
std::string csv_row(const Fit& fit, const specimen::MeasuredSpecimen& measured);

}  // namespace whorl::fit
