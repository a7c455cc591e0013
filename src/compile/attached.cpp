// SPDX-License-Identifier: Apache-2.0
// Rows of places, and what is put on them.
#include "compile/attached.h"

#include "growth/irregularity.h"
#include "growth/surface_frame.h"
#include "math/parallel.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::compile {
namespace {

using growth::SurfaceFrame;
using specimen::Stated;

constexpr double kSunk = 0.6;             // share of the wall into which feet reach: no gap before it, no way into the lumen
constexpr double kPieceSpan = kTwoPi / 24.0, kOverlap = 0.02;  // of ledges
constexpr double kConeTip = 0.06, kTubeBore = 0.75;            // of attached cones and tubes, in diameters

// One element to be: where, and how large against its fellows.
struct Spot {
  double growth, psi, scale;
};

// How large an element is against one at the lip.
double size_of(const SurfaceFrame& f, const Spot& spot, double power) { return spot.scale * std::pow(f.scale, power); }

struct Row {
  double first, last;  // growth
};
Row row_of(const scene::Scene& scene, const Stated<double>& onset, const Stated<double>& end) {
  return {std::max(scene.law.theta_start, kTwoPi * onset), std::min(scene.law.theta_lip, kTwoPi * end)};
}

double count_of(const scene::Scene& scene, const specimen::Recurrence& s, double rows) {
  const Row row = row_of(scene, s.onset, s.end);
  return rows * std::max(0.0, row.last - row.first) / kTwoPi * s.per_whorl;
}

// `shift` in spacings. Numbers count from the one behind the lip, so that a longer shell keeps its deviations.
void add_spots(const scene::Scene& scene, const specimen::Recurrence& s, double psi, double shift, std::uint64_t seed, std::vector<Spot>& out) {
  const Row row = row_of(scene, s.onset, s.end);
  const double spacing = kTwoPi / s.per_whorl;
  const double crest = scene.law.theta_lip - kTwoPi * s.behind_lip + shift * spacing;
  const double first = std::floor((row.first - crest) / spacing) - 1.0, last = std::ceil((row.last - crest) / spacing) + 1.0;
  for (double number = first; number <= last; number += 1.0) {
    const growth::Deviation d = growth::deviation(seed, static_cast<std::int64_t>(number), s.irregularity);
    const double growth = crest + (number + d.shift) * spacing;
    // Rounding must not lose the one at the lip.
    if (growth >= row.first && growth <= row.last + 1e-9 * spacing) out.push_back({growth, psi, d.scale});
  }
}

std::vector<Spot> spots(const scene::Scene& scene, const specimen::Recurrence& s, const Stated<double>& at_deg) {
  std::vector<Spot> result;
  add_spots(scene, s, radians(at_deg), 0.0, static_cast<std::uint64_t>(s.seed.value), result);
  return result;
}

std::vector<Spot> grid(const scene::Scene& scene, const specimen::Attached& a) {
  std::vector<Spot> result;
  const int rows = a.rows;
  // Rows all the way round share the round evenly; else the outer ones stand at the ends of the breadth.
  const bool round = a.width_deg >= 360.0;
  const double step = rows > 1 ? a.width_deg / (round ? rows : rows - 1) : 0.0;
  for (int i = 0; i < rows; ++i) {
    const double at = a.at_deg + (i - 0.5 * (rows - 1)) * step;
    const std::uint64_t seed = hash_with(static_cast<std::uint64_t>(a.series.seed.value), static_cast<std::uint64_t>(i));
    add_spots(scene, a.series, radians(at), i % 2 == 1 ? a.stagger.value : 0.0, seed, result);
  }
  return result;
}

double sunk_at(const scene::Scene& scene, const SurfaceFrame& f) {
  return kSunk * scene.wall.thickness(scene.law, f.theta, {std::hypot(f.point.x, f.point.y), f.point.z});
}

bool past_rim(const scene::Scene& scene, double growth, const SurfaceFrame& f, double radius) {
  return (scene.law.theta_lip - growth) * std::hypot(f.point.x, f.point.y) * scene.front.cos_inclination < radius;
}

Vec3 leaned(const SurfaceFrame& f, double lean) { return std::cos(lean) * f.normal + std::sin(lean) * f.forward; }

scene::Bead bead(const scene::Scene& scene, const SurfaceFrame& f, double height, double breadth, double lean, std::uint32_t series) {
  scene::Bead b;
  const Vec3 up = leaned(f, lean), forward = f.across.cross(up).normalized();
  b.centre = Vec3f(f.point);
  b.rows[0] = Vec3f(forward * (2.0 / breadth));
  b.rows[1] = Vec3f(f.across * (2.0 / breadth));
  b.rows[2] = Vec3f(up / height);
  b.below = static_cast<float>(height / std::min(sunk_at(scene, f), 0.5 * breadth));
  b.passage = static_cast<float>(f.theta);
  b.series = series;
  return b;
}

struct HornForm {
  double length, breadth, tip, bend, lean, bore, half_opening, growth;  // bore in diameters
};

scene::Horn horn(const scene::Scene& scene, const SurfaceFrame& f, const HornForm& form, double scale, std::uint32_t series) {
  scene::Horn h;
  h.base = f.point;
  h.up = f.normal;
  h.axis = leaned(f, form.lean);
  h.front = (f.forward - h.axis * h.axis.dot(f.forward)).normalized();
  h.bend = form.bend;
  h.foot_radius = 0.5 * scale * form.breadth;
  h.tip_radius = form.tip * h.foot_radius;
  // A solid horn ends in a ball of the tip's radius, which counts.
  h.length = scale * form.length - (form.bore > 0.0 ? 0.0 : h.tip_radius);
  h.bore = form.bore;
  h.half_opening = form.bore > 0.0 ? form.half_opening : 0.0;
  h.sunk = sunk_at(scene, f);
  h.passage = static_cast<float>(f.theta);
  h.series = series;
  return h;
}

// Whether the foot stays in the wall all round although the whorl curves away under it.
bool foot_holds(const growth::Exterior& shell, const scene::Horn& h) {
  const Vec3 side = h.axis.cross(h.front);
  constexpr int kRound = 16;
  for (int i = 0; i < kRound; ++i) {
    const double a = kTwoPi * i / kRound;
    const Vec3 off = h.foot_radius * (std::cos(a) * h.front + std::sin(a) * side);
    const Vec3 p = h.base + off - (h.sunk + h.up.dot(off)) / h.up.dot(h.axis) * h.axis;  // on the cut
    const double theta = static_cast<double>(h.passage) +
                         std::remainder(std::atan2(p.y, p.x) - static_cast<double>(h.passage), kTwoPi);
    const growth::SectionPoint q = shell.law.to_section(shell.law.at(theta), {std::hypot(p.x, p.y), p.z});
    if (std::hypot(q.x, q.y) > shell.reach.value(std::atan2(q.y, q.x))) return false;
  }
  return true;
}

class Builder {
 public:
  Builder(scene::Scene& scene, const growth::Exterior& shell, Faults& faults) : scene_(scene), shell_(shell), faults_(faults) {}

