// SPDX-License-Identifier: Apache-2.0
// Stripes, lamellae, spines, attached elements and encrusters of a scene file.
#include "specimen/scene_reader.h"

namespace whorl::specimen {
namespace {

Recurrence series_of(const TableReader& t) {
  return {t.number("per_whorl"), t.number("behind_lip"), t.number("irregularity"), t.number("onset"), t.number("end"), t.whole("seed"), t.number("growth")};
}

}  // namespace

Attachments SceneReader::read_attachments() {
  Attachments a;
  for (const TableReader& t : list("stripe", &root_))
    a.stripes.push_back({t.number("at"), t.number("width"), t.number("height"), t.number("onset"), t.number("end"), t.number("growth"), t.colour("colour")});
  for (const TableReader& t : list("lamella", &root_))
    a.lamellae.push_back({series_of(t), t.number("height"), t.number("thickness"), t.number("at"), t.number("width"), t.number("lean"),
                          t.optional_colour("colour")});
  for (const TableReader& t : list("spine", &root_))
    a.spines.push_back({series_of(t), t.number("length"), t.number("breadth"), t.number("at"), t.number("tip"), t.number("bend"),
                        t.number("lean"), t.number("hollow"), t.number("open"), t.optional_colour("colour")});
  for (const TableReader& t : list("attached", &root_))
    a.attached.push_back({t.word<AttachedShape>("shape"), series_of(t), t.whole("rows"), t.number("height"), t.number("breadth"),
                          t.number("at"), t.number("width"), t.number("stagger"), t.number("lean"), t.colour("colour")});
  for (const TableReader& t : list("encruster", &root_))
    a.encrusters.push_back({t.text("scene"), t.number("behind_lip"), t.number("at"), t.number("turn"), t.number("sunk"), t.word<Pose>("pose")});
  return a;
}

}  // namespace whorl::specimen
