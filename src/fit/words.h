// SPDX-License-Identifier: Apache-2.0
// The words in which verdicts and origins of values are told.
#pragma once

#include "fit/fit.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <string>

namespace whorl::fit {

inline std::string verdict_words(Verdict verdict) {
  switch (verdict) {
    case Verdict::kFits: return "fits";
    case Verdict::kFitsWithTrend: return "fits with a trend";
    case Verdict::kNotAlone: return "fits, but so does a shell of another shape";
    case Verdict::kDoesNotFit: return "does not fit";
    case Verdict::kNotFixed: return "not fixed by the measurements";
  }
  return {};
}

/// "fitted +- 0.002, from 1.31 to 1.33", "assumed ..; would be fixed by ..".
inline std::string origin_words(const ParameterResult& result) {
  if (result.state == State::kFitted || result.state == State::kAtBound)
    return fmt::format("fitted +- {:.2g}, from {:.5g} to {:.5g}{}{}", result.error, result.low, result.high, result.why.empty() ? "" : "; ",
                       result.why);
  if (result.state != State::kAssumed || result.fixed_by.empty()) return result.why;
  return fmt::format("{}; would be fixed by {}", result.why, fmt::join(result.fixed_by, ", or "));
}

/// The scene may be drawn.
inline bool is_success(Verdict verdict) {
  return verdict == Verdict::kFits || verdict == Verdict::kFitsWithTrend || verdict == Verdict::kNotAlone;
}

}  // namespace whorl::fit
