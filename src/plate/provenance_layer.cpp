// SPDX-License-Identifier: Apache-2.0
// From pixels back to places on the shell, and whose places they are.
#include "plate/provenance_layer.h"

#include "field/growth_line.h"
#include "math/parallel.h"
#include "trace/surfaces.h"

namespace whorl::plate {
namespace {

using specimen::Provenance;
using specimen::ShellPart;

/// Places are looked for this far below the surface, of the shell's height: clear of the rounding of a stored depth.
constexpr double kBelow[] = {2e-5, 2e-4, 2e-3};

ShellPart side_of(trace::Part part) {
  switch (part) {
    case trace::Part::kInterior:
    case trace::Part::kMould: return ShellPart::kInside;
    case trace::Part::kCutFace: return ShellPart::kWall;
    default: return ShellPart::kOutside;
  }
}

Provenance provenance_at(const specimen::Preservation& preservation, const field::Field& field, const transport::Camera& camera, int x, int y,
                         const transport::PixelFacts& facts) {
  const auto part = static_cast<trace::Part>(facts.part);
  if (part == trace::Part::kNothing || part == trace::Part::kLamp) return Provenance::kNone;
  const trace::Ray ray = camera.ray(x + 0.5, y + 0.5);
  const Vec3 p = Vec3(ray.origin) + static_cast<double>(facts.depth_mm) * Vec3(ray.direction);
  const Vec3 outwards = camera.page.to_world(Vec3(facts.normal));
  for (const double below : kBelow) {
    const field::Place place = field.place_at(p - below * field.scene().height_mm * outwards);
    if (place.state == field::State::kOutside) continue;
    switch (place.owner.part) {
      case field::Part::kPillar: return preservation.of(ShellPart::kColumella, field::whorl_at_depth(field.scene(), p.z));
      case field::Part::kWhorl:
      case field::Part::kWhorlHollow: return preservation.of(side_of(part), field::whorl_at(field, p, place.owner.theta));
      default: return preservation.of(ShellPart::kEmbryonic, 0.0);
    }
  }
  return preservation.of(side_of(part), static_cast<double>(facts.turn));
}

}  // namespace

void add_provenance(const specimen::Preservation& preservation, const field::Field& field, const transport::Camera& camera,
                    transport::Film& film) {
  parallel_for(static_cast<std::size_t>(film.height), 4, [&](std::size_t row) {
    const int y = static_cast<int>(row);
    for (int x = 0; x < film.width; ++x) {
      transport::PixelFacts& facts = film.facts[film.index(x, y)];
      facts.provenance = static_cast<std::uint8_t>(provenance_at(preservation, field, camera, x, y, facts));
    }
  });
}

}  // namespace whorl::plate
