// SPDX-License-Identifier: Apache-2.0
// Where the sans-serif face of letters and labels lies on this computer.
#pragma once

#include <filesystem>
#include <vector>

namespace whorl::plate {

enum class Weight { kRegular, kBold };

/// The usual folders of Liberation Sans, and the one named when the program was built (WHORL_FONT_DIR), first.
std::vector<std::filesystem::path> font_folders();

/// The face's file in the first folder that has it. Throws FileTrouble, which names the package to install.
std::filesystem::path find_font(Weight weight, const std::vector<std::filesystem::path>& folders = font_folders());

}  // namespace whorl::plate
