// SPDX-License-Identifier: Apache-2.0
// Heights of sculpture and their bounds.
#include "growth/sculpture.h"

#include "growth/irregularity.h"
#include "math/falloff.h"
#include "math/vec.h"

#include <algorithm>
#include <cmath>

namespace whorl::growth {
namespace {

constexpr double kRamp = 0.25 * kTwoPi;    // growth over which a relief rises to its height and falls from it

double ramp(const Relief& r, double growth) { return smooth_step((growth - r.onset) / kRamp) * smooth_step((r.end - growth) / kRamp); }

// The ramp rises once and falls once.
Interval ramp_range(const Relief& r, Interval growth) {
  const double a = ramp(r, growth.lo), b = ramp(r, growth.hi);
  const double top = std::clamp(0.5 * (r.onset + r.end), growth.lo, growth.hi);
  return {std::min(a, b), std::max({a, b, ramp(r, top)})};
}

// What the height, in half-breadths, is on a whorl of that size against the one at the lip.
double of_size(const Relief& r, double scale) { return r.power == 1.0 ? 1.0 : std::pow(scale, r.power - 1.0); }
Interval of_size(const Relief& r, Interval scale) { return hull(Interval(of_size(r, scale.lo)), Interval(of_size(r, scale.hi))); }

struct Crest {
  double at, scale;
};

Crest crest(const Relief& r, double number) {
  const Deviation d = deviation(r.seed, static_cast<std::int64_t>(number), r.irregularity);
  return {r.crest + (number + d.shift) * r.spacing, d.scale};
}

// Crests that can reach a range of growth.
struct Numbers {
  double first, last;
};
Numbers numbers(const Relief& r, Interval growth) {
  const double reach = r.growth_reach + kMostShift * r.irregularity * r.spacing;
  return {std::ceil((growth.lo - reach - r.crest) / r.spacing), std::floor((growth.hi + reach - r.crest) / r.spacing)};
}

// Least and greatest distance round the section.
Interval psi_distance(const Relief& r, double from, double span) {
  if (r.psi_reach == 0.0) return Interval(0.0);
  const double d = std::abs(std::remainder(from + 0.5 * span - r.psi, kTwoPi));
  return {std::max(0.0, d - 0.5 * span), std::min(kPi, d + 0.5 * span)};
}

double squared_share(double distance, double reach) { return reach > 0.0 ? distance * distance / (reach * reach) : 0.0; }

bool reaches(const Relief& r, Interval growth, double psi_from, double psi_span) {
  return growth.hi > r.onset && growth.lo < r.end && (r.psi_reach == 0.0 || psi_distance(r, psi_from, psi_span).lo < r.psi_reach);
}

}  // namespace

double Sculpture::height(double growth, double psi, double scale) const noexcept {
  double sum = 0.0;
  for (const Relief& r : reliefs) {
    if (growth <= r.onset || growth >= r.end) continue;
    const double v2 = squared_share(std::remainder(psi - r.psi, kTwoPi), r.psi_reach);
    if (v2 >= 1.0) continue;
    double profile = 0.0;
    if (r.spacing == 0.0) {
      profile = wyvill(v2);
    } else {
      const Numbers n = numbers(r, Interval(growth));
      for (double number = n.first; number <= n.last; number += 1.0) {
        const Crest c = crest(r, number);
        profile += c.scale * wyvill(v2 + squared_share(growth - c.at, r.growth_reach));
      }
    }
    sum += r.height * of_size(r, scale) * ramp(r, growth) * profile;
  }
  return sum;
}

Interval Sculpture::range(Interval growth, double psi_from, double psi_span, Interval scale) const noexcept {
  Interval sum(0.0);
  for (const Relief& r : reliefs) {
    if (!reaches(r, growth, psi_from, psi_span)) continue;
    const Interval v = psi_distance(r, psi_from, psi_span);
    const Interval v2(squared_share(v.lo, r.psi_reach), squared_share(v.hi, r.psi_reach));
    Interval profile(0.0);
    if (r.spacing == 0.0) {
      profile = {wyvill(v2.hi), wyvill(v2.lo)};
    } else {
      const Numbers n = numbers(r, growth);
      constexpr double kMany = 8.0;  // more crests than that: all heights occur
      if (n.last - n.first > kMany) {
        // Neighbours overlap where they are broad or shifted: at most this many have a say at one place.
        const double overlap = 1.0 + std::ceil(2.0 * (r.growth_reach / r.spacing + kMostShift * r.irregularity));
        profile.hi = overlap * (1.0 + kMostVariation * r.irregularity) * wyvill(v2.lo);
      } else {
        for (double number = n.first; number <= n.last; number += 1.0) {
          const Crest c = crest(r, number);
          const double near = std::max({0.0, growth.lo - c.at, c.at - growth.hi});
          const double far = std::max(std::abs(growth.lo - c.at), std::abs(growth.hi - c.at));
          profile = profile + c.scale * Interval(wyvill(v2.hi + squared_share(far, r.growth_reach)),
                                                 wyvill(v2.lo + squared_share(near, r.growth_reach)));
        }
      }
    }
    sum = sum + r.height * (of_size(r, scale) * (ramp_range(r, growth) * profile));
  }
  return sum;
}

Sculpture::Slopes Sculpture::slopes(Interval growth, double psi_from, double psi_span, Interval scale) const noexcept {
  Slopes sum;
  for (const Relief& r : reliefs) {
    if (!reaches(r, growth, psi_from, psi_span)) continue;
    const bool unbroken = r.spacing == 0.0;
    const double together = unbroken ? 1.0 : 1.0 + std::ceil(2.0 * (r.growth_reach / r.spacing + kMostShift * r.irregularity));
    const double most = std::abs(r.height) * (1.0 + kMostVariation * r.irregularity) * together * of_size(r, scale).hi;
    sum.by_log_scale += std::abs(r.power - 1.0) * most;
    sum.by_growth += most * (kSteepestSmoothStep / kRamp + (unbroken ? 0.0 : kSteepestWyvill / r.growth_reach));
    if (r.psi_reach > 0.0) sum.by_psi += most * kSteepestWyvill / r.psi_reach;
  }
  return sum;
}

Interval Sculpture::extremes(double psi) const noexcept {
  Interval sum(0.0);
  for (const Relief& r : reliefs) {
    const double most = r.height * (1.0 + kMostVariation * r.irregularity) * of_size(r, Interval(r.least_scale, 1.0)).hi *
                        wyvill(squared_share(std::remainder(psi - r.psi, kTwoPi), r.psi_reach));
    (most > 0.0 ? sum.hi : sum.lo) += most;
  }
  return sum;
}

Interval Sculpture::extremes() const noexcept {
  Interval most(0.0);
  constexpr int kDirections = 1440;
  for (int i = 0; i < kDirections; ++i) most = hull(most, extremes(kTwoPi * i / kDirections));
  return most;
}

}  // namespace whorl::growth
