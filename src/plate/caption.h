// SPDX-License-Identifier: Apache-2.0
// Words for the figure: a caption to start from, and a text for those who cannot see it.
#pragma once

#include "plate/figure_plan.h"
#include "plate/record.h"
#include "specimen/specimen.h"

#include <string>

namespace whorl::plate {

/// Guides to accessibility ask for fewer characters than this.
inline constexpr int kAltTextLimit = 150;

/// Plain text of two paragraphs: what the figure shows, and what kind of figure it is.
std::string make_caption(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run);

/// Under kAltTextLimit characters; leaves out the less important facts where it would be longer.
std::string make_alt_text(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run);

/// The text file: caption, an empty line, alt text.
std::string make_words_file(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run);

}  // namespace whorl::plate
