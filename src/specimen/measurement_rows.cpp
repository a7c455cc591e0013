// SPDX-License-Identifier: Apache-2.0
// Definitions, units, ranges and stages of single rows.
#include "specimen/measurement_rows.h"

#include "diagnostics/nearest_word.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <cmath>

namespace whorl::specimen {
namespace {

struct Limits {
  double low, high;
  const char* unit;
};

Limits limits_of(const DefinitionRow& row) {
  if (row.dimension == Dimension::kLength) return {row.quantity == "umbilicus" ? 0.0 : 0.001, 5000.0, "mm"};
  if (row.dimension == Dimension::kCount) return {0.25, 40.0, "whorls"};
  if (row.id == Definition::kLipInclinationProfile) return {-60.0, 60.0, "degrees"};
  return {0.5, 270.0, "degrees"};
}

std::string possibilities(const std::vector<const DefinitionRow*>& rows) {
  std::vector<std::string> words;
  for (const DefinitionRow* row : rows) words.push_back(fmt::format("{} \"{}\" ({})", row->quantity, row->definition, row->meaning));
  return fmt::format("{}", fmt::join(words, "; "));
}

}  // namespace

std::optional<double> millimetres_in(std::string_view unit) {
  if (unit == "mm") return 1.0;
  if (unit == "cm") return 10.0;
  if (unit == "um") return 0.001;
  if (unit == "in") return 25.4;
  return std::nullopt;
}

const DefinitionRow* definition_of(const RawRow& row, ProblemList& problems) {
  const std::string& quantity = row.quantity.value;
  if (!row.quantity.given || quantity.empty()) return nullptr;  // complained of as missing
  const std::vector<const DefinitionRow*> possible = possible_definitions(quantity);
  if (possible.empty()) {
    const std::vector<std::string_view> names = quantity_names();
    const diagnostics::NearestWord nearest = diagnostics::nearest_word(quantity, names);
    problems.add(row.quantity.where,
                 fmt::format("{} quantity = \"{}\": there is no such quantity{}; there are {}", row.label, quantity,
                             nearest.close ? fmt::format("; did you mean \"{}\"?", nearest.word) : "", fmt::join(names, ", ")));
    return nullptr;
  }
  const bool named = possible.front()->quantity == quantity;
  if (!row.definition.given || row.definition.value.empty()) {
    problems.add(row.quantity.where,
                 fmt::format("{} quantity = \"{}\": {} without a definition; it may mean {}; state which", row.label,
                             quantity, named ? "a quantity" : "an abbreviation", possibilities(possible)));
    return nullptr;
  }
  if (const DefinitionRow* found = find_definition(quantity, row.definition.value)) return found;
  problems.add(row.definition.where,
               fmt::format("{} definition = \"{}\": {} has no such definition{}; it has {}", row.label,
                           row.definition.value, quantity, named ? "" : " that leaves one quantity", possibilities(possible)));
  return nullptr;
}

namespace {

// NaN after a complaint.
double checked_value(const RawRow& row, const DefinitionRow& definition, const Stated<double>& stated, double factor,
                     ProblemList& problems) {
  const Limits limits = limits_of(definition);
  const double value = stated.value * factor;
  if (std::isnan(value) || (value >= limits.low && value <= limits.high)) return value;
  problems.add(stated.where, fmt::format("{} {} {} = {}: must be from {} to {} {}", row.label, definition.quantity,
                                         definition.definition, value, limits.low, limits.high, limits.unit));
  return std::nan("");
}

// The factor from the row's unit to mm; 1 for angles and counts. Empty after a complaint.
std::optional<double> factor_of(const RawRow& row, const DefinitionRow& definition, const RowDefaults& defaults,
                                ProblemList& problems) {
  if (definition.dimension == Dimension::kLength) {
    if (row.unit.given && row.unit.value != defaults.unit) {
      problems.add(row.unit.where, fmt::format("{} unit = \"{}\": mixed units; all lengths of a file are in its unit, \"{}\"; "
                                               "convert this one",
                                               row.label, row.unit.value, defaults.unit));
      return std::nullopt;
    }
    return millimetres_in(defaults.unit);
  }
  const std::string_view own = definition.dimension == Dimension::kAngle ? "degrees" : "whorls";
  if (row.unit.given && row.unit.value != own) {
    problems.add(row.unit.where, fmt::format("{} unit = \"{}\": {} is in {}", row.label, row.unit.value, definition.quantity, own));
    return std::nullopt;
  }
  return 1.0;
}

// Step and standard error, or false after a complaint.
bool set_error(const RawRow& row, const DefinitionRow& definition, const RowDefaults& defaults, double factor,
               Reading& reading, ProblemList& problems) {
  // A reading rounded to its step is off by an error uniform over the step, whose variance is step^2 / 12.
  const double uniform = 1.0 / std::sqrt(12.0);
  if (row.step && row.error) {
    problems.add(row.error->where, fmt::format("{} states step and error: state one, a step stands for the error step / sqrt(12)",
                                               row.label));
    return false;
  }
  if (row.error) {
    reading.standard_error = row.error->value * factor;
    return true;
  }
  if (row.step) {
    reading.step = row.step->value * factor;
  } else if (definition.dimension == Dimension::kLength && defaults.step) {
    reading.step = *defaults.step * factor;
  } else {
    problems.add(row.where, fmt::format("{} {} {}: how finely was it read? state step, the instrument's step, or error, its standard error",
                                        row.label, definition.quantity, definition.definition));
    return false;
  }
  reading.standard_error = reading.step * uniform;
  return true;
}

bool set_stage(const RawRow& row, const DefinitionRow& definition, double factor, Reading& reading, ProblemList& problems) {
  using Kind = GrowthStage::Kind;
  int stated = 0;
  for (const auto& [stage, kind, scale] : {std::tuple{&row.behind_lip, Kind::kBehindLip, 1.0},
                                           std::tuple{&row.at_whorl, Kind::kAtWhorl, 1.0},
                                           std::tuple{&row.at_diameter, Kind::kAtDiameter, factor}}) {
    if (!*stage) continue;
    ++stated;
    reading.stage = {kind, (*stage)->value * scale};
    if (!definition.at_stages) {
      problems.add((*stage)->where, fmt::format("{} {} {} is taken on the whole shell; leave out its stage of growth", row.label,
                                                definition.quantity, definition.definition));
      return false;
    }
  }
  if (stated > 1) {
    problems.add(row.where, fmt::format("{} {} {}: state one of behind_lip, at_whorl and at_diameter", row.label,
                                        definition.quantity, definition.definition));
  }
  return stated <= 1;
}

}  // namespace

void add_reading(const RawRow& row, const RowDefaults& defaults, MeasuredSpecimen& specimen, ProblemList& problems) {
  const DefinitionRow* definition = definition_of(row, problems);
  if (definition == nullptr) return;
  const std::optional<double> factor = factor_of(row, *definition, defaults, problems);
  if (!factor) return;
  Reading reading;
  reading.definition = definition->id;
  reading.where = row.where;
  reading.value = checked_value(row, *definition, row.value, *factor, problems);
  if (row.in_brackets && definition->id != Definition::kDiameterSumOfRadii) {
    problems.add(row.value.where, fmt::format("{} {}: a second number in brackets belongs to conch_diameter only", row.label,
                                              definition->quantity));
    return;
  }
  const bool stage = set_stage(row, *definition, *factor, reading, problems);
  const bool error = set_error(row, *definition, defaults, *factor, reading, problems);
  if (definition->id == Definition::kWhorlWidthProportional) {
    problems.add(row.quantity.where, fmt::format("{} whorl_width proportional: only ratios count, so it stands in a [[series]], "
                                                 "or state how it was taken",
                                                 row.label));
    return;
  }
  if (stage && error && !std::isnan(reading.value)) specimen.readings.push_back(reading);
}

void add_series(const RawSeries& raw, const RowDefaults& defaults, MeasuredSpecimen& specimen, ProblemList& problems) {
  const RawRow& row = raw.row;
  const DefinitionRow* definition = definition_of(row, problems);
  if (definition == nullptr) return;
  const std::optional<double> factor = factor_of(row, *definition, defaults, problems);
  if (!factor) return;
  if (!definition->at_stages || definition->dimension != Dimension::kLength) {
    problems.add(row.quantity.where, fmt::format("{} {} {} is not taken on successive whorls", row.label, definition->quantity,
                                                 definition->definition));
    return;
  }
  if (raw.values.size() < 3) {
    problems.add(row.where, fmt::format("{} has {} values; a series has at least 3", row.label, raw.values.size()));
    return;
  }
  Series series{definition->id, raw.half_turns ? 0.5 : 1.0, raw.scatter, {}, row.where};
  std::vector<Reading> readings;
  const double nearest = row.behind_lip ? row.behind_lip->value : 0.0;
  const std::size_t count = raw.values.size();
  for (std::size_t i = 0; i < count; ++i) {
    const std::size_t from_apex = raw.from_lip ? count - 1 - i : i;  // place in the file of the i-th from the apex
    const Stated<double>& stated = raw.values[from_apex];
    Reading reading;
    reading.definition = definition->id;
    reading.where = stated.where;
    reading.value = checked_value(row, *definition, stated, *factor, problems);
    if (std::isnan(reading.value) || !set_error(row, *definition, defaults, *factor, reading, problems)) return;
    reading.stage = {GrowthStage::Kind::kBehindLip, nearest + series.turn * static_cast<double>(count - 1 - i)};
    reading.series = static_cast<int>(specimen.series.size());
    series.values.push_back(reading.value);
    readings.push_back(reading);
  }
  const char* order = raw.from_lip ? "from the lip" : "from the apex";
  if (series.values.back() <= series.values.front()) {
    problems.add(raw.values.front().where,
                 fmt::format("{} order = \"{}\": the values {} from {} to {}, so that the shell would shrink as it grew; is the order "
                             "the other way round?",
                             row.label, order, raw.from_lip ? "rise" : "fall", raw.values.front().value, raw.values.back().value));
    return;
  }
  // A whorl narrower than the one before it by more than this is no irregularity of growth but a slip in the list.
  constexpr double kLeastGrowth = 0.8;
  for (std::size_t i = 1; i < count; ++i) {
    if (series.values[i] >= kLeastGrowth * series.values[i - 1]) continue;
    problems.add(readings[i].where,
                 fmt::format("{}: {} is narrower than the whorl before it, {}; a series in the wrong order, or a slip of the pen?",
                             row.label, series.values[i] / *factor, series.values[i - 1] / *factor));
    return;
  }
  specimen.series.push_back(std::move(series));
  specimen.readings.insert(specimen.readings.end(), readings.begin(), readings.end());
}

}  // namespace whorl::specimen
