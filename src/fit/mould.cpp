// SPDX-License-Identifier: Apache-2.0
// Grows the section until the lumen within it is the mould.
#include "fit/mould.h"

#include "growth/outline.h"

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

/// A section by its half-axes and its centre in the half-plane, mm.
struct Ring {
  double a, b, rho, z;
};

Ring ring_of(const growth::CoilingLaw& law) { return {law.half_breadth, law.S * law.half_breadth, law.distance, law.depth}; }

// The lumen's extents along the section's axes. Of the curve's even samples, the summit of the parabola through the highest three.
Ring lumen_of(const growth::CoilingLaw& law, const PeriodicSpline& reach) {
  constexpr int kSamples = 2048;
  const auto farthest = [&](double cosine, double sine) {
    const auto along = [&](int i) {
      const double psi = kTwoPi * i / kSamples;
      return reach.value(psi) * (std::cos(psi) * cosine + std::sin(psi) * sine);
    };
    int best = 0;
    for (int i = 1; i < kSamples; ++i)
      if (along(i) > along(best)) best = i;
    const double before = along(best - 1), here = along(best), after = along(best + 1), bend = before - 2.0 * here + after;
    return bend < 0.0 ? here - (after - before) * (after - before) / (8.0 * bend) : here;
  };
  const double right = farthest(1, 0), left = farthest(-1, 0), up = farthest(0, 1), down = farthest(0, -1);
  const growth::HalfPlanePoint centre = law.to_half_plane(law.at(law.theta_lip), {0.5 * (right - left), 0.5 * (up - down)});
  return {0.5 * (right + left) * law.half_breadth, 0.5 * (up + down) * law.S * law.half_breadth, centre.rho, centre.z};
}

}  // namespace

std::optional<Values> shell_round(const Values& mould, const Fixed& fixed) {
  constexpr int kRounds = 30;
  const std::optional<Form> form = form_of(mould, fixed);
  if (!form) return std::nullopt;
  const Ring wanted = ring_of(form->law);
  growth::CoilingLaw law = form->law;
  const double w = fixed.wall_mm;
  Ring ring{wanted.a + w, wanted.b + w, wanted.rho, wanted.z};
  for (int round = 0; round < kRounds; ++round) {
    law.half_breadth = ring.a;
    law.S = ring.b / ring.a;
    law.distance = ring.rho;
    law.depth = ring.z;
    const growth::WallLaw wall{w, w, true, form->tan_inclination};
    const auto reach = growth::hollow_reach(law, law.theta_lip, PeriodicSpline(1.0), wall);
    if (!reach) return std::nullopt;
    const Ring now = lumen_of(law, *reach);
    const double off = std::max({std::abs(wanted.a - now.a), std::abs(wanted.b - now.b), std::abs(wanted.rho - now.rho), std::abs(wanted.z - now.z)});
    if (off < 1e-10 * wanted.a) break;
    ring = {ring.a + wanted.a - now.a, ring.b + wanted.b - now.b, ring.rho + wanted.rho - now.rho, ring.z + wanted.z - now.z};
  }
  Values shell = mould;
  at(shell, Parameter::kSize) = std::log(ring.rho + ring.a);
  at(shell, Parameter::kD) = (ring.rho - ring.a) / (ring.rho + ring.a);
  at(shell, Parameter::kT) = at(mould, Parameter::kT) == 0.0 ? 0.0 : ring.z / ring.rho;
  at(shell, Parameter::kS) = std::log(ring.b / ring.a);
  if (at(shell, Parameter::kD) < row_of(Parameter::kD).low) return std::nullopt;
  return shell;
}

}  // namespace whorl::fit
