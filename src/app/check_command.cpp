// SPDX-License-Identifier: Apache-2.0
// The command 'check': is the scene file valid, and what does it state?
#include "app/commands.h"

#include "diagnostics/error.h"

namespace whorl::app {

int check_command(const Options&, Progress&) {
  throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "'check' is not built yet");
}

}  // namespace whorl::app
