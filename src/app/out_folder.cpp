// SPDX-License-Identifier: Apache-2.0
// Makes folders, or says why it cannot.
#include "app/out_folder.h"

#include "diagnostics/error.h"

#include <fmt/format.h>

#include <system_error>

namespace whorl::app {

void make_out_folder(const std::filesystem::path& folder) {
  if (std::filesystem::is_directory(folder)) return;
  std::error_code fault;
  std::filesystem::create_directories(folder, fault);
  if (fault)
    throw diagnostics::FileTrouble(fmt::format("{}: the folder could not be made: {}", folder.string(), fault.message()));
}

}  // namespace whorl::app
