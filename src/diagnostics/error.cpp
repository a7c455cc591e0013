// SPDX-License-Identifier: Apache-2.0
// How the faults of a file are put into words.
#include "diagnostics/error.h"

#include <fmt/format.h>

namespace whorl::diagnostics {

std::string InvalidInput::join(const std::string& source, const std::vector<Problem>& problems) {
  std::string text;
  for (const Problem& problem : problems) {
    if (!text.empty()) text += '\n';
    text += problem.where.line > 0
                ? fmt::format("{}:{}:{}: {}", source, problem.where.line, problem.where.column, problem.message)
                : fmt::format("{}: {}", source, problem.message);
  }
  return text;
}

}  // namespace whorl::diagnostics
