// SPDX-License-Identifier: Apache-2.0
// Carries the path tracer's progress on one picture of several to the user's progress bar.
#pragma once

#include "app/progress.h"
#include "transport/progress.h"

namespace whorl::app {

/// The picture takes `share` of the whole step, after `before` of it.
class PictureProgress final : public transport::Progress {
 public:
  PictureProgress(app::Progress& progress, double before, double share)
      : progress_(progress), before_(before), share_(share) {}
  void done(double fraction) const noexcept override {
    try {
      progress_.update(before_ + share_ * fraction);
    } catch (...) {  // a bar that can't be drawn must not end a render
    }
  }

 private:
  app::Progress& progress_;
  double before_, share_;
};

}  // namespace whorl::app
