// SPDX-License-Identifier: Apache-2.0
// Tells the two forms of a measurement file apart and raises what is wrong with it.
#include "specimen/measurement_file.h"

#include "specimen/measurement_toml.h"
#include "specimen/scene_bytes.h"
#include "specimen/toml_guard.h"

#include <algorithm>

namespace whorl::specimen {
namespace {

/// A name decides by its ending; else the first line that is neither blank nor a comment: TOML has "=" or a table in it.
bool is_table(std::string_view text, std::string_view name) {
  if (name.ends_with(".csv")) return true;
  if (name.ends_with(".toml")) return false;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find('\n'), text.size());
    const std::string_view line = text.substr(0, end);
    text.remove_prefix(std::min(end + 1, text.size()));
    const std::size_t first = line.find_first_not_of(" \t\r");
    if (first == std::string_view::npos || line[first] == '#') continue;
    return line[first] != '[' && line.find('=') == std::string_view::npos;
  }
  return false;
}

}  // namespace

MeasurementFile parse_measurements(std::string text, std::string source_name) {
  ProblemList problems;
  check_bytes(text, problems, {"measurement file", "it begins with the line: format = 1, or with the header of a table"});
  problems.throw_if_any(source_name);
  MeasurementFile file{source_name, {}};
  if (is_table(text, source_name)) {
    file.specimens = read_measurement_csv(text, problems);
  } else {
    guard_toml(text, problems);
    problems.throw_if_any(source_name);
    file.specimens.push_back(read_measurement_toml(text, source_name, problems));
  }
  problems.throw_if_any(source_name);
  return file;
}

MeasurementFile read_measurement_file(const std::string& path) { return parse_measurements(fetch_bytes(path), path); }

}  // namespace whorl::specimen
