// SPDX-License-Identifier: Apache-2.0
// Reads stretches of growth and checks their ends.
#include "specimen/preserved.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::specimen {
namespace {

constexpr double kRounding = 1e-6;  // whorls: files print a few digits

}  // namespace

Preserved preserved_of(const TableReader& table) {
  Preserved stretch;
  stretch.where = table.where();
  for (const auto& [key, end] : {std::pair{"from", &stretch.from}, {"to", &stretch.to}})
    if (table.states(key)) *end = table.number(key, 0.0);
  const Stated<int> counted = table.word<int>("counted");
  stretch.from_lip = {counted.value == 1, counted.where, counted.given};
  stretch.parts = table.word<PreservedParts>("parts");
  return stretch;
}

void check_preserved(const std::vector<Preserved>& stretches, std::optional<double> whorls, ProblemList& problems) {
  for (const Preserved& stretch : stretches) {
    for (const auto& [key, end] : {std::pair{"from", &stretch.from}, {"to", &stretch.to}})
      if (*end && whorls && (*end)->value > *whorls + kRounding)
        problems.add((*end)->where, fmt::format("[[preserved]] {} = {}: lies beyond the {}; must be at most whorls = {}", key, (*end)->value,
                                                stretch.from_lip ? "pole" : "lip", *whorls));
    if (!stretch.from || !stretch.to) continue;
    const double from = stretch.from->value, to = stretch.to->value;
    if (stretch.from_lip ? from < to : from > to)
      problems.add(stretch.from->where,
                   fmt::format("[[preserved]] from = {}: must be at {} to = {}, since from lies nearer to the apex and whorls are counted "
                               "from the {}",
                               from, stretch.from_lip ? "least" : "most", to, stretch.from_lip ? "lip" : "pole"));
  }
}

}  // namespace whorl::specimen
