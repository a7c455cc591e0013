// SPDX-License-Identifier: Apache-2.0
// What can be measured on an internal mould, and what must be stated with it.
#include "specimen/measurement_rows.h"

#include <fmt/format.h>

#include <algorithm>

namespace whorl::specimen {
namespace {

using enum Definition;

/// On a mould the space of the wall parts the whorls: there are no sutures and seams, and the aperture's edge is lost with the shell.
constexpr Definition kOfShellsOnly[] = {kApertureHeightAxial,      kApertureHeightLongest,     kApertureWidthAcross,
                                        kApertureWidthAcrossLongest, kLastWhorlHeightFlank,    kLastWhorlHeightAboveAperture,
                                        kPenultimateHeightBetweenSutures, kSpireHeightLessAperture, kSpireHeightLessLastWhorl,
                                        kSpireHeightDirect,        kSpireAngleSutures,         kSuturalAngleChord,
                                        kSutureSlopeAcross,        kUmbilicusSeams,            kWhorlHeightSeam,
                                        kWhorlHeightBetweenSutures, kWhorlWidthBetweenSutures, kWallThicknessWall,
                                        kWallThicknessLip};

}  // namespace

void check_mould(const MeasuredSpecimen& specimen, ProblemList& problems) {
  if (!specimen.mould) {
    if (specimen.mould_wall)
      problems.add(specimen.mould_wall->where,
                   "[wall] thickness is that of the shell round an internal mould, but the readings were taken on a shell; measure "
                   "wall_thickness wall instead, or state measured = \"internal mould\" in [specimen]");
    return;
  }
  if (!specimen.mould_wall)
    problems.add(specimen.where, "[wall] thickness is missing: an internal mould says nothing of its shell's wall; state its thickness at the lip");
  for (const TracedOutline& outline : specimen.outlines)
    if (outline.kind == TracedOutline::Kind::kSuture)
      problems.add(outline.where, "[[outline]] kind = \"suture\": an internal mould has no sutures like a shell's, since the space of the wall "
                                  "parts its whorls; trace its silhouette");
  for (const Reading& reading : specimen.readings)
    if (std::find(std::begin(kOfShellsOnly), std::end(kOfShellsOnly), reading.definition) != std::end(kOfShellsOnly))
      problems.add(reading.where, fmt::format("{} can't be read on an internal mould, whose whorls the space of the wall parts; take margins, "
                                              "flanks, venters, diameters or whole extents",
                                              written_definition(reading.definition)));
}

}  // namespace whorl::specimen
