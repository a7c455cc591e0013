// SPDX-License-Identifier: Apache-2.0
// Counts of cells and primitives.
#include "app/solid_counters.h"

namespace whorl::app {

nlohmann::ordered_json solid_counters(const trace::EmbreeSolid& solid, const trace::AttachedSolids* attached) {
  const trace::CellSet& set = solid.cells();
  const scene::Scene& scene = solid.field().scene();
  nlohmann::ordered_json json = {{"cells", set.size()},
          {"cell_functions", set.functions()},
          {"exact_cells", set.exact_cells()},
          {"cell_bytes", set.bytes()},
          {"cell_tolerance_mm", set.tolerance_mm},
          {"primitives", 2 * scene.stations.size() + scene.ellipsoids.size()}};
  if (attached) {
    json["attached_elements"] = attached->size();
    json["attached_left_out"] = attached->left_out();
    json["attached_bytes"] = attached->bytes();
  }
  return json;
}

}  // namespace whorl::app
