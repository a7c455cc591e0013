// SPDX-License-Identifier: Apache-2.0
// A text as TOML, or the one fault that it has.
#pragma once

#include "specimen/toml_door.h"

#include <string>

namespace whorl::specimen {

/// `text` has passed check_bytes and guard_toml. Throws diagnostics::InvalidInput where it is not TOML.
toml::table parse_toml(const std::string& text, const std::string& source);

}  // namespace whorl::specimen
