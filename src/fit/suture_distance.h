// SPDX-License-Identifier: Apache-2.0
// The sutures of a form as a side view shows them.
#pragma once

#include "fit/form.h"

#include <vector>

namespace whorl::fit {

/// The sutures on the side that is turned to the reader, by their chords: x away from the axis towards the azimuth `right`, z down
/// from the pole, mm. None where later whorls hide the earlier ones.
class SutureLines {
 public:
  SutureLines(const Form& form, double right);

  /// Signed distance to the nearest line, positive on its apical side; infinite where there is none. Right to the chords' sagitta,
  /// 1e-3 of the radius there.
  double distance(double x, double z) const;

  struct Chord {
    double x0, z0, x1, z1;
  };
  const std::vector<Chord>& chords() const { return chords_; }

 private:
  std::vector<Chord> chords_;
};

}  // namespace whorl::fit
