// SPDX-License-Identifier: Apache-2.0
// What was measured on specimens, read from a measurement file: TOML for one specimen, CSV for many.
#pragma once

#include "specimen/definitions.h"
#include "specimen/specimen.h"

#include <optional>
#include <string>
#include <vector>

namespace whorl::specimen {

/// When in growth a measurement was taken.
struct GrowthStage {
  enum class Kind {
    kLip,         // the whole shell
    kBehindLip,   // so many whorls before the lip
    kAtWhorl,     // so many whorls from the pole
    kAtDiameter,  // where the sum of the radii half a turn apart was so many mm
  };
  Kind kind = Kind::kLip;
  double value = 0.0;
};

/// One value as measured. Lengths in mm, angles in degrees, counts in whorls.
struct Reading {
  Definition definition{};
  GrowthStage stage;
  double value = 0.0;
  double step = 0.0;            // of the instrument; 0 where a standard error is stated
  double standard_error = 0.0;  // stated, or step / sqrt(12): a reading is rounded to its step
  int series = -1;              // index of the series it belongs to
  diagnostics::Position where;
};

/// Successive whorls measured alike. `turn` = 1 for readings a whole turn apart, 0.5 for half turns.
struct Series {
  Definition definition{};
  double turn = 1.0;
  std::optional<double> scatter;  // natural irregularity as a fraction of the value; estimated where not stated
  std::vector<double> values;     // from the apex to the lip, mm
  diagnostics::Position where;
};

/// Points traced on a picture, those marked as missing left out.
struct TracedOutline {
  enum class Kind {
    kSilhouette,  // of the shell in a side view, the axis upright
    kSection,     // of one whorl in the half-plane through the axis, which lies to the left of it
    kSuture,      // sutures of the spire in a side view, the axis upright
  };
  struct Point {
    double x, y;  // mm from any origin; x to the right, y towards the apex
  };
  Kind kind = Kind::kSilhouette;
  double azimuth_deg = 0.0;  // of the view: degrees the eye walks to its right from the apertural view
  GrowthStage stage;         // of a section
  std::vector<Point> points;
  double standard_error = 0.0;  // of a point, mm
  diagnostics::Position where;
};

/// Parameters that the user states rather than fits.
struct Held {
  std::optional<double> whorls, W, D, T, S, start, roll_deg, columella;
};

struct MeasuredSpecimen {
  Identity identity;
  Held held;
  std::vector<Reading> readings;  // those of series too
  std::vector<Series> series;
  std::vector<TracedOutline> outlines;
  bool mould = false;                        // measured on the internal mould
  std::optional<Stated<double>> mould_wall;  // of the shell round it, at the lip, mm
  std::vector<Preserved> preserved;          // as stated; none: the readings tell
  double tolerance = 0.02;  // misfit that still counts as fitting, as a fraction of the value
  diagnostics::Position where;
};

struct MeasurementFile {
  std::string source;
  std::vector<MeasuredSpecimen> specimens;
};

/// Reads and checks a measurement file; "-" is standard input. A name that ends in .csv is a table, one in .toml is TOML;
/// else the first line decides. Throws diagnostics::FileTrouble or, with every fault of the file, diagnostics::InvalidInput.
MeasurementFile read_measurement_file(const std::string& path);
MeasurementFile parse_measurements(std::string text, std::string source_name);

}  // namespace whorl::specimen
