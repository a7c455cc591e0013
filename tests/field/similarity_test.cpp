// SPDX-License-Identifier: Apache-2.0
// A strictly self-similar shell's functions scale with it (check value C26, shell-geometry 4.9).
#include "field/field.h"

#include "support/catch.h"
#include "support/shell_check_values.h"
#include "support/shell_specimen.h"

#include <random>

using namespace whorl;
using field::Part;

namespace {

// e^(k d) Rot_z(d): where a place of the shell is found again after d more of growth.
Vec3 grown(const Vec3& p, double W, double d) {
  const double g = std::pow(W, d / kTwoPi), c = std::cos(d), s = std::sin(d);
  return {g * (c * p.x - s * p.y), g * (s * p.x + c * p.y), g * p.z};
}

}  // namespace

TEST_CASE("Signed lengths of a self-similar shell grow by W a turn, tube, lumen and columella", "[field]") {
  const double tolerance = test::check_values("C26").front().tolerance;
  test::ShellPlan crossing = test::self_similar_plan(), lobed = test::self_similar_plan();
  crossing.D = -0.15;
  crossing.columella = 0.4;
  lobed.D = 0.3;
  lobed.columella = 0.0;
  lobed.lobes = {{70.0, 0.2, 30.0}};
  for (test::ShellPlan plan : {test::self_similar_plan(), crossing, lobed}) {
    plan.whorls = 10.0;
    const test::Shell shell(plan);
    const growth::CoilingLaw& law = shell.scene.law;
    const double W = plan.W[0].W;
    CAPTURE(plan.D);
    std::mt19937 engine(9);
    const auto draw = [&](double lo, double hi) { return std::uniform_real_distribution<double>(lo, hi)(engine); };
    double worst = 0.0;
    int states = 0, states_alike = 0;
    for (int i = 0; i < 6000; ++i) {
      // Away from the first whorls and the embryonic cap, and from the last whorls.
      const double theta = draw(law.theta_start + 4.0 * kTwoPi, law.theta_lip - 3.2 * kTwoPi), psi = draw(-kPi, kPi);
      const double reach = draw(0.1, 1.4);
      const growth::HalfPlanePoint at =
          law.to_half_plane(law.at(theta), {reach * std::cos(psi), reach * std::sin(psi)});
      if (at.rho < 1e-3 * law.at(theta).half_breadth || at.z < shell.scene.chamber.centre_z + 2.0 * shell.scene.chamber.half_height)
        continue;
      const Vec3 p = test::in_space(theta, at);
      const double size = law.at(theta).half_breadth;
      const double on = i % 2 == 0 ? kTwoPi : draw(0.5, 6.0);
      const Vec3 q = grown(p, W, on);
      if (shell.scene.pillar.present && q.z > shell.scene.pillar.fillet_from_z) continue;  // the fillet fades towards the base
      const double g = std::pow(W, on / kTwoPi);
      for (const Part part : {Part::kWhorl, Part::kWhorlHollow, Part::kPillar}) {
        if (part == Part::kPillar && !shell.scene.pillar.present) continue;
        const double before = shell.field.value({part, theta}, p), after = shell.field.value({part, theta + on}, q);
        // The ratio where there is a length to divide by, the lengths against the section elsewhere.
        worst = std::max(worst, std::abs(before) > 0.05 * size ? std::abs(after / (g * before) - 1.0)
                                                               : std::abs(after - g * before) / (g * size));
      }
      if (on == kTwoPi && std::abs(shell.field.value({Part::kWhorl, theta}, p)) > 1e-5 &&
          std::abs(shell.field.value({Part::kWhorlHollow, theta}, p)) > 1e-5) {
        ++states;
        if (shell.at(p) == shell.at(q)) ++states_alike;
      }
    }
    CHECK(worst < tolerance);
    CHECK(states > 1000);
    CHECK(states_alike == states);
  }
}
