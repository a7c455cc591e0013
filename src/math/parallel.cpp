// SPDX-License-Identifier: Apache-2.0
// Index loops on oneTBB.
#include "math/parallel.h"

#include <tbb/blocked_range.h>
#include <tbb/global_control.h>
#include <tbb/parallel_for.h>
#include <tbb/task_arena.h>

#include <memory>

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

void parallel_for(std::size_t count, std::size_t grain, const std::function<void(std::size_t)>& body) {
  tbb::parallel_for(tbb::blocked_range<std::size_t>(0, count, grain ? grain : 1),
                    [&](const tbb::blocked_range<std::size_t>& range) {
                      for (std::size_t i = range.begin(); i != range.end(); ++i) body(i);
                    });
}

}  // namespace whorl
