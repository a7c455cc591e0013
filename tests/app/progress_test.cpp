// SPDX-License-Identifier: Apache-2.0
// The progress bar, its time left, and its silence where it is not wanted.
#include "app/progress.h"
#include "support/catch.h"

#include <cmath>
#include <thread>
#include <vector>

using namespace whorl::app;

namespace {

struct Watched {
  explicit Watched(ProgressStyle style, int columns = 80, bool coloured = false)
      : progress(
            style, [this](std::string_view text) { written += text; },
            [this] { return std::chrono::duration<double>(now_s); }, columns, coloured) {}
  std::string written;
  double now_s = 1000.0;
  Progress progress;

  /// What stands on the line after the last redrawing.
  std::string line() const { return written.substr(written.rfind("\x1b[K") + 3); }
};

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

}  // namespace

TEST_CASE("In a log each step is one plain line, whatever its progress", "[app]") {
  Watched watched(ProgressStyle::kLines, 80, true);
  watched.progress.step("compiling");
  watched.progress.step("rendering");
  for (int i = 0; i <= 100; ++i) {
    watched.now_s += 1.0;
    watched.progress.update(i / 100.0);
  }
  watched.progress.note("a remark");
  CHECK(watched.written == "compiling\nrendering\na remark\n");
}

TEST_CASE("Silent progress writes nothing", "[app]") {
  Watched watched(ProgressStyle::kSilent);
  watched.progress.step("rendering");
  watched.progress.update(0.5);
  watched.progress.note("a remark");
  CHECK(watched.written.empty());
}

TEST_CASE("The time left is what the done part took, times what is left over what is done", "[app]") {
  Watched watched(ProgressStyle::kBar);
  watched.progress.step("rendering");
  watched.now_s += 30.0;
  watched.progress.update(0.25);  // 30 s for a quarter: 90 s for the rest
  CHECK(watched.line() == "rendering [======                  ]  25 %  1 min 30 s left");
  watched.now_s += 0.01;
  const std::string before = watched.written;
  watched.progress.update(0.9);
  CHECK(watched.written == before);  // too soon to be seen
}

TEST_CASE("Long words leave the bar's end where it is when the time left becomes known", "[app]") {
  Watched watched(ProgressStyle::kBar);
  watched.progress.step("rendering 6 panels, 4252 x 3756 pixels");
  const std::size_t before = watched.line().find(']');
  watched.now_s += 60.0;
  watched.progress.update(0.1);
  CHECK(contains(watched.line(), "4252 x 3756 pixels [="));
  CHECK(contains(watched.line(), "]  10 %  9 min 00 s left"));
  CHECK(watched.line().find(']') == before);
}

TEST_CASE("News that come late do not take the bar back", "[app]") {
  Watched watched(ProgressStyle::kBar);
  watched.progress.step("rendering");
  for (const double fraction : {0.5, 0.25}) {
    watched.now_s += 5.0;
    watched.progress.update(fraction);
  }
  CHECK(contains(watched.line(), "]  50 %"));
}

TEST_CASE("A new step counts its time anew", "[app]") {
  Watched watched(ProgressStyle::kBar);
  watched.progress.step("compiling");
  watched.now_s += 500.0;
  watched.progress.step("rendering");
  watched.now_s += 2.0;
  watched.progress.update(0.5);
  CHECK(contains(watched.line(), " 50 %  2 s left"));
}

TEST_CASE("The bar never reaches the last column of the terminal", "[app]") {
  for (int columns = 0; columns <= 120; ++columns) {
    Watched watched(ProgressStyle::kBar, columns);
    watched.progress.step("rendering four panels with a rather long description of what they show");
    watched.now_s += 4000.0;
    watched.progress.update(0.1);
    INFO(columns);
    CHECK(static_cast<int>(watched.line().size()) <= std::max(0, columns - 1));
  }
}

TEST_CASE("A fraction outside 0 to 1 draws no more than a full or an empty bar", "[app]") {
  Watched watched(ProgressStyle::kBar);
  watched.progress.step("s");
  for (const double fraction : {-1.0, 7.0, std::nan("")}) {
    watched.now_s += 5.0;
    watched.progress.update(fraction);
    CHECK(watched.line().find(']') - watched.line().find('[') == 25);
  }
}

TEST_CASE("Colour is used only where it is allowed, and ends where the bar ends", "[app]") {
  for (const bool coloured : {false, true}) {
    Watched watched(ProgressStyle::kBar, 80, coloured);
    watched.progress.step("rendering");
    CHECK(contains(watched.written, "\x1b[32m") == coloured);
    CHECK(contains(watched.written, "\x1b[0m]") == coloured);
  }
}

TEST_CASE("The bar is gone when the work ends or a remark is made", "[app]") {
  std::string written;
  {
    Progress progress(
        ProgressStyle::kBar, [&](std::string_view text) { written += text; },
        [] { return std::chrono::duration<double>(0.0); }, 80, false);
    progress.step("rendering");
    progress.note("a remark");
    CHECK(written.substr(written.size() - 13) == "\r\x1b[Ka remark\n");
    progress.step("writing");
  }
  CHECK(written.substr(written.size() - 4) == "\r\x1b[K");
}

TEST_CASE("Threads may report progress at the same time without mixing their lines", "[app]") {
  std::string written;
  double now_s = 0.0;
  Progress progress(
      ProgressStyle::kBar, [&](std::string_view text) { written += text; },
      [&] { return std::chrono::duration<double>(now_s += 1.0); }, 80, false);
  progress.step("rendering");
  std::vector<std::thread> threads;
  for (int t = 0; t < 4; ++t) {
    threads.emplace_back([&] {
      for (int i = 0; i < 250; ++i) progress.update(i / 250.0);
    });
  }
  for (std::thread& thread : threads) thread.join();
  std::size_t lines = 0;
  for (std::size_t at = 0; at < written.size(); ++lines) {
    CHECK(written.compare(at, 14, "\r\x1b[Krendering ") == 0);
    at = std::min(written.find('\r', at + 1), written.size());
  }
  CHECK(lines == 1001);
}

TEST_CASE("Durations are rounded up and told in the two largest units", "[app]") {
  CHECK(duration_text(0.0) == "1 s");
  CHECK(duration_text(44.2) == "45 s");
  CHECK(duration_text(59.9) == "1 min 00 s");
  CHECK(duration_text(200.0) == "3 min 20 s");
  CHECK(duration_text(7500.0) == "2 h 05 min");
  CHECK(duration_text(1e300) == "1000 h 00 min");
}
