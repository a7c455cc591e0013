// SPDX-License-Identifier: Apache-2.0
// Reads scene files of format 1.
#pragma once

#include "specimen/specimen.h"

#include <string>

namespace whorl::specimen {

/// Reads and checks a scene file; "-" is standard input. Throws diagnostics::FileTrouble where it cannot be read
/// (missing, a folder, no right to), else as parse_scene. A file of more than 1 MiB is refused without being read
/// whole.
Specimen read_scene_file(const std::string& path);

/// Checks `text` as a scene file named `source_name`. Throws diagnostics::InvalidInput with every fault that it has;
/// a text that is not TOML at all has one fault, the first.
Specimen parse_scene(std::string text, std::string source_name);

}  // namespace whorl::specimen
