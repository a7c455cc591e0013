// SPDX-License-Identifier: Apache-2.0
// The only door to threads: index loops whose iterations must not depend on one another.
#pragma once

#include <cstddef>
#include <functional>

namespace whorl {

/// Limits every later loop to `count` threads; 0 means one a core. Not thread-safe: call it once at start.
void set_thread_count(int count);
/// The number of threads that loops use now.
int thread_count();

/// Runs body(i) for i in [0, count), in any order and on any thread, in chunks of at least `grain`.
/// An exception thrown by a body stops the loop and is rethrown here.
void parallel_for(std::size_t count, std::size_t grain, const std::function<void(std::size_t)>& body);

}  // namespace whorl
