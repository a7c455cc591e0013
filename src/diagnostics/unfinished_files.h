// SPDX-License-Identifier: Apache-2.0
// The list of files in the making, readable from a signal handler.
#pragma once

#include <string>

#include <csignal>

namespace whorl::diagnostics {

/// While one exists, a signal that ends the process waits (up to two seconds) before it removes what is on the list: a
/// file and its entry change together. Keep it to a few system calls. Where the end has already begun, the constructor
/// does not return.
class Uninterrupted {
 public:
  Uninterrupted();
  ~Uninterrupted();
  Uninterrupted(const Uninterrupted&) = delete;
  Uninterrupted& operator=(const Uninterrupted&) = delete;

 private:
  sigset_t earlier_mask_;
};

/// Puts `path` on the list, to be removed should a signal end the process. False where it is on the list already.
bool list_unfinished(const Uninterrupted&, const std::string& path);
/// Takes it off again.
void unlist_unfinished(const Uninterrupted&, const std::string& path);

}  // namespace whorl::diagnostics
