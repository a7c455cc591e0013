// SPDX-License-Identifier: Apache-2.0
// The one family of errors that leave the program: what is wrong, where, and with which exit code.
#pragma once

#include "diagnostics/position.h"

#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

namespace whorl::diagnostics {

/// Exit codes are a contract that users' scripts rest on.
enum class ExitCode : int {
  kDone = 0,
  kUnexpected = 1,
  kUsage = 2,
  kInvalidInput = 3,
  kFitFailed = 4,
  kFileTrouble = 6,
  kIncomplete = 75,  // resumable: run the same command again
};

/// Base of the family; thrown early, caught once in main.
class Error : public std::runtime_error {
 public:
  Error(ExitCode code, const std::string& message) : std::runtime_error(message), code_(code) {}
  ExitCode code() const noexcept { return code_; }

 private:
  ExitCode code_;
};

class UsageError : public Error {
 public:
  explicit UsageError(const std::string& message) : Error(ExitCode::kUsage, message) {}
};

/// A file that could not be opened, read, written or renamed; the message names it and says why.
class FileTrouble : public Error {
 public:
  explicit FileTrouble(const std::string& message) : Error(ExitCode::kFileTrouble, message) {}
};

/// One fault of an input file. The message says what is wrong, what was found, what is allowed, what to do.
struct Problem {
  Position where;
  std::string message;
};

/// All faults of one input file, in the order of their lines. `what()` prints one line each:
/// `source:line:column: message`.
class InvalidInput : public Error {
 public:
  InvalidInput(std::string source, std::vector<Problem> problems)
      : Error(ExitCode::kInvalidInput, join(source, problems)),
        source_(std::move(source)),
        problems_(std::move(problems)) {}
  const std::string& source() const noexcept { return source_; }
  const std::vector<Problem>& problems() const noexcept { return problems_; }

 private:
  static std::string join(const std::string& source, const std::vector<Problem>& problems);
  std::string source_;
  std::vector<Problem> problems_;
};

}  // namespace whorl::diagnostics
