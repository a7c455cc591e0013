// SPDX-License-Identifier: Apache-2.0
// Index loops on oneTBB; under the thread sanitizer on plain threads, since distributions build oneTBB without the sanitizer's
// instrumentation and every loop would be reported.
#include "math/parallel.h"

#include <tbb/blocked_range.h>
#include <tbb/global_control.h>
#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

#include <algorithm>
#include <atomic>
#include <memory>
#include <thread>
#include <vector>

#if defined(__SANITIZE_THREAD__)
#define WHORL_PLAIN_THREADS 1
#else
#define WHORL_PLAIN_THREADS 0
#endif

namespace whorl {
namespace {
std::unique_ptr<tbb::global_control> thread_limit;
int requested = 0;
}  // namespace

void set_thread_count(int count) {
  requested = count;
  thread_limit.reset();
  if (count > 0)
    thread_limit = std::make_unique<tbb::global_control>(tbb::global_control::max_allowed_parallelism,
                                                         static_cast<std::size_t>(count));
}

int thread_count() { return requested > 0 ? requested : tbb::this_task_arena::max_concurrency(); }

#if WHORL_PLAIN_THREADS

void parallel_for(std::size_t count, std::size_t, const std::function<void(std::size_t)>& body) {
  const auto workers = std::min(count, static_cast<std::size_t>(std::max(1, thread_count())));
  std::atomic<std::size_t> next{0};
  const auto work = [&] {
    for (std::size_t i = next++; i < count; i = next++) body(i);
  };
  std::vector<std::thread> threads;
  for (std::size_t i = 1; i < workers; ++i) threads.emplace_back(work);
  work();
  for (std::thread& thread : threads) thread.join();
}

#else

void parallel_for(std::size_t count, std::size_t grain, const std::function<void(std::size_t)>& body) {
  tbb::parallel_for(tbb::blocked_range<std::size_t>(0, count, grain ? grain : 1),
                    [&](const tbb::blocked_range<std::size_t>& range) {
                      for (std::size_t i = range.begin(); i != range.end(); ++i) body(i);
                    });
}

#endif

}  // namespace whorl
