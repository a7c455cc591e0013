// SPDX-License-Identifier: Apache-2.0
// A list that only grows, with one atomic state an entry, so that a signal handler can walk it at any moment.
#include "diagnostics/unfinished_files.h"

#include "diagnostics/whole_file.h"

#include <atomic>
#include <csignal>
#include <mutex>

#include <unistd.h>

namespace whorl::diagnostics {
namespace {

// The path may change only in state kClaimed, and is read by the handler only in state kRemoving.
enum class State : int { kFree, kClaimed, kListed, kRemoving };
static_assert(std::atomic<State>::is_always_lock_free, "the signal handler may not take locks");

/// Never freed; a free entry serves the next file.
struct UnfinishedFile {
  std::string path;
  std::atomic<State> state{State::kClaimed};
  UnfinishedFile* next = nullptr;
};

std::atomic<UnfinishedFile*> first{nullptr};
std::atomic<bool> ending{false};
std::mutex listing;  // held by listers, never by the handler

[[noreturn]] void wait_for_the_end() {
  for (;;) pause();
}

void remove_all() {
  for (UnfinishedFile* file = first.load(); file != nullptr; file = file->next) {
    State expected = State::kListed;
    if (file->state.compare_exchange_strong(expected, State::kRemoving) || expected == State::kRemoving) {
      unlink(file->path.c_str());
    }
  }
}

extern "C" void whorl_remove_unfinished_and_die(int signal_number) {
  ending.store(true);
  remove_all();
  remove_all();  // another thread may just have opened one of them anew
  std::signal(signal_number, SIG_DFL);
  sigset_t only_this;
  sigemptyset(&only_this);
  sigaddset(&only_this, signal_number);
  pthread_sigmask(SIG_UNBLOCK, &only_this, nullptr);
  raise(signal_number);
}

}  // namespace

bool list_unfinished(const std::string& path) {
  const std::lock_guard lock(listing);
  UnfinishedFile* free_entry = nullptr;
  for (UnfinishedFile* file = first.load(); file != nullptr; file = file->next) {
    const State state = file->state.load();
    if (state == State::kFree) free_entry = file;
    if (state == State::kListed && file->path == path) return false;
  }
  if (free_entry != nullptr) {
    free_entry->state.store(State::kClaimed);
    free_entry->path = path;
  } else {
    free_entry = new UnfinishedFile;
    free_entry->path = path;
    free_entry->next = first.load();
    first.store(free_entry);
  }
  free_entry->state.store(State::kListed);
  if (ending.load()) wait_for_the_end();
  return true;
}

void unlist_unfinished(const std::string& path) {
  const std::lock_guard lock(listing);
  for (UnfinishedFile* file = first.load(); file != nullptr; file = file->next) {
    State expected = State::kListed;
    if (file->path == path && file->state.compare_exchange_strong(expected, State::kFree)) return;
  }
}

void stop_if_ending(const std::string& made_path) {
  if (!ending.load()) return;
  unlink(made_path.c_str());
  wait_for_the_end();
}

void remove_unfinished_on_signals() {
  for (const int signal_number : {SIGINT, SIGTERM, SIGHUP}) {
    struct sigaction earlier = {};
    // A signal that the caller has us ignore (nohup, a background job) stays ignored.
    if (sigaction(signal_number, nullptr, &earlier) == 0 && earlier.sa_handler == SIG_IGN) continue;
    struct sigaction action = {};
    action.sa_handler = whorl_remove_unfinished_and_die;
    sigfillset(&action.sa_mask);
    sigaction(signal_number, &action, nullptr);
  }
}

}  // namespace whorl::diagnostics
