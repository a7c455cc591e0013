// SPDX-License-Identifier: Apache-2.0
// How a long render tells that it moves on.
#pragma once

namespace whorl::transport {

class Progress {
 public:
  virtual ~Progress() = default;
  /// `fraction` of the work done, 0 .. 1. Called from any thread, several at once, not always in rising order.
  virtual void done(double fraction) const noexcept = 0;
};

/// For callers that do not want to know.
class Silent final : public Progress {
 public:
  void done(double) const noexcept override {}
};

}  // namespace whorl::transport
