// SPDX-License-Identifier: Apache-2.0
// A process that a signal ends leaves no unfinished file, and ends by that signal. Each case runs in a child process.
#include "diagnostics/error.h"
#include "diagnostics/whole_file.h"
#include "support/catch.h"
#include "support/program.h"

#include <atomic>
#include <csignal>
#include <filesystem>
#include <functional>
#include <thread>
#include <vector>

#include <sys/resource.h>
#include <sys/wait.h>
#include <unistd.h>

using namespace whorl::diagnostics;
using whorl::support::ScratchFolder;

namespace {

/// Runs `work` in a child process; its wait status.
int status_of(const std::function<void()>& work) {
  const pid_t child = fork();
  if (child == 0) {
    work();
    _exit(0);
  }
  int status = 0;
  waitpid(child, &status, 0);
  return status;
}

bool ended_by(int status, int signal_number) { return WIFSIGNALED(status) && WTERMSIG(status) == signal_number; }

std::size_t files_in(const std::filesystem::path& folder) {
  std::size_t count = 0;
  for ([[maybe_unused]] const auto& entry : std::filesystem::directory_iterator(folder)) ++count;
  return count;
}

}  // namespace

TEST_CASE("SIGINT, SIGTERM and SIGHUP remove unfinished files, keep finished ones, and end the process by that signal",
          "[diagnostics]") {
  for (const int signal_number : {SIGINT, SIGTERM, SIGHUP}) {
    const ScratchFolder folder;
    const int status = status_of([&] {
      signal(signal_number, SIG_DFL);
      remove_unfinished_on_signals();
      write_whole_file(folder.path() / "done.txt", "done");
      const WholeFile first(folder.path() / "a.png"), second(folder.path() / "b.exr");
      raise(signal_number);
    });
    CAPTURE(signal_number, status);
    CHECK(ended_by(status, signal_number));
    CHECK(files_in(folder.path()) == 1);
    CHECK(std::filesystem::exists(folder.path() / "done.txt"));
  }
}

TEST_CASE("A process that was told to ignore SIGHUP goes on ignoring it", "[diagnostics]") {
  const ScratchFolder folder;
  const int status = status_of([&] {
    signal(SIGHUP, SIG_IGN);
    remove_unfinished_on_signals();
    WholeFile file(folder.path() / "a.txt");
    raise(SIGHUP);
    file.commit();
  });
  CHECK((WIFEXITED(status) && WEXITSTATUS(status) == 0));
  CHECK(std::filesystem::exists(folder.path() / "a.txt"));
}

TEST_CASE("A signal in the midst of threads that write leaves only whole files", "[diagnostics]") {
  const ScratchFolder folder;
  for (int round = 0; round < 10; ++round) {
    const int status = status_of([&] {
      signal(SIGTERM, SIG_DFL);
      remove_unfinished_on_signals();
      std::atomic<int> written{0};
      std::vector<std::thread> threads;
      for (int t = 0; t < 3; ++t) {
        threads.emplace_back([&, t] {
          for (;;) {
            write_whole_file(folder.path() / ("f" + std::to_string(t)), "whole");
            ++written;
          }
        });
      }
      while (written < 5 + round) std::this_thread::yield();
      kill(getpid(), SIGTERM);
      for (std::thread& thread : threads) thread.join();
    });
    CHECK(ended_by(status, SIGTERM));
    for (const auto& entry : std::filesystem::directory_iterator(folder.path())) {
      CAPTURE(entry.path().string());
      CHECK(entry.path().filename().string()[0] == 'f');
      CHECK(whorl::support::read_file(entry.path()) == "whole");
    }
  }
}

TEST_CASE("A disk that takes no more is file trouble, and nothing is left", "[diagnostics]") {
  const ScratchFolder folder;
  const int status = status_of([&] {
    signal(SIGXFSZ, SIG_IGN);  // the write then fails with EFBIG, as on a full disk with ENOSPC
    const rlimit limit{1000, 1000};
    setrlimit(RLIMIT_FSIZE, &limit);
    try {
      write_whole_file(folder.path() / "a.txt", std::string(5000, 'x'));
    } catch (const FileTrouble&) {
      _exit(6);
    }
  });
  CHECK((WIFEXITED(status) && WEXITSTATUS(status) == 6));
  CHECK(files_in(folder.path()) == 0);
}
