// SPDX-License-Identifier: Apache-2.0
// The progress bar, and the plain lines that stand for it in a log.
#include "app/progress.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <cstdlib>
#include <sys/ioctl.h>
#include <unistd.h>

namespace whorl::app {
namespace {

constexpr double kRedrawSeconds = 0.1;   // faster is not seen, and costs the terminal
constexpr double kFirstGuessSeconds = 1.0;  // before that, what is left is a guess from too little
constexpr int kMostCells = 24, kFewestCells = 8;
constexpr int kTailColumns = 24;  // " 100 %  59 min 59 s left"
constexpr int kUsualColumns = 80;

// ECMA-48: carriage return and "erase in line"; "select graphic rendition" for colour.
constexpr std::string_view kEraseLine = "\r\x1b[K";
constexpr std::string_view kGreen = "\x1b[32m";
constexpr std::string_view kPlain = "\x1b[0m";

bool variable_is_set(const char* name) {
  const char* value = std::getenv(name);
  return value != nullptr && *value != '\0';
}

void write_to_stderr(std::string_view text) {
  std::fwrite(text.data(), 1, text.size(), stderr);
  std::fflush(stderr);
}

std::chrono::duration<double> steady_clock() { return std::chrono::steady_clock::now().time_since_epoch(); }

int terminal_columns() {
  winsize size{};
  return ::ioctl(STDERR_FILENO, TIOCGWINSZ, &size) == 0 && size.ws_col > 0 ? size.ws_col : kUsualColumns;
}

}  // namespace

ProgressStyle progress_style_for_stderr(bool quiet) {
  if (quiet) return ProgressStyle::kSilent;
  const char* terminal = std::getenv("TERM");
  const bool can_redraw = terminal != nullptr && *terminal != '\0' && std::string_view(terminal) != "dumb";
  return can_redraw && ::isatty(STDERR_FILENO) == 1 ? ProgressStyle::kBar : ProgressStyle::kLines;
}

std::string duration_text(double seconds) {
  constexpr double kLongest = 1000.0 * 3600.0;
  const auto whole = static_cast<long>(std::ceil(std::clamp(seconds, 1.0, kLongest)));
  if (whole < 60) return fmt::format("{} s", whole);
  if (whole < 3600) return fmt::format("{} min {:02} s", whole / 60, whole % 60);
  return fmt::format("{} h {:02} min", whole / 3600, whole % 3600 / 60);
}

Progress::Progress(ProgressStyle style)
    : Progress(style, write_to_stderr, steady_clock, terminal_columns(), !variable_is_set("NO_COLOR")) {}

Progress::Progress(ProgressStyle style, Write write, Clock clock, int columns, bool coloured)
    : style_(style), write_(std::move(write)), clock_(std::move(clock)), columns_(columns), coloured_(coloured) {}

Progress::~Progress() {
  const std::lock_guard lock(mutex_);
  erase();
}

void Progress::step(std::string_view what) {
  if (style_ == ProgressStyle::kSilent) return;
  const std::lock_guard lock(mutex_);
  what_ = what;
  furthest_ = 0.0;
  began_s_ = clock_().count();
  if (style_ == ProgressStyle::kLines) {
    write_(fmt::format("{}\n", what_));
  } else {
    draw(0.0, began_s_);
  }
}

void Progress::update(double fraction) {
  if (style_ != ProgressStyle::kBar) return;
  const std::lock_guard lock(mutex_);
  const double now_s = clock_().count();
  if (fraction > furthest_) furthest_ = std::min(fraction, 1.0);  // false for what is no number
  if (bar_shown_ && now_s - drawn_s_ < kRedrawSeconds) return;
  draw(furthest_, now_s);
}

void Progress::note(std::string_view text) {
  if (style_ == ProgressStyle::kSilent) return;
  const std::lock_guard lock(mutex_);
  erase();
  write_(fmt::format("{}\n", text));
}

void Progress::draw(double fraction, double seconds) {
  const double elapsed_s = seconds - began_s_;
  std::string left;
  if (fraction > 0.0 && elapsed_s >= kFirstGuessSeconds) {
    left = fmt::format("  {} left", duration_text(elapsed_s * (1.0 - fraction) / fraction));
  }
  const std::string tail = fmt::format(" {:3.0f} %{}", std::floor(fraction * 100.0), left);
  // The last column stays empty: some terminals wrap when it is written. The tail keeps its room, so that nothing jumps.
  const int room = columns_ - 1;
  const int around_bar = 3;  // a space and two brackets
  const int cells = std::clamp(room - static_cast<int>(what_.size()) - around_bar - kTailColumns, kFewestCells, kMostCells);
  const int words_room = room - cells - around_bar - kTailColumns;
  if (words_room > 0) {
    const int full = static_cast<int>(std::lround(fraction * cells));
    write_(fmt::format("{}{} [{}{:<{}}{}]{}", kEraseLine, what_.substr(0, static_cast<std::size_t>(words_room)),
                       coloured_ ? kGreen : "", std::string(static_cast<std::size_t>(full), '='), cells,
                       coloured_ ? kPlain : "", tail));
  } else {
    write_(fmt::format("{}{}", kEraseLine, tail.substr(0, static_cast<std::size_t>(std::max(0, room)))));
  }
  bar_shown_ = true;
  drawn_s_ = seconds;
}

void Progress::erase() {
  if (bar_shown_) write_(kEraseLine);
  bar_shown_ = false;
}

}  // namespace whorl::app
