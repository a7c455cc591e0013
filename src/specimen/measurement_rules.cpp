// SPDX-License-Identifier: Apache-2.0
// What holds between the readings of one specimen whatever its shape.
#include "specimen/measurement_rows.h"

#include <fmt/format.h>

#include <cmath>

namespace whorl::specimen {
namespace {

struct Order {
  Definition less, more;
};

// Follows from the definitions alone: the first can't exceed the second.
constexpr Order kOrders[] = {
    {Definition::kApertureHeightAxial, Definition::kShellHeightAxial},
    {Definition::kLastWhorlHeightFlank, Definition::kShellHeightAxial},
    {Definition::kLastWhorlHeightAboveAperture, Definition::kShellHeightAxial},
    {Definition::kPenultimateHeightBetweenSutures, Definition::kShellHeightAxial},
    {Definition::kSpireHeightLessAperture, Definition::kShellHeightAxial},
    {Definition::kSpireHeightLessLastWhorl, Definition::kShellHeightAxial},
    {Definition::kSpireHeightDirect, Definition::kShellHeightAxial},
    {Definition::kApertureWidthAcross, Definition::kShellWidthAcross},
    {Definition::kPenultimateWidthFlanks, Definition::kShellWidthAcross},
    {Definition::kDiameterSumOfRadii, Definition::kShellWidthAcross},
    {Definition::kUmbilicusMargins, Definition::kShellWidthAcross},
    {Definition::kUmbilicusMargins, Definition::kUmbilicusSeams},
    {Definition::kUmbilicusSeams, Definition::kShellWidthAcross},
    {Definition::kUmbilicusMargins, Definition::kDiameterSumOfRadii},
    {Definition::kUmbilicusSeams, Definition::kDiameterSumOfRadii},
    {Definition::kWhorlHeightMargin, Definition::kDiameterSumOfRadii},
    {Definition::kWhorlHeightSeam, Definition::kDiameterSumOfRadii},
    {Definition::kWhorlHeightSeam, Definition::kWhorlHeightMargin},
    {Definition::kAperturalHeightVenters, Definition::kDiameterSumOfRadii},
    {Definition::kWhorlWidthAlongAxis, Definition::kShellHeightAxial},
    {Definition::kApertureHeightAxial, Definition::kApertureHeightLongest},
    {Definition::kApertureWidthAcross, Definition::kApertureHeightLongest},
    {Definition::kApertureWidthAcrossLongest, Definition::kApertureHeightLongest},
};

bool same_stage(const Reading& a, const Reading& b) {
  return a.stage.kind == b.stage.kind && a.stage.value == b.stage.value;
}

void check_orders(const MeasuredSpecimen& specimen, ProblemList& problems) {
  for (const Order& order : kOrders) {
    for (const Reading& small : specimen.readings) {
      if (small.definition != order.less || small.series >= 0) continue;
      for (const Reading& large : specimen.readings) {
        if (large.definition != order.more || large.series >= 0 || !same_stage(small, large)) continue;
        const double slack = 3.0 * std::hypot(small.standard_error, large.standard_error);
        if (small.value <= large.value + slack) continue;
        problems.add(small.where, fmt::format("{} = {} mm contradicts {} = {} mm on line {}: it cannot be the larger of the two",
                                              written_definition(small.definition), small.value,
                                              written_definition(large.definition), large.value, large.where.line));
      }
    }
  }
}

// The same thing measured twice, further apart than readings of one shell can lie.
void check_repeats(const MeasuredSpecimen& specimen, ProblemList& problems) {
  constexpr double kMostApart = 0.2;
  const std::vector<Reading>& all = specimen.readings;
  for (std::size_t i = 0; i < all.size(); ++i)
    for (std::size_t j = i + 1; j < all.size(); ++j) {
      if (all[i].definition != all[j].definition || !same_stage(all[i], all[j]) || all[i].series >= 0 || all[j].series >= 0) continue;
      if (std::abs(all[i].value - all[j].value) <= kMostApart * std::max(all[i].value, all[j].value)) continue;
      problems.add(all[j].where, fmt::format("{} is stated twice, {} here and {} on line {}: readings of one shell do not differ "
                                             "by more than a fifth",
                                             written_definition(all[i].definition), all[j].value, all[i].value, all[i].where.line));
    }
}

}  // namespace

void finish_specimen(MeasuredSpecimen& specimen, std::optional<double> bracketed_mm, ProblemList& problems) {
  if (bracketed_mm) {
    for (Reading& reading : specimen.readings)
      if (row_of(reading.definition).planispiral && reading.definition != Definition::kDiameterSumOfRadii &&
          reading.stage.kind == GrowthStage::Kind::kLip)
        reading.stage = {GrowthStage::Kind::kAtDiameter, *bracketed_mm};
  }
  check_mould(specimen, problems);
  check_orders(specimen, problems);
  check_repeats(specimen, problems);
}

}  // namespace whorl::specimen
