// SPDX-License-Identifier: Apache-2.0
// From what was measured on a specimen to the shell that measures the same, and how well it is known.
#pragma once

#include "fit/knowledge.h"
#include "specimen/measurement_file.h"

#include <string>
#include <vector>

namespace whorl::fit {

enum class Verdict {
  kFits,
  kFitsWithTrend,  // only if its expansion changes along the shell
  kNotAlone,       // fits, but so does a shell of another shape
  kDoesNotFit,     // some reading is off by more than its error and the tolerance
  kNotFixed,       // too little was measured to know the expansion
};

enum class State {
  kFitted,
  kAtBound,   // as far as the parameter may go; its interval is one-sided
  kHeld,      // stated by the user
  kImplied,   // follows from what was measured, such as a planispiral form
  kAssumed,   // not fixed by the data
};

struct ParameterResult {
  Parameter parameter{};
  State state = State::kFitted;
  double value = 0.0;                          // as a user knows it
  double error = 0.0, low = 0.0, high = 0.0;   // standard error; 95 % interval; 0 where not fitted
  std::string why;                             // of what is not fitted
  std::vector<std::string> fixed_by;           // measures that would fix what is assumed
};

struct ReadingResult {
  double predicted = 0.0, residual = 0.0;  // predicted - read
  double sigma = 0.0;                      // standard error with the scatter of its series
  bool fits = true;
};

/// What a series says by itself. Angles in degrees.
struct SeriesResult {
  std::size_t index = 0;
  double end_to_end_W = 0.0;          // (last / first)^(1 / turns)
  double least_squares_W = 0.0;       // of ln width on the turn
  double rms_of_ln = 0.0;             // residual of that
  double mean_spiral_angle = 0.0;     // of the ratios one turn apart, in the plane: atan(2 pi / ln ratio)
  double first_ratio = 0.0, last_ratio = 0.0, spread_of_ratios = 0.0;  // one turn apart; largest / smallest
  double scatter = 0.0;               // estimated or stated, as a fraction
};

struct OutlineResult {
  std::size_t points = 0, on_outline = 0;  // used; within three errors, or 2 % of the radius
  double median_distance = 0.0;            // mm
  double tilt_deg = 0.0;                   // of the axis in the picture
  bool fits = true;
};

struct IndexResult {
  std::string name, meaning;
  double of_shell = 0.0, of_shell_error = 0.0;  // of the fitted shell
  bool from_readings = false;                   // whether the readings give it by themselves
  double read = 0.0, read_error = 0.0, read_step = 0.0;  // standard error; how far all steps together can move it
};

struct ModelResult {
  std::string name;
  std::size_t parameters = 0;
  double chi_square = 0.0, aicc = 0.0;  // corrected AIC; infinite where the readings are too few for it
  bool chosen = false;
};

struct Fit {
  Verdict verdict = Verdict::kNotFixed;
  Task task;
  Trial trial;
  Knowledge knowledge;
  double chi_square = 0.0;
  int degrees_of_freedom = 0;
  double inflation = 1.0;  // of all standard errors, where the misfit exceeds the readings' errors (Birge 1932)
  /// For each assumed parameter, the solutions with it moved to either side as far as the readings do not object.
  std::vector<std::vector<Trial>> alternatives;
  std::vector<ParameterResult> parameters;
  std::vector<ReadingResult> readings;
  std::vector<SeriesResult> series;
  std::vector<OutlineResult> outlines;
  std::vector<IndexResult> indices;
  std::vector<ModelResult> models;
  std::vector<std::string> remarks;  // what the user must know, a sentence each
};

Fit fit_specimen(const specimen::MeasuredSpecimen& measured);

}  // namespace whorl::fit
