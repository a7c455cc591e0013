// SPDX-License-Identifier: Apache-2.0
// Bands, flames, spots and computed patterns of a scene file.
#include "specimen/scene_reader.h"

namespace whorl::specimen {
namespace {

Pigment read_pigment(const TableReader& t) {
  return {t.colour("colour"), t.number("opacity"), t.number("fade"), t.number("onset"), t.number("end")};
}

}  // namespace

Colouring SceneReader::read_colouring() {
  Colouring colouring;
  for (const TableReader& t : list("band", &root_))
    colouring.bands.push_back({t.number("at"), t.number("width"), read_pigment(t)});
  for (const TableReader& t : list("flame", &root_))
    colouring.flames.push_back({t.number("per_whorl"), t.number("breadth"), t.number("at"), t.number("width"),
                                t.number("taper"), t.number("sway"), t.number("bends"), t.number("irregularity"),
                                t.whole("seed"), read_pigment(t)});
  for (const TableReader& t : list("spot", &root_))
    colouring.spots.push_back({t.number("per_whorl"), t.number("length"), t.number("at"), t.number("width"),
                               t.number("stagger"), t.number("irregularity"), t.whole("seed"), read_pigment(t)});
  for (const TableReader& t : list("pattern", &root_)) {
    const Stated<double> decay = t.number("activator_decay");
    colouring.patterns.push_back({decay, t.number("inhibitor_decay"), t.number("source", decay),
                                  t.number("activator_base"), t.number("inhibitor_base"), t.number("activator_spread"),
                                  t.number("inhibitor_spread"), t.number("variation"), t.number("threshold"),
                                  t.whole("seed"), read_pigment(t)});
  }
  return colouring;
}

}  // namespace whorl::specimen
