// SPDX-License-Identifier: Apache-2.0
// Cords, ribs and nodules of a scene file.
#include "specimen/scene_reader.h"

namespace whorl::specimen {

Sculpture SceneReader::read_sculpture() {
  Sculpture sculpture;
  for (const TableReader& t : list("cord", &root_))
    sculpture.cords.push_back({t.number("at"), t.number("width"), t.number("height"), t.number("onset"), t.number("end"), t.number("growth")});
  for (const TableReader& t : list("rib", &root_))
    sculpture.ribs.push_back({t.number("per_whorl"), t.number("height"), t.number("breadth"), t.number("at"), t.number("width"),
                              t.number("behind_lip"), t.number("irregularity"), t.number("onset"), t.number("end"),
                              t.whole("seed"), t.number("growth")});
  for (const TableReader& t : list("nodule", &root_))
    sculpture.nodules.push_back({t.number("per_whorl"), t.number("height"), t.number("length"), t.number("at"), t.number("width"),
                                 t.number("behind_lip"), t.number("irregularity"), t.number("onset"), t.number("end"),
                                 t.whole("seed"), t.number("growth")});
  return sculpture;
}

}  // namespace whorl::specimen
