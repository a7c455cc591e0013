// SPDX-License-Identifier: Apache-2.0
// Counts slips between words and picks the nearest.
#include "diagnostics/nearest_word.h"

#include <algorithm>
#include <limits>
#include <vector>

namespace whorl::diagnostics {
namespace {

constexpr int kSlip = 2;  // costs are doubled so that half a slip is whole
constexpr int kCaseSlip = 1;
constexpr std::size_t kLongestCompared = 64;

char lower(char c) { return c >= 'A' && c <= 'Z' ? static_cast<char>(c - 'A' + 'a') : c; }

int exchange(char a, char b) {
  if (a == b) return 0;
  return lower(a) == lower(b) ? kCaseSlip : kSlip;
}

int slips(std::string_view a, std::string_view b) {
  const std::size_t columns = b.size() + 1;
  std::vector<int> cost((a.size() + 1) * columns);
  const auto at = [&](std::size_t i, std::size_t j) -> int& { return cost[i * columns + j]; };
  for (std::size_t i = 0; i <= a.size(); ++i) at(i, 0) = static_cast<int>(i) * kSlip;
  for (std::size_t j = 0; j <= b.size(); ++j) at(0, j) = static_cast<int>(j) * kSlip;
  for (std::size_t i = 1; i <= a.size(); ++i) {
    for (std::size_t j = 1; j <= b.size(); ++j) {
      int best =
          std::min({at(i - 1, j) + kSlip, at(i, j - 1) + kSlip, at(i - 1, j - 1) + exchange(a[i - 1], b[j - 1])});
      if (i > 1 && j > 1 && lower(a[i - 1]) == lower(b[j - 2]) && lower(a[i - 2]) == lower(b[j - 1])) {
        best = std::min(best, at(i - 2, j - 2) + kSlip);
      }
      at(i, j) = best;
    }
  }
  return at(a.size(), b.size());
}

}  // namespace

NearestWord nearest_word(std::string_view typed, std::span<const std::string_view> known) {
  const std::string_view start = typed.substr(0, kLongestCompared);
  NearestWord nearest;
  int fewest = std::numeric_limits<int>::max();
  for (const std::string_view candidate : known) {
    const int count = slips(start, candidate);
    if (count >= fewest) continue;
    fewest = count;
    nearest.word = candidate;
  }
  // One slip in three letters, at least one: more is chance.
  const int allowed = kSlip * std::max(1, static_cast<int>(std::max(start.size(), nearest.word.size())) / 3);
  const bool some_letter_agrees = fewest < kSlip * static_cast<int>(std::max(start.size(), nearest.word.size()));
  nearest.close = !nearest.word.empty() && typed.size() <= kLongestCompared && fewest <= allowed && some_letter_agrees;
  return nearest;
}

}  // namespace whorl::diagnostics
