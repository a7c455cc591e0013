// SPDX-License-Identifier: Apache-2.0
// The names, units and order in which measurements are told.
#include "measure/report.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <vector>

namespace whorl::measure {
namespace {

struct Row {
  const char* name;
  const char* unit;
  const Measured Measurements::*value;
  bool raup = false;
};

const std::vector<Row>& rows() {
  static const std::vector<Row> all = {
      {"shell_height", "mm", &Measurements::shell_height},
      {"shell_width", "mm", &Measurements::shell_width},
      {"aperture_height", "mm", &Measurements::aperture_height},
      {"aperture_width", "mm", &Measurements::aperture_width},
      {"last_whorl_height", "mm", &Measurements::last_whorl_height},
      {"spire_height", "mm", &Measurements::spire_height},
      {"whorls", "", &Measurements::whorls},
      {"apical_angle_deg", "degrees", &Measurements::apical_angle_deg},
      {"wall_thickness_lip", "mm", &Measurements::wall_thickness_lip},
      {"wall_thickness_min", "mm", &Measurements::wall_thickness_min},
      {"outer_volume", "mm3", &Measurements::outer_volume},
      {"lumen_volume", "mm3", &Measurements::lumen_volume},
      {"wall_volume", "mm3", &Measurements::wall_volume},
      {"outer_area", "mm2", &Measurements::outer_area},
      {"inner_area", "mm2", &Measurements::inner_area},
      {"mass_g", "g", &Measurements::mass_g},
      {"W", "", &Measurements::raup_W, true},
      {"D", "", &Measurements::raup_D, true},
      {"T", "", &Measurements::raup_T, true},
      {"S", "", &Measurements::raup_S, true},
  };
  return all;
}

}  // namespace

nlohmann::ordered_json to_json(const Measurements& measurements) {
  nlohmann::ordered_json json, raup, detail;
  json["units"] = "mm";
  for (const Row& row : rows()) {
    const Measured& m = measurements.*row.value;
    (row.raup ? raup : json)[row.name] = m.value;
    detail[row.raup ? std::string("raup.") + row.name : row.name] = {{"method", m.method}, {"error", m.error}};
  }
  json["raup"] = raup;
  json["detail"] = detail;
  return json;
}

std::string to_table(const Measurements& measurements) {
  std::string text;
  for (const Row& row : rows()) {
    const Measured& m = measurements.*row.value;
    // As many decimals as the error allows, one more than its first digit.
    const int decimals = m.error > 0.0 ? std::clamp(1 - static_cast<int>(std::floor(std::log10(m.error))), 0, 6) : 6;
    text += fmt::format("{:<20}{:>14.{}f} {:<8} +- {:.2g}\n", row.name, m.value, decimals, row.unit, m.error);
  }
  return text + "How each was measured: --json, under detail.\n";
}

}  // namespace whorl::measure
