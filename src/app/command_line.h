// SPDX-License-Identifier: Apache-2.0
// The words of the command line -> options, or the text that --help and --version ask for.
#pragma once

#include "app/options.h"

#include <string>
#include <variant>
#include <vector>

namespace whorl::app {

/// Text that was asked for and belongs on standard output.
struct Answer {
  std::string text;
};

/// `words` are the arguments without the program's name. Throws UsageError: one line that says what is wrong
/// and how to get help. The common options count before and behind the command's name.
std::variant<Options, Answer> read_command_line(std::vector<std::string> words);

}  // namespace whorl::app
