// SPDX-License-Identifier: Apache-2.0
// Seconds since it was made: of the wall clock, and of processor time over all threads.
#pragma once

#include <chrono>

#include <time.h>

namespace whorl::bench {

class Stopwatch {
 public:
  double seconds() const { return std::chrono::duration<double>(std::chrono::steady_clock::now() - start_).count(); }
  /// What the threads of this process have worked since; other programs on the machine hardly change it.
  double processor_seconds() const { return processor_time() - processor_start_; }

 private:
  static double processor_time() {
    timespec t{};
    clock_gettime(CLOCK_PROCESS_CPUTIME_ID, &t);
    return static_cast<double>(t.tv_sec) + 1e-9 * static_cast<double>(t.tv_nsec);
  }
  std::chrono::steady_clock::time_point start_ = std::chrono::steady_clock::now();
  double processor_start_ = processor_time();
};

}  // namespace whorl::bench
