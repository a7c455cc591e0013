// SPDX-License-Identifier: Apache-2.0
// What a user should know of a compiled shell before looking at its pictures.
#pragma once

#include "app/progress.h"
#include "scene/scene.h"

namespace whorl::app {

inline void note_on_shell(const scene::Scene& scene, Progress& progress) {
  if (scene.start_raised)
    progress.note("note: the earliest whorls are under a thousandth of the last and are drawn as the embryonic cap");
}

}  // namespace whorl::app
