// SPDX-License-Identifier: Apache-2.0
// The command 'measure'.
#include "app/commands.h"

#include "diagnostics/error.h"

namespace whorl::app {

int measure_command(const Options&, Progress&) {
  throw diagnostics::Error(diagnostics::ExitCode::kUnexpected, "'measure' is not built yet");
}

}  // namespace whorl::app
