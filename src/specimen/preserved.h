// SPDX-License-Identifier: Apache-2.0
// Tables [[preserved]], which scene files and measurement files share.
#pragma once

#include "specimen/problem_list.h"
#include "specimen/table_reader.h"

namespace whorl::specimen {

Preserved preserved_of(const TableReader& table);

/// Complains of stretches that end before they begin or, in a shell of so many whorls, reach beyond it. `whorls` empty: not known.
void check_preserved(const std::vector<Preserved>& stretches, std::optional<double> whorls, ProblemList& problems);

}  // namespace whorl::specimen
