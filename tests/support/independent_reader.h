// SPDX-License-Identifier: Apache-2.0
// Other people's programs that read what was written here.
#pragma once

#include <filesystem>
#include <optional>
#include <string>

namespace whorl::support {

struct SecondOpinion {
  int code = 0;       // exit code
  std::string words;  // standard output and error
};

/// Runs `command` ("pngcheck -v") on a file. Where the program is not installed, warns and returns nothing.
std::optional<SecondOpinion> ask(const std::string& command, const std::filesystem::path& path);

}  // namespace whorl::support
