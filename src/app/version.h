// SPDX-License-Identifier: Apache-2.0
// Which program this is, for records that must tell two builds apart.
#pragma once

#include <string>

namespace whorl::app {

inline std::string program_version() { return WHORLWRIGHT_VERSION; }
/// Build type and compiler.
inline std::string program_build() { return WHORLWRIGHT_BUILD; }

}  // namespace whorl::app
