// SPDX-License-Identifier: Apache-2.0
// Counts of cells and primitives.
#include "app/solid_counters.h"

namespace whorl::app {

nlohmann::ordered_json solid_counters(const trace::EmbreeSolid& solid) {
  const trace::CellSet& set = solid.cells();
  const scene::Scene& scene = solid.field().scene();
  return {{"cells", set.size()},
          {"cell_functions", set.functions()},
          {"exact_cells", set.exact_cells()},
          {"cell_bytes", set.bytes()},
          {"cell_tolerance_mm", set.tolerance_mm},
          {"primitives", 2 * scene.stations.size() + scene.ellipsoids.size()}};
}

}  // namespace whorl::app
