// SPDX-License-Identifier: Apache-2.0
// Looks for Liberation Sans, which has the metrics of the face that journals ask for.
#include "plate/font.h"

#include "diagnostics/error.h"

#include <string>

namespace whorl::plate {

std::vector<std::filesystem::path> font_folders() {
  std::vector<std::filesystem::path> folders;
#ifdef WHORL_FONT_DIR
  folders.emplace_back(WHORL_FONT_DIR);
#endif
  folders.insert(folders.end(), {"/usr/share/fonts/truetype/liberation", "/usr/share/fonts/truetype/liberation2",
                                 "/usr/share/fonts/liberation-sans", "/usr/share/fonts/liberation-sans-fonts",
                                 "/usr/share/fonts/liberation", "/usr/share/fonts/TTF",
                                 "/usr/local/share/fonts/truetype/liberation", "/usr/local/share/fonts"});
  return folders;
}

std::filesystem::path find_font(Weight weight, const std::vector<std::filesystem::path>& folders) {
  const char* name = weight == Weight::kBold ? "LiberationSans-Bold.ttf" : "LiberationSans-Regular.ttf";
  std::string searched;
  for (const std::filesystem::path& folder : folders) {
    std::error_code ignored;
    if (std::filesystem::is_regular_file(folder / name, ignored)) return folder / name;
    searched += (searched.empty() ? "" : ", ") + folder.string();
  }
  throw diagnostics::FileTrouble(std::string("the typeface file ") + name +
                                 " is missing, which letters and scale bars need; install the package fonts-liberation "
                                 "(searched: " +
                                 searched + ")");
}

}  // namespace whorl::plate
