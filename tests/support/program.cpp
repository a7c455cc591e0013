// SPDX-License-Identifier: Apache-2.0
// Child processes with files for their streams, so that no pipe can fill up, or with a terminal for standard error.
#include "support/program.h"

#include "support/catch.h"

#include <fstream>
#include <iterator>

#include <fcntl.h>
#include <pty.h>
#include <stdlib.h>
#include <sys/wait.h>
#include <unistd.h>

namespace whorl::support {
namespace {

/// Reads a terminal until its other end is closed, which Linux reports as an error (EIO).
std::string drain_terminal(int master) {
  std::string text;
  char bytes[4096];
  for (;;) {
    const ssize_t got = read(master, bytes, sizeof bytes);
    if (got <= 0) break;
    text.append(bytes, static_cast<std::size_t>(got));
  }
  close(master);
  return text;
}

// Only calls that are safe between fork and exec.
[[noreturn]] void become_program(char** words, const char* in, const char* out, int err) {
  constexpr mode_t kMode = 0600;
  constexpr int kCannotStart = 127;
  const int in_fd = open(in, O_RDONLY);
  const int out_fd = open(out, O_WRONLY | O_CREAT, kMode);
  if (in_fd < 0 || out_fd < 0 || dup2(in_fd, 0) < 0 || dup2(out_fd, 1) < 0 || dup2(err, 2) < 0) _exit(kCannotStart);
  execv(words[0], words);
  _exit(kCannotStart);
}

}  // namespace

Ran run_program(const std::vector<std::string>& words, const RunAs& as) {
  const ScratchFolder folder;
  const std::string in = folder.with_file("in", as.input);
  const std::string out = as.out_file.empty() ? (folder.path() / "out").string() : as.out_file;
  const std::string err = folder.with_file("err", "");

  std::vector<std::string> all{WHORL_PROGRAM};
  all.insert(all.end(), words.begin(), words.end());
  std::vector<char*> pointers;
  for (std::string& word : all) pointers.push_back(word.data());
  pointers.push_back(nullptr);

  int master = -1, err_fd = -1;
  if (as.on_terminal) {
    winsize size{};
    size.ws_row = 25;
    size.ws_col = 80;
    REQUIRE(openpty(&master, &err_fd, nullptr, nullptr, &size) == 0);
  } else {
    err_fd = open(err.c_str(), O_WRONLY);
  }
  REQUIRE(err_fd >= 0);

  const pid_t child = fork();
  REQUIRE(child >= 0);
  if (child == 0) {
    for (const auto& [name, value] : as.setting) setenv(name.c_str(), value.c_str(), 1);
    become_program(pointers.data(), in.c_str(), out.c_str(), err_fd);
  }
  close(err_fd);
  Ran ran;
  if (as.on_terminal) ran.err = drain_terminal(master);
  int status = 0;
  REQUIRE(waitpid(child, &status, 0) == child);
  ran.code = WIFEXITED(status) ? WEXITSTATUS(status) : 128 + WTERMSIG(status);
  if (!as.on_terminal) ran.err = read_file(err);
  if (as.out_file.empty()) ran.out = read_file(out);
  return ran;
}

ScratchFolder::ScratchFolder() {
  std::string pattern = (std::filesystem::temp_directory_path() / "whorl_test_XXXXXX").string();
  REQUIRE(mkdtemp(pattern.data()) != nullptr);
  path_ = pattern;
}

ScratchFolder::~ScratchFolder() {
  std::error_code ignored;
  std::filesystem::remove_all(path_, ignored);
}

std::string ScratchFolder::with_file(const std::string& name, const std::string& text) const {
  const std::filesystem::path file = path_ / name;
  std::ofstream(file, std::ios::binary) << text;
  return file.string();
}

std::string read_file(const std::filesystem::path& path) {
  std::ifstream file(path, std::ios::binary);
  INFO(path.string());
  REQUIRE(file.good());
  return {std::istreambuf_iterator<char>(file), std::istreambuf_iterator<char>()};
}

}  // namespace whorl::support
