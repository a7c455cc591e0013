// SPDX-License-Identifier: Apache-2.0
// Shares of arc and outer surface against the geometric series of a self-similar shell.
#include "measure/provenance_shares.h"

#include "support/catch.h"
#include "support/shell_specimen.h"
#include "trace/embree_solid.h"

#include <cmath>

using namespace whorl;
using specimen::Provenance;

namespace {

// A free coil: no whorl touches another, so that all of the tube's outside shows.
test::ShellPlan free_coil() {
  test::ShellPlan plan;
  plan.name = "free coil";
  plan.whorls = 5.0;
  plan.W = {{0.0, 1.6}};
  plan.D = 0.55;
  plan.T = 2.5;
  plan.wall_mm = 0.05;
  return plan;
}

specimen::Specimen preserved(const test::ShellPlan& plan, const std::vector<specimen::Stretch>& stretches) {
  specimen::Specimen s = test::specimen_of(plan);
  for (const specimen::Stretch& stretch : stretches) {
    specimen::Preserved one;
    one.from = specimen::Stated<double>{stretch.from, {}, true};
    one.to = specimen::Stated<double>{stretch.to, {}, true};
    s.preserved.push_back(one);
  }
  return s;
}

double share(const std::array<double, specimen::kProvenances>& shares, Provenance one) { return shares[static_cast<std::size_t>(one)]; }

}  // namespace

TEST_CASE("shares of arc and outer surface of a self-similar shell are those of the geometric series", "[measure][provenance]") {
  const test::ShellPlan plan = free_coil();
  const test::Shell shell(plan);
  const trace::EmbreeSolid solid(shell.field, {2e-5 * shell.height(), false});
  const double W = plan.W[0].W, N = plan.whorls, start = plan.start;
  const auto shares = measure::provenance_shares(solid, specimen::Preservation(preserved(plan, {{2.0, 3.0}, {4.0, 4.5}})), {1 << 17, 1});
  // Lengths grow as W^w, surfaces as W^2w.
  const auto series = [&](double base, double from, double to) { return std::pow(base, to) - std::pow(base, from); };
  const double arc = series(W, 0.0, N);
  CHECK(share(shares.arc, Provenance::kObserved) == Approx((series(W, 2.0, 3.0) + series(W, 4.0, 4.5)) / arc).margin(1e-4));
  CHECK(share(shares.arc, Provenance::kInterpolated) == Approx(series(W, 3.0, 4.0) / arc).margin(1e-4));
  CHECK(share(shares.arc, Provenance::kExtrapolated) == Approx((series(W, start, 2.0) + series(W, 4.5, N)) / arc).margin(1e-4));
  CHECK(share(shares.arc, Provenance::kAssumed) == Approx(series(W, 0.0, start) / arc).margin(1e-4));

  const double area = series(W * W, start, N);  // the embryonic shell and the thin rim add under a hundredth
  CHECK(shares.surface_error < 0.003);
  CHECK(share(shares.surface, Provenance::kObserved) == Approx((series(W * W, 2.0, 3.0) + series(W * W, 4.0, 4.5)) / area).epsilon(0.015));
  CHECK(share(shares.surface, Provenance::kInterpolated) == Approx(series(W * W, 3.0, 4.0) / area).epsilon(0.02));
  CHECK(share(shares.surface, Provenance::kInterpolated) / share(shares.surface, Provenance::kObserved) ==
        Approx(series(W * W, 3.0, 4.0) / (series(W * W, 2.0, 3.0) + series(W * W, 4.0, 4.5))).epsilon(0.015));
  CHECK(share(shares.surface, Provenance::kAssumed) > 0.0);
  double sum_arc = 0.0, sum_surface = 0.0;
  for (std::size_t i = 0; i < specimen::kProvenances; ++i) {
    sum_arc += shares.arc[i];
    sum_surface += shares.surface[i];
  }
  CHECK(sum_arc == Approx(1.0));
  CHECK(sum_surface == Approx(1.0));
  CHECK(share(shares.surface, Provenance::kNone) == 0.0);
}
