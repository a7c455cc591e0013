// SPDX-License-Identifier: Apache-2.0
// What a specimen is called: the same keys in scene and measurement files.
#pragma once

#include "specimen/table_reader.h"

namespace whorl::specimen {

/// From a table [specimen]; complaints go to the reader's list.
Identity read_identity(const TableReader& table);

}  // namespace whorl::specimen
