// SPDX-License-Identifier: Apache-2.0
// How progress looks on what standard error really is: a terminal, a poor terminal, a file; NO_COLOR.
#include "app/progress.h"
#include "support/catch.h"
#include "support/program.h"

#include <cstdlib>

#include <fcntl.h>
#include <pty.h>
#include <unistd.h>

using namespace whorl::app;

namespace {

/// Sets or (null) removes a variable, and puts the old state back.
class Variable {
 public:
  Variable(const char* name, const char* value) : name_(name) {
    if (const char* old = std::getenv(name)) {
      old_ = old;
      had_ = true;
    }
    set(value);
  }
  ~Variable() { set(had_ ? old_.c_str() : nullptr); }
  Variable(const Variable&) = delete;
  Variable& operator=(const Variable&) = delete;

 private:
  void set(const char* value) { value != nullptr ? setenv(name_, value, 1) : unsetenv(name_); }
  const char* name_;
  std::string old_;
  bool had_ = false;
};

/// Standard error is this descriptor for as long as it lives.
class StderrIs {
 public:
  explicit StderrIs(int fd) : kept_(dup(STDERR_FILENO)) { dup2(fd, STDERR_FILENO); }
  ~StderrIs() {
    dup2(kept_, STDERR_FILENO);
    close(kept_);
  }
  StderrIs(const StderrIs&) = delete;
  StderrIs& operator=(const StderrIs&) = delete;

 private:
  int kept_;
};

std::string bar_written_to_a_file() {
  const whorl::support::ScratchFolder folder;
  const std::string path = folder.with_file("err", "");
  const int file = open(path.c_str(), O_WRONLY);
  REQUIRE(file >= 0);
  {
    const StderrIs redirected(file);
    Progress progress(ProgressStyle::kBar);
    progress.step("rendering");
  }
  close(file);
  return whorl::support::read_file(path);
}

}  // namespace

TEST_CASE("A bar is drawn on a terminal that can redraw a line, and nowhere else", "[app]") {
  int master = -1, terminal = -1;
  REQUIRE(openpty(&master, &terminal, nullptr, nullptr, nullptr) == 0);
  const int file = open("/dev/null", O_WRONLY);
  struct Case {
    const char* term;
    int fd;
    bool quiet;
    ProgressStyle style;
  };
  for (const Case& c : {Case{"xterm", terminal, false, ProgressStyle::kBar}, Case{"dumb", terminal, false, ProgressStyle::kLines},
                        Case{nullptr, terminal, false, ProgressStyle::kLines}, Case{"xterm", file, false, ProgressStyle::kLines},
                        Case{"xterm", terminal, true, ProgressStyle::kSilent}, Case{"xterm", file, true, ProgressStyle::kSilent}}) {
    const Variable term("TERM", c.term);
    const StderrIs redirected(c.fd);
    CHECK(progress_style_for_stderr(c.quiet) == c.style);
  }
  close(file);
  close(terminal);
  close(master);
}

TEST_CASE("NO_COLOR takes the colour away, not the bar; an empty one is none (no-color.org)", "[app]") {
  const std::string colour = "\x1b[32m";
  {
    const Variable no_color("NO_COLOR", "1");
    const std::string written = bar_written_to_a_file();
    CHECK(written.find("rendering [ ") != std::string::npos);
    CHECK(written.find(colour) == std::string::npos);
  }
  for (const char* none : {static_cast<const char*>(nullptr), ""}) {
    const Variable no_color("NO_COLOR", none);
    CHECK(bar_written_to_a_file().find(colour) != std::string::npos);
  }
}
