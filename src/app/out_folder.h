// SPDX-License-Identifier: Apache-2.0
// The folder that receives a command's files.
#pragma once

#include <filesystem>

namespace whorl::app {

/// Makes the folder, and those above it, where it is missing. Throws FileTrouble.
void make_out_folder(const std::filesystem::path& folder);

}  // namespace whorl::app
