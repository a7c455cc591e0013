// SPDX-License-Identifier: Apache-2.0
// Columns of numbers.
#include "report.h"

#include <fmt/format.h>

namespace whorl::bench {
namespace {

constexpr double kMillion = 1e6, kMega = 1e6;

struct TrialRow {
  const char *name, *build, *memory, *camera, *scattered, *shadow, *errors;
};
constexpr TrialRow kTrial[] = {
    {"cells (37 512)", "0.57+0.01", "8", "24", "7.5", "8.9", "6e-6 / 4e-5"},
    {"cells at 3e-5 (89 699)", "1.3+0.02", "18", "25", "6.9", "8.6", "2e-6 / 1e-5"},
    {"triangles (11.8 M)", "67+2.1", "1000", "18.5", "6.2", "5.9", "9e-6 / 1.2e-4"},
    {"triangles, coarse (0.32 M)", "0.5+0.05", "30", "45", "11.4", "12.8", "3e-4 / 1e-2"},
    {"cells, stations (51 696)", "0.22+0.01", "9", "22.5", "7.0", "8.1", "5e-6 / 4e-5"},
    {"marching the primitives", "0.2", "-", "5.5", "1.3", "1.3", "exact"},
};

std::string memory_text(std::size_t bytes) {
  return bytes == 0 ? "-" : fmt::format("{:.1f}", static_cast<double>(bytes) / kMega);
}

}  // namespace

std::string table_text(const Shape& shape, const std::vector<const Contender*>& contenders, const std::vector<Result>& results) {
  std::string text = fmt::format("{}: half-breadth of the aperture {:.3f} mm, height {:.2f} mm, scene to field {:.3f} s\n", shape.name,
                                 shape.half_breadth_mm(), shape.height_mm(), shape.seconds);
  text += fmt::format("{:<30}{:>9}{:>8}{:>7}{:>9} |{:>8}{:>10}{:>8} |{:>6}{:>6}{:>6} |{:>9}{:>9}{:>8}{:>8} |{:>6}{:>6}\n", "", "elements",
                      "build s", "tree s", "MB", "camera", "scattered", "shadow", "cam", "scat", "shad", "err 50%", "err 99%", "50%*",
                      "99%*", "hits", "shade");
  for (std::size_t i = 0; i < contenders.size(); ++i) {
    const Contender& c = *contenders[i];
    const Result& r = results[i];
    text += fmt::format("{:<30}{:>9}{:>8.2f}{:>7.2f}{:>9} |", c.name, c.elements, c.build_seconds, c.hierarchy_seconds,
                        memory_text(c.bytes));
    text += fmt::format("{:>8.2f}{:>10.2f}{:>8.2f} |", r.rays_per_second[0] / kMillion, r.rays_per_second[1] / kMillion,
                        r.rays_per_second[2] / kMillion);
    text += fmt::format("{:>6.2f}{:>6.2f}{:>6.2f} |", r.ratio[0], r.ratio[1], r.ratio[2]);
    const double per_half = 1.0 / shape.half_breadth_mm(), per_height = 1e5 / shape.height_mm();
    text += fmt::format("{:>9.1e}{:>9.1e}{:>8.3f}{:>8.3f} |", r.error_median_mm * per_half, r.error_99_mm * per_half,
                        r.error_median_mm * per_height, r.error_99_mm * per_height);
    text += fmt::format("{:>6.3f}{:>6.3f}{}\n", r.hit_share[1], r.hit_share[2],
                        r.lost ? fmt::format("  ({} hits off the surface)", r.lost) : "");
  }
  return text;
}

nlohmann::ordered_json table_json(const Shape& shape, const std::vector<const Contender*>& contenders,
                                  const std::vector<Result>& results) {
  nlohmann::ordered_json json = {{"shape", shape.name},
                                 {"half_breadth_mm", shape.half_breadth_mm()},
                                 {"height_mm", shape.height_mm()},
                                 {"seconds_scene_to_field", shape.seconds}};
  for (std::size_t i = 0; i < contenders.size(); ++i) {
    const Contender& c = *contenders[i];
    const Result& r = results[i];
    nlohmann::ordered_json row = {{"name", c.name},
                                  {"elements", c.elements},
                                  {"seconds_build", c.build_seconds},
                                  {"seconds_hierarchy", c.hierarchy_seconds},
                                  {"bytes", c.bytes}};
    for (std::size_t k = 0; k < kKinds; ++k)
      row[kKindNames[k]] = {{"rays_per_second", r.rays_per_second[k]},
                            {"rays_per_wall_second", r.rays_per_wall_second[k]},
                            {"ratio", r.ratio[k]},
                            {"hit_share", r.hit_share[k]}};
    row["error_mm"] = {{"median", r.error_median_mm}, {"p99", r.error_99_mm}, {"hits_off_the_surface", r.lost}};
    json["contenders"].push_back(row);
  }
  return json;
}

std::string trial_text() {
  std::string text = fmt::format("{:<30}{:>12}{:>8} |{:>8}{:>10}{:>8} |{:>16}\n", "the trial, for comparison", "build s", "MB", "camera",
                                 "scattered", "shadow", "err 50% / 99%");
  for (const TrialRow& row : kTrial)
    text += fmt::format("{:<30}{:>12}{:>8} |{:>8}{:>10}{:>8} |{:>16}\n", row.name, row.build, row.memory, row.camera, row.scattered,
                        row.shadow, row.errors);
  return text;
}

}  // namespace whorl::bench