  void add(const specimen::Stripe& s) {
    const std::uint32_t series = new_series(s.colour.value);
    const Row row = row_of(scene_, s.onset, s.end);
    const int pieces = std::max(1, static_cast<int>(std::ceil((row.last - row.first) / kPieceSpan)));
    for (int i = 0; i < pieces && row.last > row.first; ++i) {
      const double step = (row.last - row.first) / pieces, from = row.first + i * step;
      scene::Ledge l;
      l.run = scene::Ledge::Run::kAlongGrowth;
      l.psi = radians(s.at_deg);
      l.reach = radians(0.5 * s.width_deg);
      l.growth = from + 0.5 * step;
      l.from = from - (i > 0 ? kOverlap * step : 0.0);
      l.to = from + step + (i + 1 < pieces ? kOverlap * step : 0.0);
      const SurfaceFrame f = growth::surface_frame(shell_, l.growth, l.psi);
      l.height = std::pow(f.scale, s.growth) * s.height_mm;
      l.power = s.growth;
      l.sunk = sunk_at(scene_, f);
      l.series = series;
      scene_.attached.ledges.push_back(l);
    }
  }

  void add(const specimen::Lamella& s) {
    const std::uint32_t series = new_series(colour_of(s.colour));
    const double reach = s.width_deg >= 360.0 ? kPi : radians(0.5 * s.width_deg);
    const int pieces = static_cast<int>(std::ceil(2.0 * reach / kPieceSpan));
    for (const Spot& spot : spots(scene_, s.series, s.at_deg)) {
      for (int i = 0; i < pieces; ++i) {
        const double step = 2.0 * reach / pieces, from = spot.psi - reach + i * step;
        scene::Ledge l;
        l.growth = spot.growth;
        l.psi = spot.psi;
        l.reach = s.width_deg >= 360.0 ? 0.0 : reach;
        l.from = from - kOverlap * step;
        l.to = from + (1.0 + kOverlap) * step;
        const SurfaceFrame f = growth::surface_frame(shell_, spot.growth, from + 0.5 * step);
        if (past_rim(scene_, spot.growth, f, 0.0)) continue;
        l.height = size_of(f, spot, s.series.growth) * s.height_mm;
        l.half_thickness = 0.5 * std::pow(f.scale, s.series.growth) * s.thickness_mm;
        l.tan_lean = std::tan(radians(s.lean_deg));
        l.sunk = sunk_at(scene_, f);
        l.series = series;
        scene_.attached.ledges.push_back(l);
      }
    }
  }

