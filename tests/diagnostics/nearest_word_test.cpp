// SPDX-License-Identifier: Apache-2.0
// Which word was meant, and when the program does not presume to know.
#include "diagnostics/nearest_word.h"
#include "support/catch.h"

#include <array>
#include <string>

using whorl::diagnostics::nearest_word;

namespace {

constexpr std::array<std::string_view, 6> kKnown{"thickness", "growth", "columella", "W", "D", "T"};

}  // namespace

TEST_CASE("A letter left out, added, exchanged, or swapped with its neighbour still finds the word", "[diagnostics]") {
  for (const char* typed : {"thicness", "thickkness", "thicknesz", "thikcness", "Thickness", "thickness"}) {
    CAPTURE(typed);
    CHECK(nearest_word(typed, kKnown).word == "thickness");
    CHECK(nearest_word(typed, kKnown).close);
  }
}

TEST_CASE("A wrong case is nearer than a wrong letter", "[diagnostics]") {
  CHECK(nearest_word("w", kKnown).word == "W");
  CHECK(nearest_word("w", kKnown).close);
  CHECK(nearest_word("d", kKnown).word == "D");
  CHECK(nearest_word("t", kKnown).word == "T");
}

TEST_CASE("A word unlike all is given the nearest, but not as close", "[diagnostics]") {
  CHECK_FALSE(nearest_word("ornament", kKnown).word.empty());
  CHECK_FALSE(nearest_word("ornament", kKnown).close);
  CHECK_FALSE(nearest_word("X", kKnown).close);
  CHECK_FALSE(nearest_word("", kKnown).close);
}

TEST_CASE("Of equally near words the first one is taken", "[diagnostics]") {
  constexpr std::array<std::string_view, 2> kPair{"cat", "car"};
  CHECK(nearest_word("cax", kPair).word == "cat");
}

TEST_CASE("Nothing known gives no word, and a word without end is never close", "[diagnostics]") {
  CHECK(nearest_word("thickness", {}).word.empty());
  CHECK_FALSE(nearest_word("thickness", {}).close);
  CHECK_FALSE(nearest_word(std::string(1'000'000, 't'), kKnown).close);
}
