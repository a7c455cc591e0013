// SPDX-License-Identifier: Apache-2.0
// Two threads see what one sees, to the bit.
#include "support/catch.h"

#include "math/parallel.h"
#include "support/shell_rays.h"
#include "trace/embree_solid.h"

#include <algorithm>
#include <thread>

using namespace whorl;
using trace::Hit;

namespace {

bool same(const Hit& a, const Hit& b) {
  return a.t == b.t && a.position == b.position && a.normal == b.normal && a.part == b.part && a.passage == b.passage &&
         a.safe_offset == b.safe_offset;
}

bool same(const trace::Cell& a, const trace::Cell& b) {
  return std::equal(a.centre, a.centre + 3, b.centre) && a.half == b.half && a.first_term == b.first_term &&
         a.first_owner == b.first_owner && a.term_count == b.term_count && a.owner_count == b.owner_count && a.kind == b.kind;
}
bool same(const trace::CellTerm& a, const trace::CellTerm& b) {
  return std::equal(a.cubic, a.cubic + trace::kCubicTerms, b.cubic) && a.steepness == b.steepness && a.part == b.part &&
         a.theta == b.theta;
}
bool same(const trace::CellOwner& a, const trace::CellOwner& b) {
  return a.outer == b.outer && a.hollow == b.hollow && a.opening == b.opening;
}

template <class T>
bool all_same(const std::vector<T>& a, const std::vector<T>& b) {
  return std::equal(a.begin(), a.end(), b.begin(), b.end(), [](const T& x, const T& y) { return same(x, y); });
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
  CHECK(one.cells.size() > 1000);
  CHECK(all_same(one.cells, three.cells));
  CHECK(all_same(one.owners, three.owners));
  CHECK(all_same(one.terms, three.terms));
}