  void add(const specimen::Spine& s) {
    add_horns("spine", s.breadth_mm, spots(scene_, s.series, s.at_deg),
              {s.length_mm, s.breadth_mm, s.tip, radians(s.bend_deg), radians(s.lean_deg), s.hollow, radians(0.5 * s.open_deg), s.series.growth},
              new_series(colour_of(s.colour)));
  }

  void add(const specimen::Attached& s) {
    const std::uint32_t series = new_series(s.colour.value);
    const std::vector<Spot> places = grid(scene_, s);
    const double lean = radians(s.lean_deg);
    if (s.shape.value != specimen::AttachedShape::kBead) {
      const bool tube = s.shape.value == specimen::AttachedShape::kTube;
      add_horns("attached", s.breadth_mm, places,
                {s.height_mm, s.breadth_mm, tube ? 1.0 : kConeTip, 0.0, lean, tube ? kTubeBore : 0.0, 0.0, s.series.growth}, series);
      return;
    }
    std::vector<scene::Bead>& beads = scene_.attached.beads;
    std::vector<scene::Bead> made(places.size());
    std::vector<char> kept(places.size());
    parallel_for(places.size(), 1024, [&](std::size_t i) {
      const SurfaceFrame f = growth::surface_frame(shell_, places[i].growth, places[i].psi);
      const double scale = size_of(f, places[i], s.series.growth);
      kept[i] = !past_rim(scene_, places[i].growth, f, 0.5 * scale * s.breadth_mm);
      made[i] = bead(scene_, f, scale * s.height_mm, scale * s.breadth_mm, lean, series);
    });
    beads.reserve(beads.size() + places.size());
    for (std::size_t i = 0; i < made.size(); ++i)
      if (kept[i]) beads.push_back(made[i]);
  }

 private:
  static std::optional<specimen::Colour> colour_of(const std::optional<Stated<specimen::Colour>>& stated) {
    return stated ? std::optional(stated->value) : std::nullopt;
  }

  std::uint32_t new_series(std::optional<specimen::Colour> colour) {
    scene_.attached.series.push_back({colour});
    return static_cast<std::uint32_t>(scene_.attached.series.size() - 1);
  }

  void add_horns(const char* table, const Stated<double>& breadth, const std::vector<Spot>& places, const HornForm& form,
                 std::uint32_t series) {
    bool holds = true;
    for (const Spot& spot : places) {
      const SurfaceFrame f = growth::surface_frame(shell_, spot.growth, spot.psi);
      const double scale = size_of(f, spot, form.growth);
      if (past_rim(scene_, spot.growth, f, 0.5 * scale * form.breadth)) continue;
      scene_.attached.horns.push_back(horn(scene_, f, form, scale, series));
      holds = holds && foot_holds(shell_, scene_.attached.horns.back());
    }
    if (!holds)
      faults_.add(breadth.where, fmt::format("[[{}]] breadth = {:g} mm: the whorl curves away under so broad a foot, which would hang "
                                             "over; make the foot narrower, lean it less, begin it later or give a thicker wall",
                                             table, breadth.value));
  }

  scene::Scene& scene_;
  const growth::Exterior& shell_;
  Faults& faults_;
};

}  // namespace

void build_attached(scene::Scene& scene, const specimen::Specimen& specimen, const growth::Exterior& shell, Faults& faults) {
  const specimen::Attachments& stated = specimen.attachments;
  double count = 0.0;
  for (const specimen::Attached& a : stated.attached) {
    count += count_of(scene, a.series, a.rows.value);
    if (count <= kMostAttached) continue;
    faults.add(a.series.per_whorl.where,
               fmt::format("[[attached]] per_whorl = {:g} in {} rows: {:.3g} elements in all; at most {:.0f} are allowed",
                           a.series.per_whorl.value, a.rows.value, count, kMostAttached));
    return;
  }
  Builder builder(scene, shell, faults);
  for (const specimen::Stripe& s : stated.stripes) builder.add(s);
  for (const specimen::Lamella& s : stated.lamellae) builder.add(s);
  for (const specimen::Spine& s : stated.spines) builder.add(s);
  for (const specimen::Attached& s : stated.attached) builder.add(s);
}

}  // namespace whorl::compile
