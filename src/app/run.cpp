// SPDX-License-Identifier: Apache-2.0
// From the command line to the exit code; every error ends here.
#include "app/run.h"

#include "app/command_line.h"
#include "app/commands.h"
#include "diagnostics/error.h"
#include "diagnostics/whole_file.h"
#include "math/parallel.h"

#include <cerrno>
#include <cstdio>
#include <cstring>
#include <exception>
#include <new>
#include <string_view>

namespace whorl::app {
namespace {

using diagnostics::ExitCode;

// Plain stdio: this must work when there is no memory left.
void print_error(std::string_view message) {
  while (!message.empty()) {
    const std::size_t end = message.find('\n');
    const std::string_view line = message.substr(0, end);
    std::fprintf(stderr, "error: %.*s\n", static_cast<int>(line.size()), line.data());
    message.remove_prefix(end == std::string_view::npos ? message.size() : end + 1);
  }
}

int perform(const Options& options) {
  set_thread_count(options.threads);
  Progress progress(progress_style_for_stderr(options.quiet));
  switch (options.command) {
    case Command::kPlate: return plate_command(options, progress);
    case Command::kMeasure: return measure_command(options, progress);
    case Command::kCheck: return check_command(options, progress);
    case Command::kTurntable: return turntable_command(options, progress);
    case Command::kFit: return fit_command(options, progress);
  }
  return static_cast<int>(ExitCode::kUnexpected);
}

int perform_words(int argc, char** argv) {
  const auto read = read_command_line(std::vector<std::string>(argv + (argc > 0 ? 1 : 0), argv + argc));
  int code = static_cast<int>(ExitCode::kDone);
  if (const Answer* answer = std::get_if<Answer>(&read)) {
    std::fputs(answer->text.c_str(), stdout);
  } else {
    code = perform(std::get<Options>(read));
  }
  // Results that did not arrive (a full disk, a closed stream) must not look like success.
  if (std::fflush(stdout) != 0 || std::ferror(stdout) != 0) {
    throw diagnostics::FileTrouble(std::string("standard output could not be written: ") + std::strerror(errno));
  }
  return code;
}

}  // namespace

int run(int argc, char** argv) {
  try {
    diagnostics::remove_unfinished_on_signals();
    return perform_words(argc, argv);
  } catch (const diagnostics::Error& error) {
    print_error(error.what());
    return static_cast<int>(error.code());
  } catch (const std::bad_alloc&) {
    print_error("the memory does not suffice; try a smaller width, resolution or number of panels");
  } catch (const std::exception& error) {
    print_error("unexpected failure:");
    print_error(error.what());
  } catch (...) {
    print_error("unexpected failure of unknown kind");
  }
  return static_cast<int>(ExitCode::kUnexpected);
}

}  // namespace whorl::app
