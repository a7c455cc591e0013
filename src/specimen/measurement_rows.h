// SPDX-License-Identifier: Apache-2.0
// From one row of a measurement file, as text and numbers, to a reading: shared by the TOML and the CSV reader.
#pragma once

#include "specimen/measurement_file.h"
#include "specimen/problem_list.h"

#include <utility>

namespace whorl::specimen {

/// What holds for all rows of a file.
struct RowDefaults {
  std::string unit = "mm";
  std::optional<double> step;  // in that unit, of lengths
};

/// A row as it was written; values in the unit of the file.
struct RawRow {
  std::string label;  // "[[measurement]]" or "row"
  diagnostics::Position where;
  Stated<std::string> quantity, definition, unit;
  Stated<double> value;
  std::optional<double> in_brackets;
  std::optional<Stated<double>> step, error, behind_lip, at_whorl, at_diameter;
};

/// Millimetres in one of a unit; empty where the unit is not known.
std::optional<double> millimetres_in(std::string_view unit);
/// "85 (63)" as two numbers.
std::optional<std::pair<double, double>> diameter_with_brackets(std::string_view text);

/// The definition that a row states, or null after a complaint that lists what it may mean.
const DefinitionRow* definition_of(const RawRow& row, ProblemList& problems);

/// Adds the row's reading. Complains of what is wrong with it.
void add_reading(const RawRow& row, const RowDefaults& defaults, MeasuredSpecimen& specimen, ProblemList& problems);
/// A series whose values are in the order of the file, each with its place.
struct RawSeries {
  RawRow row;  // without a value
  std::vector<Stated<double>> values;
  bool half_turns = false, from_lip = false;
  std::optional<double> scatter;
};
void add_series(const RawSeries& raw, const RowDefaults& defaults, MeasuredSpecimen& specimen, ProblemList& problems);

/// After all rows of a specimen: the stage that a bracketed diameter gives to rows without one, and contradictions between
/// rows that no shell can have.
void check_mould(const MeasuredSpecimen& specimen, ProblemList& problems);
void finish_specimen(MeasuredSpecimen& specimen, std::optional<double> bracketed_mm, ProblemList& problems);

}  // namespace whorl::specimen
