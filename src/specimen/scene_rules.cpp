// SPDX-License-Identifier: Apache-2.0
// Embryonic shell, pillar, walls, lamps and the size of the page against each other.
#include "specimen/scene_rules.h"

#include "specimen/key_table.h"
#include "specimen/preserved.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::specimen {
namespace {

constexpr double kShortestGrowth = 0.25;     // whorls between the embryonic shell and the lip
constexpr double kMostPixelsAcross = 30000;  // beyond it image viewers and printers give up
constexpr double kNarrowestColumn = 2.0;     // mm
constexpr double kSharpestBend = 0.5;        // foot radius / radius of the bend

void check_growth(const Specimen& s, ProblemList& problems) {
  const double last_start = s.growth.whorls - kShortestGrowth;
  if (s.growth.start > last_start) {
    problems.add(s.growth.start.where,
                 fmt::format("[growth] start = {}: must be at most {}, a quarter whorl before the lip (whorls = {})",
                             s.growth.start.value, last_start, s.growth.whorls.value));
  }
  if (s.wall.columella > 0.0 && s.growth.T <= 0.0) {
    problems.add(s.wall.columella.where,
                 fmt::format("[wall] columella = {}: a pillar needs a spire, but [growth] T = 0 winds in one plane; "
                             "leave columella out, or raise T",
                             s.wall.columella.value));
  }
  for (const Lamp& lamp : s.lamps) {
    if (lamp.behind_lip > s.growth.whorls) {
      problems.add(lamp.behind_lip.where,
                   fmt::format("[[lamp]] behind_lip = {}: lies beyond the pole; must be at most whorls = {}",
                               lamp.behind_lip.value, s.growth.whorls.value));
    }
  }
}

void check_thickness(const char* key, const Stated<double>& thickness, const Specimen& s, ProblemList& problems) {
  if (!(thickness >= 0.5 * s.size.mm)) return;
  problems.add(
      thickness.where,
      fmt::format("{} = {}: must be less than half of {} = {} mm, that is {} mm", key, thickness.value,
                  keys_of("size")[static_cast<std::size_t>(s.size.kind.value)], s.size.mm.value, 0.5 * s.size.mm));
}

void check_page(const Plate& plate, ProblemList& problems) {
  const double across = plate.width_mm / kMmPerInch * plate.resolution_ppi;
  if (across > kMostPixelsAcross) {
    problems.add(plate.resolution_ppi.given ? plate.resolution_ppi.where : plate.width_mm.where,
                 fmt::format("[plate] width = {} mm at resolution = {} is {:.0f} pixels across; at most {} are allowed",
                             plate.width_mm.value, plate.resolution_ppi.value, across, kMostPixelsAcross));
  }
  const double column_mm = (plate.width_mm - plate.gap_mm * (plate.columns - 1)) / plate.columns;
  if (plate.columns > 0 && column_mm < kNarrowestColumn) {
    problems.add(
        plate.columns.given ? plate.columns.where : plate.gap_mm.where,
        fmt::format(
            "[plate] columns = {} with gap = {} mm on width = {} mm leave {:.2f} mm for a panel; at least {} mm "
            "are wanted",
            plate.columns.value, plate.gap_mm.value, plate.width_mm.value, column_mm, kNarrowestColumn));
  }
}

void check_spans(const Specimen& s, ProblemList& problems) {
  // `what` states onset and end, in whorls.
  const auto check = [&](const char* table, const auto& what) {
    if (what.onset >= what.end)
      problems.add(what.onset.given ? what.onset.where : what.end.where,
                   fmt::format("[[{}]] onset = {}: must be less than end = {}", table, what.onset.value, what.end.value));
    else if (what.onset >= s.growth.whorls)
      problems.add(what.onset.where, fmt::format("[[{}]] onset = {}: lies beyond the lip; must be less than whorls = {}", table,
                                                 what.onset.value, s.growth.whorls.value));
  };
  for (const Band& band : s.colouring.bands) check("band", band.pigment);
  for (const Flame& flame : s.colouring.flames) check("flame", flame.pigment);
  for (const Spot& spot : s.colouring.spots) check("spot", spot.pigment);
  for (const EdgePattern& pattern : s.colouring.patterns) check("pattern", pattern.pigment);
  for (const Cord& cord : s.sculpture.cords) check("cord", cord);
  for (const Rib& rib : s.sculpture.ribs) check("rib", rib);
  for (const Nodule& nodule : s.sculpture.nodules) check("nodule", nodule);
  for (const Stripe& stripe : s.attachments.stripes) check("stripe", stripe);
  for (const Lamella& lamella : s.attachments.lamellae) check("lamella", lamella.series);
  for (const Spine& spine : s.attachments.spines) check("spine", spine.series);
  for (const Attached& attached : s.attachments.attached) check("attached", attached.series);
}

void check_spines(const Specimen& s, ProblemList& problems) {
  for (const Spine& spine : s.attachments.spines) {
    const double sharp = std::abs(radians(spine.bend_deg)) * 0.5 * spine.breadth_mm / spine.length_mm;
    if (sharp > kSharpestBend)
      problems.add(spine.bend_deg.where,
                   fmt::format("[[spine]] bend = {:g} degrees over a length of {:g} mm: too sharp for a foot {:g} mm across, which would "
                               "fold; bend it by at most {:.3g} degrees, or make it longer or thinner",
                               spine.bend_deg.value, spine.length_mm.value, spine.breadth_mm.value,
                               std::abs(spine.bend_deg.value) * kSharpestBend / sharp));
    if (spine.open_deg > 0.0 && !(spine.hollow > 0.0))
      problems.add(spine.open_deg.where, "[[spine]] open: only a hollow spine can be open along its front; state hollow as well");
  }
}

void check_colouring(const Specimen& s, ProblemList& problems) {
  if (s.look.callus_breadth_mm.given && !s.look.callus)
    problems.add(s.look.callus_breadth_mm.where,
                 "[look] callus_breadth is stated without callus: state the colour of the callus as well");
}

void check_contact_sheet(const Specimen& s, ProblemList& problems) {
  const ContactSheet& sheet = s.contact_sheet;
  if (sheet.W.given != sheet.T.given)
    problems.add(sheet.W.given ? sheet.W.where : sheet.T.where,
                 fmt::format("[contact_sheet] states {} alone; state both W and T, each as a list of numbers",
                             sheet.W.given ? "W" : "T"));
  if (!sheet.wanted()) return;
  if (sheet.T.value.front() == 0.0 && s.wall.columella > 0.0)
    problems.add(sheet.T.where,
                 fmt::format("[contact_sheet] T holds 0, which winds in one plane, but [wall] columella = {} needs a spire; leave "
                             "columella out, or begin with a T above 0",
                             s.wall.columella.value));
  if (s.plate.panels.size() != 1)
    problems.add(sheet.W.where,
                 "[contact_sheet] shows one view of many shells: state exactly one [[panel]], which all of them take");
  else if (s.plate.panels[0].stereo)
    problems.add(s.plate.panels[0].stereo.where, "[[panel]] picture: a contact sheet takes single pictures");
}

// A shell is cut open along its axis towards the reader, who must stand beside it.
void check_shows(const Plate& plate, ProblemList& problems) {
  constexpr double kBeside = 45.0;  // degrees of elevation
  for (const Panel& panel : plate.panels) {
    const ViewName view = panel.view.value;
    if (panel.shows.value == Shows::kShell) continue;
    if (view == ViewName::kAxialSection)
      problems.add(panel.shows.where, "[[panel]] shows: an axial section shows the shell; choose a view from outside");
    const bool along = view == ViewName::kApical || view == ViewName::kUmbilical ||
                       (view == ViewName::kFree && std::abs(panel.elevation_deg) > kBeside);
    if (panel.shows.value == Shows::kBoth && along)
      problems.add(panel.shows.where, fmt::format("[[panel]] shows = \"both\": the shell is cut open along its axis, which must be seen "
                                                  "from the side; choose a side view, or a free view of at most {:g} degrees elevation",
                                                  kBeside));
    if (panel.look.value == PanelLook::kRadiograph)
      problems.add(panel.shows.where, "[[panel]] shows: a radiograph goes through the wall of the shell; choose another look");
  }
}

void check_looks(const Plate& plate, ProblemList& problems) {
  for (const Panel& panel : plate.panels) {
    if (panel.look.value == PanelLook::kRadiograph && panel.view.value == ViewName::kAxialSection)
      problems.add(panel.look.where,
                   "[[panel]] look = \"radiograph\": rays go through the whole shell, which an axial section has cut; choose "
                   "another view, or another look");
  }
}

}  // namespace

void check_rules(const Specimen& specimen, ProblemList& problems) {
  check_growth(specimen, problems);
  check_thickness("[wall] thickness", specimen.wall.thickness_mm, specimen, problems);
  if (specimen.lip.thickness_mm.given)
    check_thickness("[lip] thickness", specimen.lip.thickness_mm, specimen, problems);
  check_spans(specimen, problems);
  check_spines(specimen, problems);
  check_colouring(specimen, problems);
  check_looks(specimen.plate, problems);
  check_preserved(specimen.preserved, specimen.growth.whorls.value, problems);
  check_shows(specimen.plate, problems);
  if (specimen.plate.unobserved.value != Unobserved::kPlain && specimen.preserved.empty())
    problems.add(specimen.plate.unobserved.where,
                 "[plate] unobserved: nothing says what was observed; state what is preserved in tables [[preserved]]");
  check_contact_sheet(specimen, problems);
  check_page(specimen.plate, problems);
}

}  // namespace whorl::specimen
