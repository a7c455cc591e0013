// SPDX-License-Identifier: Apache-2.0
// A list that only grows, with one atomic state an entry, so that a signal handler can walk it at any moment.
#include "diagnostics/unfinished_files.h"

#include "diagnostics/whole_file.h"

#include <atomic>
#include <csignal>
#include <mutex>

#include <poll.h>
#include <unistd.h>

namespace whorl::diagnostics {
namespace {

constexpr int kEndings[] = {SIGINT, SIGTERM, SIGHUP};
constexpr int kLongestWait = 2000;  // milliseconds; a hanging network disk must not hold up the end for ever

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
std::atomic<int> uninterrupted{0};  // threads that may not be ended now; they have the signals blocked
std::mutex listing;                 // held by listers, never by the handler

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
  // The threads waited for are others than this one: theirs has the signals blocked.
  for (int waited = 0; uninterrupted.load() > 0 && waited < kLongestWait; ++waited) poll(nullptr, 0, 1);
  remove_all();
  remove_all();  // a library in another thread may just have opened one of them anew
  std::signal(signal_number, SIG_DFL);
  sigset_t only_this;
  sigemptyset(&only_this);
  sigaddset(&only_this, signal_number);
  pthread_sigmask(SIG_UNBLOCK, &only_this, nullptr);
  raise(signal_number);
}

}  // namespace

Uninterrupted::Uninterrupted() {
  sigset_t endings;
  sigemptyset(&endings);
  for (const int signal_number : kEndings) sigaddset(&endings, signal_number);
  pthread_sigmask(SIG_BLOCK, &endings, &earlier_mask_);
  ++uninterrupted;
  if (!ending.load()) return;
  --uninterrupted;
  for (;;) pause();
}

Uninterrupted::~Uninterrupted() {
  --uninterrupted;
  pthread_sigmask(SIG_SETMASK, &earlier_mask_, nullptr);
}

bool list_unfinished(const Uninterrupted&, const std::string& path) {
  const std::lock_guard lock(listing);
  UnfinishedFile* entry = nullptr;
  for (UnfinishedFile* file = first.load(); file != nullptr; file = file->next) {
    const State state = file->state.load();
    if (state == State::kFree) entry = file;
    if (state == State::kListed && file->path == path) return false;
  }
  if (entry != nullptr) {
    entry->state.store(State::kClaimed);
    entry->path = path;
  } else {
    entry = new UnfinishedFile;
    entry->path = path;
    entry->next = first.load();
    first.store(entry);
  }
  entry->state.store(State::kListed);
  return true;
}

void unlist_unfinished(const Uninterrupted&, const std::string& path) {
  const std::lock_guard lock(listing);
  for (UnfinishedFile* file = first.load(); file != nullptr; file = file->next) {
    State expected = State::kListed;
    if (file->path == path && file->state.compare_exchange_strong(expected, State::kFree)) return;
  }
}

void remove_unfinished_on_signals() {
  for (const int signal_number : kEndings) {
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
