// SPDX-License-Identifier: Apache-2.0
// What of a figure was stated by its author, what was assumed, and in which words that is said.
#pragma once

#include "specimen/specimen.h"

#include <string>
#include <vector>

namespace whorl::plate {

/// One value that shapes or paints the shell.
struct Basis {
  std::string key;    // as in the scene file, "growth.W"
  std::string words;  // as in a caption, "whorl expansion W"
  bool given = false; // stated in the scene file; else a default
  bool shapes = false; // acts on the form, not only on how it looks
};

/// In the order of the scene file's tables. A key that is optional and absent is left out.
std::vector<Basis> basis_of(const specimen::Specimen& specimen);

/// The words of all that act on the form and were stated (or not), "a, b and c"; "" for none.
std::string shaping_words(const std::vector<Basis>& basis, bool given);

/// "a", "a and b", "a, b and c".
std::string in_words(const std::vector<std::string>& items);

const char* mineral_word(specimen::Mineral mineral);

/// The key light's direction on the page: "upper left", "the right", "the front" ...
std::string light_words(const specimen::Light& light);

/// What kind of thing the picture shows.
inline constexpr const char* kDisclosureClass = "computed model from stated measurements";
/// The sentence that no caption goes without.
inline constexpr const char* kTypeSentence =
    "It is an aid to comparison and never a name-bearing type: the International Code of Zoological Nomenclature decides on "
    "name-bearing types, and the institution that holds the specimen is the authority on it.";

}  // namespace whorl::plate
