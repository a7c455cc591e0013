// SPDX-License-Identifier: Apache-2.0
// From trade words to reliefs, and whether they fit the whorl.
#include "compile/sculpture.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::compile {
namespace {

using growth::Relief;

constexpr double kDeepest = 0.8;        // of the wall
constexpr double kPastLip = kTwoPi;     // sculpture that is not ended runs on past the lip, where the front cuts it

Relief spread(const specimen::Stated<double>& height, const specimen::Stated<double>& onset, const specimen::Stated<double>& end,
              double power, const growth::CoilingLaw& law, double half_breadth_mm) {
  Relief r;
  r.height = height / half_breadth_mm;
  r.onset = std::max(law.theta_start, kTwoPi * onset);
  r.end = kTwoPi * end >= law.theta_lip ? law.theta_lip + kPastLip : kTwoPi * end;
  r.power = power;
  r.least_scale = std::min(1.0, law.by_section.factor(r.onset));
  return r;
}

template <class Series>
Relief repeated(const Series& series, double share, const growth::CoilingLaw& law, double half_breadth_mm) {
  Relief r = spread(series.height_mm, series.onset, series.end, series.growth, law, half_breadth_mm);
  r.spacing = kTwoPi / series.per_whorl;
  r.crest = law.theta_lip - kTwoPi * series.behind_lip;
  r.growth_reach = 0.5 * share * r.spacing;
  r.psi = radians(series.at_deg);
  r.psi_reach = series.width_deg >= 360.0 ? 0.0 : radians(0.5 * series.width_deg);
  r.irregularity = series.irregularity;
  r.seed = static_cast<std::uint64_t>(series.seed.value);
  return r;
}

}  // namespace

growth::Sculpture sculpture_of(const specimen::Specimen& specimen, const growth::CoilingLaw& law, double half_breadth_mm) {
  growth::Sculpture sculpture;
  for (const specimen::Cord& cord : specimen.sculpture.cords) {
    Relief r = spread(cord.height_mm, cord.onset, cord.end, cord.growth, law, half_breadth_mm);
    r.psi = radians(cord.at_deg);
    r.psi_reach = radians(0.5 * cord.width_deg);
    sculpture.reliefs.push_back(r);
  }
  for (const specimen::Rib& rib : specimen.sculpture.ribs)
    sculpture.reliefs.push_back(repeated(rib, rib.breadth, law, half_breadth_mm));
  for (const specimen::Nodule& nodule : specimen.sculpture.nodules)
    sculpture.reliefs.push_back(repeated(nodule, nodule.length, law, half_breadth_mm));
  return sculpture;
}

void build_sculpture(scene::Scene& scene, const specimen::Specimen& specimen, Faults& faults) {
  const double half_breadth = scene.law.half_breadth;
  scene.sculpture = sculpture_of(specimen, scene.law, half_breadth);
  if (scene.sculpture.empty()) return;
  double scale = 1e300;
  for (const growth::Outline& outline : scene.outlines) scale = std::min(scale, outline.normal_scale.bounds().lo);
  const Interval extremes = scene.sculpture.extremes();
  const double highest = extremes.hi, deepest = -extremes.lo;
  // What rises, or cuts, the most is at fault.
  const auto worst = [&](const char*& table, double sign) {
    const specimen::Stated<double>* found = nullptr;
    const auto look = [&](const char* name, const specimen::Stated<double>& height) {
      if (found == nullptr || sign * height > sign * *found) {
        found = &height;
        table = name;
      }
    };
    for (const auto& c : specimen.sculpture.cords) look("cord", c.height_mm);
    for (const auto& r : specimen.sculpture.ribs) look("rib", r.height_mm);
    for (const auto& n : specimen.sculpture.nodules) look("nodule", n.height_mm);
    return *found;
  };
  const char* table = "";
  if (highest > growth::kHighestRelief * scale) {
    const specimen::Stated<double> height = worst(table, 1.0);
    faults.add(height.where,
               fmt::format("[[{}]] height = {:g} mm: all sculpture together rises {:.3g} mm in one direction, as at the lip; what is fused with "
                           "this whorl may rise {:.3g} mm; make it lower, spread it, or let it begin later or grow with the whorl",
                           table, height.value, highest * half_breadth, growth::kHighestRelief * scale * half_breadth));
  }
  if (deepest * half_breadth > kDeepest * scene.wall.at_lip) {
    const specimen::Stated<double> height = worst(table, -1.0);
    faults.add(height.where,
               fmt::format("[[{}]] height = {:g} mm: all sculpture together cuts {:.3g} mm deep in one direction; at most {:.3g} mm, "
                           "four fifths of the wall, leave a wall that holds; cut less, or give a thicker wall",
                           table, height.value, deepest * half_breadth, kDeepest * scene.wall.at_lip));
  }
}

}  // namespace whorl::compile
