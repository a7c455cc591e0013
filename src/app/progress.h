// SPDX-License-Identifier: Apache-2.0
// Tells the waiting user what is being done and how long it will take, on standard error.
#pragma once

#include <chrono>
#include <functional>
#include <mutex>
#include <string>
#include <string_view>

namespace whorl::app {

/// kBar redraws one line of a terminal; kLines writes one plain line a step (for logs); kSilent writes nothing.
enum class ProgressStyle { kSilent, kLines, kBar };

/// How standard error wants it: silent if `quiet`, a bar on a terminal that can redraw a line, else lines.
ProgressStyle progress_style_for_stderr(bool quiet);

class Progress {
 public:
  using Write = std::function<void(std::string_view)>;
  using Clock = std::function<std::chrono::duration<double>()>;

  /// On standard error, in colour unless NO_COLOR is set to something (no-color.org).
  explicit Progress(ProgressStyle style);
  /// For tests: `columns` is the width of the terminal, `clock` counts from any origin.
  Progress(ProgressStyle style, Write write, Clock clock, int columns, bool coloured);
  /// Removes the bar, so that whatever is printed next starts on a clean line.
  ~Progress();
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;

  /// Begins a step, in words that a user understands ("rendering 4 panels"); the step before it is done.
  void step(std::string_view what);
  /// The present step is done to `fraction`, 0 .. 1; the highest one told counts. Any thread may call it, as often as it likes.
  void update(double fraction);
  /// A remark that stays on the screen, such as a warning; silent only with kSilent.
  void note(std::string_view text);

 private:
  void draw(double fraction, double seconds);
  void erase();

  const ProgressStyle style_;
  const Write write_;
  const Clock clock_;
  const int columns_;
  const bool coloured_;
  std::mutex mutex_;
  std::string what_;
  double furthest_ = 0.0, began_s_ = 0.0, drawn_s_ = 0.0;
  bool bar_shown_ = false;
};

/// "45 s", "3 min 20 s", "2 h 05 min"; rounded up, so that a job that still runs never shows "0 s".
std::string duration_text(double seconds);

}  // namespace whorl::app
