// SPDX-License-Identifier: Apache-2.0
// Expansion with growth: by which factor a length at one growth angle is smaller than at the lip.
#pragma once

#include "specimen/specimen.h"

#include <vector>

namespace whorl::growth {

/// g(theta) = exp(integral of k from the lip to theta), k = ln W / 2 pi. Within stages ln W runs straight from stage
/// to stage and is constant before the first and after the last, so g is C1 everywhere; for one W it is exactly
/// W^((theta - theta_lip) / 2 pi). Angles in radians, any value.
class Expansion {
 public:
  Expansion() = default;
  /// Stages as the scene file states them (at least one, whorls rising strictly, W > 0).
  Expansion(const specimen::Stages& stages, double theta_lip);

  /// g(theta) > 0; 1 at the lip.
  double factor(double theta) const;
  /// k(theta), per radian: the relative growth of a length.
  double rate(double theta) const;
  bool is_constant() const { return knots_.size() == 1; }
  bool operator==(const Expansion&) const = default;

 private:
  struct Knot {
    double theta, rate, integral;  // integral of k from the first knot
    bool operator==(const Knot&) const = default;
  };
  double integral(double theta) const;

  std::vector<Knot> knots_{{0.0, 0.0, 0.0}};
  double at_lip_ = 0.0;
};

}  // namespace whorl::growth
