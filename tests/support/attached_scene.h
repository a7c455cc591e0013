// SPDX-License-Identifier: Apache-2.0
// Shells with things that stand on them, for tests.
#pragma once

#include "compile/compile.h"
#include "field/field.h"
#include "scene/scene.h"
#include "specimen/scene_file.h"
#include "trace/attached_solids.h"

#include <string>

namespace whorl::test {

/// An open coil whose outside lies bare all round, so that nothing is buried: half-breadth at the lip 10 mm, wall 0.8 mm.
inline std::string open_coil_scene(double inclination_deg = 0.0) {
  return "format = 1\n[specimen]\nname = \"Aperta libera\"\ncoiling = \"dextral\"\n[growth]\nwhorls = 4.0\nW = 2.0\nD = 0.3\nT = 1.8\n"
         "[size]\naperture_height = 20\n[wall]\nthickness = 0.8\n[lip]\ninclination = " +
         std::to_string(inclination_deg) + "\n";
}

/// A closely coiled spire on which later whorls cover much of earlier ones.
inline std::string close_coil_scene() {
  return "format = 1\n[specimen]\nname = \"Clausa arta\"\ncoiling = \"dextral\"\n[growth]\nwhorls = 5.0\nW = 1.7\nD = 0.05\nT = 2.0\n"
         "[size]\nshell_height = 24\n[wall]\nthickness = 0.5\n";
}

struct AttachedShell {
  explicit AttachedShell(const std::string& text)
      : scene(compile::compile_scene(specimen::parse_scene(text, "test"))), field(scene), attached(field) {}
  AttachedShell(const AttachedShell&) = delete;
  AttachedShell& operator=(const AttachedShell&) = delete;

  scene::Scene scene;
  field::Field field;
  trace::AttachedSolids attached;
};

}  // namespace whorl::test
