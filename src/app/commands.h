// SPDX-License-Identifier: Apache-2.0
// The commands: each does its work, writes results to standard output and returns the exit code.
#pragma once

#include "app/options.h"
#include "app/progress.h"

namespace whorl::app {

/// All of them throw the errors of diagnostics/error.h; `run` catches those once.
int plate_command(const Options& options, Progress& progress);
int measure_command(const Options& options, Progress& progress);
int check_command(const Options& options, Progress& progress);
int turntable_command(const Options& options, Progress& progress);
int fit_command(const Options& options, Progress& progress);

}  // namespace whorl::app
