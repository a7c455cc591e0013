// SPDX-License-Identifier: Apache-2.0
// The command 'plate'.
#include "app/commands.h"

#include "diagnostics/error.h"

namespace whorl::app {

int plate_command(const Options&, Progress&) {
  throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "'plate' is not built yet");
}

}  // namespace whorl::app
