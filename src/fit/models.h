// SPDX-License-Identifier: Apache-2.0
// The growth models that a fit chooses from, simplest first, and how it chooses.
#pragma once

#include "fit/assumptions.h"
#include "fit/solve.h"

namespace whorl::fit {

/// A setting with its best solution.
struct Settled {
  Setting setting;
  Solution solution;
  Knowledge knowledge;
  std::vector<Solution> others;  // further minima
};

/// Solves, and gives up what the readings do not fix. Empty where no shape has all the measures; `knowledge.weakest` tells
/// whether size and expansion are fixed.
std::optional<Settled> settle(Setting setting);

/// A direction less certain than this, in plausible widths, is not fixed by the data.
inline constexpr double kWeak = 0.5;

/// Corrected Akaike criterion: -2 ln L + 2 k + 2 k (k + 1) / (n - k - 1), normal errors (Hurvich & Tsai 1989, Biometrika 76:
/// 297-307); infinite where n - k - 1 < 1.
double corrected_aic(double minus_two_ln_likelihood, std::size_t parameters, std::size_t readings);

/// Tries a trend of W along the shell and expansions of their own for distance and depth beside one W for all, and returns
/// the model of least corrected AIC. `models` receives what was tried.
Settled choose_model(Settled simplest, std::vector<ModelResult>& models);

}  // namespace whorl::fit
