// SPDX-License-Identifier: Apache-2.0
// Letters and labels: their size on paper and their typeface.
#include "plate/text_mask.h"

#include "diagnostics/error.h"
#include "support/catch.h"
#include "support/program.h"

#include <cmath>
#include <string>

namespace whorl::plate {

TEST_CASE("Capitals of 8 pt at 600 ppi are as high as the typeface says, within a pixel", "[plate][text]") {
  // Cap height 1409 of 2048 units (Liberation Sans, table OS/2, sCapHeight): 8 / 72 x 600 x 1409 / 2048 = 45.9 pixels.
  for (const char* letter : {"H", "E", "I"}) {
    const TextMask mask = text_mask(letter, 8.0, 600.0, Weight::kRegular);
    CHECK(std::abs(mask.height - 45.9) <= 1.0);
    CHECK(mask.base == mask.height);  // stands on its base line
  }
  const TextMask bold = text_mask("H", 9.0, 600.0, Weight::kBold);
  CHECK(std::abs(bold.height - 51.6) <= 1.0);
}

TEST_CASE("Text keeps its size on paper at any resolution", "[plate][text]") {
  const double at_600 = text_mask("H", 8.0, 600.0, Weight::kRegular).height / 600.0;
  const double at_1200 = text_mask("H", 8.0, 1200.0, Weight::kRegular).height / 1200.0;
  CHECK(std::abs(at_600 - at_1200) * 25.4 < 0.05);  // mm
}

TEST_CASE("The micro sign and letters with tails are drawn below the base line", "[plate][text]") {
  const TextMask plain = text_mask("5 mm", 8.0, 600.0, Weight::kRegular);
  const TextMask micro = text_mask("500 µm", 8.0, 600.0, Weight::kRegular);
  CHECK(plain.height - plain.base <= 2);  // the digit's overshoot
  CHECK(micro.height - micro.base > 8);
  CHECK(micro.width > plain.width);
}

TEST_CASE("Bold ink covers more than regular ink, all of it between nothing and everything", "[plate][text]") {
  double regular = 0.0, bold = 0.0;
  for (const float c : text_mask("A", 9.0, 600.0, Weight::kRegular).coverage) regular += c;
  for (const float c : text_mask("A", 9.0, 600.0, Weight::kBold).coverage) {
    CHECK((c >= 0.0f && c <= 1.0f));
    bold += c;
  }
  CHECK(bold > 1.2 * regular);
}

TEST_CASE("A missing typeface is an error of files that names the package to install", "[plate][text]") {
  const support::ScratchFolder empty;
  try {
    find_font(Weight::kBold, {empty.path()});
    FAIL("a typeface was found in an empty folder");
  } catch (const diagnostics::FileTrouble& trouble) {
    CHECK(std::string(trouble.what()).find("fonts-liberation") != std::string::npos);
    CHECK(std::string(trouble.what()).find(empty.path().string()) != std::string::npos);
  }
  const std::string here = empty.with_file("LiberationSans-Bold.ttf", "");
  CHECK(find_font(Weight::kBold, {"/nowhere", empty.path()}) == here);
}

}  // namespace whorl::plate
