// SPDX-License-Identifier: Apache-2.0
// The growth that each definition spans.
#include "fit/observed.h"

#include "fit/predict.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::Definition;
using specimen::Stretch;

// Of one reading taken at whorl `s` of a shell whose tube begins at `start` and ends at `lip`.
std::vector<Stretch> spanned(Definition definition, double s, double start, double lip) {
  using enum Definition;
  switch (definition) {
    case kShellHeightAxial:  // the apex and the last whorl's base
    case kSpireHeightLessAperture:
    case kSpireHeightLessLastWhorl:
    case kSpireHeightDirect: return {{start, start}, {s - 0.5, s}};
    case kShellWidthAcross:
    case kUmbilicusMargins:
    case kUmbilicusSeams:
    case kDiameterSumOfRadii:
    case kWhorlWidthFlanks: return {{s - 0.5, s}};
    case kLastWhorlHeightFlank:
    case kLastWhorlHeightAboveAperture:
    case kSuturalAngleChord:
    case kSutureSlopeAcross: return {{lip - 0.5, lip}};
    case kPenultimateHeightBetweenSutures:
    case kSpireAngleSutures: return {{lip - 1.5, lip - 0.5}};
    case kPenultimateWidthFlanks: return {{lip - 1.5, lip - 1.0}};
    case kApicalAngleEarly: return {{start, start + 2.0}};
    case kPleuralAngleLastTwo:
    case kAperturalHeightVenters: return {{s - 1.0, s}};
    case kWhorlsPole:
    case kWhorlsNucleusLine:
    case kWhorlsNucleusLineQuarter:
    case kWhorlsSutureStart: return {{start, lip}};
    case kWallThicknessWall:
    case kWallThicknessLip: return {};
    default: return {{s, s}};  // one whorl section, or the lip
  }
}

std::vector<Stretch> joined(std::vector<Stretch> stretches) {
  constexpr double kTouch = 1e-6;
  std::sort(stretches.begin(), stretches.end(), [](const Stretch& a, const Stretch& b) { return a.from < b.from; });
  std::vector<Stretch> apart;
  for (const Stretch& stretch : stretches) {
    if (!apart.empty() && stretch.from <= apart.back().to + kTouch)
      apart.back().to = std::max(apart.back().to, stretch.to);
    else
      apart.push_back(stretch);
  }
  return apart;
}

}  // namespace

std::vector<Stretch> observed_stretches(const Fit& fit) {
  const Form form = *form_of(fit.trial.values, fit.task.fixed);
  const double start = form.law.theta_start / kTwoPi, lip = form.law.theta_lip / kTwoPi;
  std::vector<Stretch> all;
  std::vector<Stretch> series(fit.task.scatter.size(), {lip, 0.0});
  for (const specimen::Reading& reading : fit.task.readings) {
    const double whorl = theta_of(form, reading.stage) / kTwoPi;
    if (std::isnan(whorl)) continue;
    for (const Stretch& span : spanned(reading.definition, whorl, start, lip)) {
      if (reading.series < 0) {
        all.push_back(span);
        continue;
      }
      Stretch& whole = series[static_cast<std::size_t>(reading.series)];
      whole = {std::min(whole.from, span.from), std::max(whole.to, span.to)};
    }
  }
  for (const Stretch& stretch : series)
    if (stretch.to > 0.0) all.push_back(stretch);
  for (const specimen::TracedOutline& outline : fit.task.outlines) {
    const double whorl = theta_of(form, outline.stage) / kTwoPi;
    all.push_back(outline.kind == specimen::TracedOutline::Kind::kSection ? Stretch{whorl, whorl} : Stretch{start, lip});
  }
  for (Stretch& stretch : all) stretch = {std::clamp(stretch.from, start, lip), std::clamp(stretch.to, start, lip)};
  std::vector<Stretch> apart = joined(std::move(all));
  // A scene file takes so many; the shortest between others tell least.
  constexpr std::size_t kMost = 64;
  while (apart.size() > kMost) {
    const auto length = [](const Stretch& s) { return s.to - s.from; };
    apart.erase(std::min_element(apart.begin() + 1, apart.end() - 1, [&](const Stretch& a, const Stretch& b) { return length(a) < length(b); }));
  }
  return apart;
}

specimen::PreservedParts observed_parts(const specimen::MeasuredSpecimen& measured) {
  if (measured.mould) return specimen::PreservedParts::kInside;
  const bool wall = std::any_of(measured.readings.begin(), measured.readings.end(), [](const specimen::Reading& reading) {
    return reading.definition == Definition::kWallThicknessWall;
  });
  if (!wall) return specimen::PreservedParts::kOutside;
  return measured.held.columella ? specimen::PreservedParts::kWhole : specimen::PreservedParts::kWall;
}

std::vector<specimen::Preserved> preserved_of(const Fit& fit, const specimen::MeasuredSpecimen& measured) {
  if (!measured.preserved.empty()) return measured.preserved;
  const double lip = at(fit.trial.values, Parameter::kWhorls);
  std::vector<specimen::Preserved> tables;
  for (const Stretch& stretch : observed_stretches(fit)) {
    specimen::Preserved table;
    table.from = specimen::Stated<double>{std::max(0.0, lip - stretch.from), {}, true};
    table.to = specimen::Stated<double>{std::max(0.0, lip - stretch.to), {}, true};
    table.from_lip = {true, {}, true};
    table.parts = {observed_parts(measured), {}, true};
    tables.push_back(table);
  }
  return tables;
}

std::vector<std::string> preserved_words(const std::vector<specimen::Preserved>& stretches) {
  std::vector<std::string> lines;
  for (const specimen::Preserved& stretch : stretches) {
    const auto end = [](const std::optional<specimen::Stated<double>>& whorl, const char* unstated) {
      return whorl ? fmt::format("{:.2f}", whorl->value) : std::string(unstated);
    };
    lines.push_back(fmt::format("{}, whorls {} to {} counted from the {}", specimen::parts_word(stretch.parts),
                                end(stretch.from, "(apex)"), end(stretch.to, "(lip)"), stretch.from_lip ? "lip" : "pole"));
  }
  return lines;
}

}  // namespace whorl::fit
