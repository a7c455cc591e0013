// SPDX-License-Identifier: Apache-2.0
// Two threads see what one sees, to the bit.
#include "support/catch.h"

#include "math/parallel.h"
#include "support/shell_rays.h"
#include "trace/embree_solid.h"

#include <algorithm>
#include <cstring>
#include <thread>

using namespace whorl;
using trace::Hit;

namespace {

bool same(const Hit& a, const Hit& b) {
  return a.t == b.t && a.position == b.position && a.normal == b.normal && a.part == b.part && a.passage == b.passage &&
         a.safe_offset == b.safe_offset;
}

bool same(const trace::CellSet& a, const trace::CellSet& b) {
  if (a.size() != b.size()) return false;
  for (std::size_t i = 0; i < a.size(); ++i) {
    const trace::Cell &x = a.cell(i), &y = b.cell(i);
    // The head, the cubics and the owners stand one behind the other.
    const std::size_t bytes = sizeof(x) + x.function_count * sizeof(trace::Cubic) + x.owner_count * sizeof(trace::CellOwner);
    if (x.function_count != y.function_count || x.owner_count != y.owner_count || std::memcmp(&x, &y, bytes) != 0) return false;
    for (int k = 0; k < x.function_count; ++k) {
      const trace::FunctionFacts &f = a.facts(x)[k], &g = b.facts(y)[k];
      if (f.theta != g.theta || f.steepness != g.steepness || f.part != g.part) return false;
    }
  }
  return true;
}

}  // namespace

TEST_CASE("Rays from two threads at once meet bit for bit what one thread meets", "[trace]") {
  const test::Shell shell(test::tall_plan());
  const trace::EmbreeSolid solid(shell.field, {1e-5 * shell.height(), false});
  const std::vector<trace::Ray> rays = test::random_rays(shell, 60000, 71);
  std::vector<Hit> alone(rays.size()), together(rays.size());
  std::vector<int> found(rays.size()), found_together(rays.size()), dark(rays.size()), dark_together(rays.size());
  std::vector<std::size_t> crossed(rays.size()), crossed_together(rays.size());
  const auto run = [&](std::size_t first, std::size_t step, std::vector<Hit>& hits, std::vector<int>& hit, std::vector<int>& occluded,
                       std::vector<std::size_t>& crossings) {
    std::vector<trace::Crossing> out;
    for (std::size_t i = first; i < rays.size(); i += step) {
      hit[i] = solid.closest(rays[i], hits[i]);
      occluded[i] = solid.occluded(rays[i]);
      if (i % 8 != 0) continue;
      solid.crossings(rays[i], field::State::kOutside, out);
      crossings[i] = out.size();
    }
  };
  run(0, 1, alone, found, dark, crossed);
  std::thread even([&] { run(0, 2, together, found_together, dark_together, crossed_together); });
  std::thread uneven([&] { run(1, 2, together, found_together, dark_together, crossed_together); });
  even.join();
  uneven.join();
  CHECK(found == found_together);
  CHECK(dark == dark_together);
  CHECK(crossed == crossed_together);
  int differ = 0, hits = 0;
  for (std::size_t i = 0; i < rays.size(); ++i) {
    differ += !same(alone[i], together[i]);
    hits += found[i];
  }
  CHECK(differ == 0);
  CHECK(hits > 10000);
}

TEST_CASE("Cells are the same for any number of threads that build them", "[trace]") {
  test::ShellPlan plan = test::globose_plan();
  plan.size_kind = specimen::SizeKind::kApertureHeight;
  plan.size_mm = 10.0;
  const test::Shell shell(plan);
  const int before = thread_count();
  set_thread_count(1);
  const trace::CellSet one = trace::build_cells(shell.field, 2e-5 * shell.height());
  set_thread_count(3);
  const trace::CellSet three = trace::build_cells(shell.field, 2e-5 * shell.height());
  set_thread_count(before);
  CHECK(one.size() > 1000);
  CHECK(same(one, three));
}
