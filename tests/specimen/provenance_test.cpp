// SPDX-License-Identifier: Apache-2.0
// What a specimen states as preserved, and what follows for every other part of the shell.
#include "specimen/provenance.h"

#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

using namespace whorl::specimen;
using whorl::support::SceneText;

namespace {

// 7.25 whorls, the embryonic shell ends at 0.75.
Preservation preservation_of(const std::string& stretches) { return Preservation(parse_scene(SceneText().text() + stretches, "scene")); }

}  // namespace

TEST_CASE("between preserved stretches parts are interpolated, beyond them extrapolated", "[specimen][provenance]") {
  const Preservation p = preservation_of("[[preserved]]\nfrom = 2\nto = 3\n[[preserved]]\nfrom = 2.25\nto = 1.25\ncounted = \"from the lip\"\n");
  REQUIRE(p.stated());
  const auto outside = [&](double whorl) { return p.of(ShellPart::kOutside, whorl); };
  CHECK(outside(1.9) == Provenance::kExtrapolated);
  CHECK(outside(2.0) == Provenance::kObserved);
  CHECK(outside(3.0) == Provenance::kObserved);
  CHECK(outside(4.0) == Provenance::kInterpolated);
  CHECK(outside(5.5) == Provenance::kObserved);
  CHECK(outside(6.1) == Provenance::kExtrapolated);
  CHECK(p.of(ShellPart::kColumella, 4.0) == Provenance::kInterpolated);
  CHECK(p.of(ShellPart::kEmbryonic, 0.0) == Provenance::kAssumed);
}

TEST_CASE("parts of which nothing is preserved are assumed, and a cut wall is known as little as its lesser known side", "[specimen][provenance]") {
  const Preservation outside = preservation_of("[[preserved]]\nfrom = 3\nparts = \"outside\"\n");
  CHECK(outside.of(ShellPart::kOutside, 7.3) == Provenance::kObserved);  // the rim stands beyond the lip
  CHECK(outside.of(ShellPart::kInside, 5.0) == Provenance::kAssumed);
  CHECK(outside.of(ShellPart::kWall, 5.0) == Provenance::kAssumed);
  CHECK(outside.of(ShellPart::kColumella, 5.0) == Provenance::kAssumed);
  CHECK(outside.along(5.0) == Provenance::kObserved);
  const Preservation mould = preservation_of("[[preserved]]\nfrom = 3\nparts = \"inside\"\n");
  CHECK(mould.of(ShellPart::kInside, 5.0) == Provenance::kObserved);
  CHECK(mould.of(ShellPart::kOutside, 5.0) == Provenance::kAssumed);
  const Preservation wall = preservation_of("[[preserved]]\nto = 3\nparts = \"wall\"\n");
  CHECK(wall.of(ShellPart::kWall, 2.0) == Provenance::kObserved);
  CHECK(wall.of(ShellPart::kColumella, 2.0) == Provenance::kAssumed);
  CHECK(wall.of(ShellPart::kEmbryonic, 0.0) == Provenance::kObserved);  // it begins at the apex
}

TEST_CASE("a specimen that states nothing has no provenance, one that states all is observed all over", "[specimen][provenance]") {
  const Preservation silent = preservation_of("");
  CHECK_FALSE(silent.stated());
  CHECK(silent.of(ShellPart::kOutside, 3.0) == Provenance::kNone);
  const Preservation whole = preservation_of("[[preserved]]\n");
  for (const ShellPart part : {ShellPart::kEmbryonic, ShellPart::kOutside, ShellPart::kInside, ShellPart::kWall, ShellPart::kColumella})
    CHECK(whole.of(part, 0.5) == Provenance::kObserved);
  CHECK(whole.along(0.1) == Provenance::kObserved);
}
