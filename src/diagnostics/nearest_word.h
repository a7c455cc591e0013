// SPDX-License-Identifier: Apache-2.0
// Which of the known words was probably meant.
#pragma once

#include <span>
#include <string_view>

namespace whorl::diagnostics {

/// `word` is empty where nothing is known. `close` says that it differs by few slips for its length, so that
/// "did you mean" is a fair question.
struct NearestWord {
  std::string_view word;
  bool close = false;
};

/// The known word with the fewest slips from `typed`; the first one where several are equally near.
/// A slip is a letter left out, added, exchanged, or two neighbours swapped; a wrong case counts as half a slip.
/// Only the first 64 bytes of `typed` are compared, so that hostile input costs nothing.
/// Method: optimal string alignment, after Damerau 1964, Communications of the ACM 7(3): 171-176.
NearestWord nearest_word(std::string_view typed, std::span<const std::string_view> known);

}  // namespace whorl::diagnostics
