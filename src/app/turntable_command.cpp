// SPDX-License-Identifier: Apache-2.0
// The command 'turntable'.
#include "app/commands.h"

#include "diagnostics/error.h"

namespace whorl::app {

int turntable_command(const Options&, Progress&) {
  throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "'turntable' is not built yet");
}

}  // namespace whorl::app
