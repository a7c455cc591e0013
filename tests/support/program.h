// SPDX-License-Identifier: Apache-2.0
// Runs the built program as a user would and keeps what it said; and folders that tests may fill.
#pragma once

#include <filesystem>
#include <string>
#include <utility>
#include <vector>

namespace whorl::support {

struct Ran {
  int code = -1;    // exit code; 128 + n for an end by signal n
  std::string out;  // standard output
  std::string err;  // standard error, or both where `on_terminal`
};

struct RunAs {
  std::string input;                                         // standard input
  std::vector<std::pair<std::string, std::string>> setting;  // environment variables on top of the present ones
  bool on_terminal = false;                                  // standard error is a terminal of 80 columns
  std::string out_file;                                      // where standard output goes instead of `out`
};

/// Runs WHORL_PROGRAM with these words and waits for its end.
Ran run_program(const std::vector<std::string>& words, const RunAs& as = {});

/// A folder of its own under the system's temporary folder, removed with all that is in it.
class ScratchFolder {
 public:
  ScratchFolder();
  ~ScratchFolder();
  ScratchFolder(const ScratchFolder&) = delete;
  ScratchFolder& operator=(const ScratchFolder&) = delete;
  const std::filesystem::path& path() const { return path_; }
  /// Writes a file into it and returns its path.
  std::string with_file(const std::string& name, const std::string& text) const;

 private:
  std::filesystem::path path_;
};

/// The bytes of a file; fails the test where it cannot be read.
std::string read_file(const std::filesystem::path& path);

}  // namespace whorl::support
