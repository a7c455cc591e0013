// SPDX-License-Identifier: Apache-2.0
// Stretches of growth, and where a place lies to them.
#include "specimen/provenance.h"

#include <algorithm>

namespace whorl::specimen {
namespace {

constexpr double kRounding = 1e-6;  // whorls

bool holds(const Stretch& stretch, double whorl) { return whorl >= stretch.from - kRounding && whorl <= stretch.to + kRounding; }

}  // namespace

const char* provenance_word(Provenance provenance) {
  switch (provenance) {
    case Provenance::kNone: return "nothing";
    case Provenance::kObserved: return "observed";
    case Provenance::kInterpolated: return "interpolated";
    case Provenance::kExtrapolated: return "extrapolated";
    case Provenance::kAssumed: return "assumed";
  }
  return "";
}

Stretch stretch_of(const Preserved& stated, double whorls) {
  Stretch stretch{0.0, whorls};
  if (stated.from) stretch.from = stated.from_lip ? whorls - stated.from->value : stated.from->value;
  if (stated.to) stretch.to = stated.from_lip ? whorls - stated.to->value : stated.to->value;
  return stretch;
}

const char* parts_word(PreservedParts parts) {
  switch (parts) {
    case PreservedParts::kWhole: return "whole";
    case PreservedParts::kWall: return "wall";
    case PreservedParts::kOutside: return "outside";
    case PreservedParts::kInside: return "inside";
  }
  return "";
}

Preservation::Preservation(const Specimen& specimen)
    : stated_(!specimen.preserved.empty()), start_(specimen.growth.start.value), whorls_(specimen.growth.whorls.value) {
  for (const Preserved& stated : specimen.preserved) {
    const Stretch stretch = stretch_of(stated, whorls_);
    const PreservedParts parts = stated.parts;
    any_.push_back(stretch);
    if (parts != PreservedParts::kInside) outside_.push_back(stretch);
    if (parts != PreservedParts::kOutside) inside_.push_back(stretch);
    if (parts == PreservedParts::kWhole) columella_.push_back(stretch);
  }
}

Provenance Preservation::in(const std::vector<Stretch>& observed, double whorl) const {
  if (observed.empty()) return Provenance::kAssumed;
  whorl = std::min(whorl, whorls_);  // the rim stands a little beyond the lip
  bool before = false, after = false;
  for (const Stretch& stretch : observed) {
    if (holds(stretch, whorl)) return Provenance::kObserved;
    (stretch.to < whorl ? before : after) = true;
  }
  return before && after ? Provenance::kInterpolated : Provenance::kExtrapolated;
}

Provenance Preservation::of(ShellPart part, double whorl) const {
  if (!stated_) return Provenance::kNone;
  switch (part) {
    case ShellPart::kEmbryonic:
      // It follows from no law: nothing but a stretch that begins in it tells of it.
      return std::any_of(any_.begin(), any_.end(), [this](const Stretch& s) { return s.from < start_ - kRounding; }) ? Provenance::kObserved
                                                                                                                     : Provenance::kAssumed;
    case ShellPart::kOutside: return in(outside_, whorl);
    case ShellPart::kInside: return in(inside_, whorl);
    case ShellPart::kWall: return std::max(in(outside_, whorl), in(inside_, whorl));
    case ShellPart::kColumella: return in(columella_, whorl);
  }
  return Provenance::kNone;
}

Provenance Preservation::along(double whorl) const {
  if (!stated_) return Provenance::kNone;
  return whorl < start_ ? of(ShellPart::kEmbryonic, whorl) : in(any_, whorl);
}

}  // namespace whorl::specimen
