// SPDX-License-Identifier: Apache-2.0
// The whole program but for its entry point: the one place where errors become messages and exit codes.
#pragma once

namespace whorl::app {

/// Reads the command line, runs the command, prints `error: ...` lines to standard error if it fails.
/// Never throws; returns the exit code of diagnostics::ExitCode.
int run(int argc, char** argv);

}  // namespace whorl::app
