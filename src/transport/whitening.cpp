// SPDX-License-Identifier: Apache-2.0
// From relief to the thickness of the coat.
#include "transport/whitening.h"

#include <algorithm>
#include <cmath>

namespace whorl::transport {
namespace {

/// Of the shell's height: small enough for fine sculpture, large enough to see a suture as a hollow.
constexpr double kReach = 0.012;
/// Thickness of the coat in a plane, in lengths over which it hides e-fold more of its ground, and how fast relief changes it.
constexpr double kPlain = 1.4, kGain = 14.0, kThinnest = 0.2, kThickest = 4.0;

}  // namespace

Whitening::Whitening(const field::Field& field) : field_(field), reach_(kReach * field.scene().height_mm) {
  const scene::Scene& scene = field.scene();
  outline_reach_ = scene.outlines[scene.stations.front().outer].reach.bounds().hi * std::max(1.0, scene.law.S);
}

// What can hold places within the reach of one place.
struct Whitening::Nearby {
  static constexpr int kMost = 64;
  double passage[kMost];
  int count = 0;
  bool chamber = false;
};

Whitening::Nearby Whitening::nearby(const Vec3& p) const noexcept {
  const scene::Scene& scene = field_.scene();
  Nearby near;
  const scene::Chamber& c = scene.chamber;
  const double room = 2.0 * reach_, away = p.z - c.centre_z;
  near.chamber = std::hypot(p.x, p.y) < c.radius + room && std::abs(away) < c.half_height + room;
  double first, last;
  field_.passages(std::atan2(p.y, p.x), first, last);
  for (double theta = first; theta <= last + 1e-9 && near.count < Nearby::kMost; theta += kTwoPi) {
    const growth::Station s = scene.law.at(theta);
    const double apart = std::hypot(std::hypot(p.x, p.y) - s.distance, p.z - s.depth);
    if (apart < scene::kSupport * outline_reach_ * s.half_breadth + room) near.passage[near.count++] = theta;
  }
  return near;
}

// Signed length of what stands behind the surface, positive within it. The other face of the wall is left out, or thin walls would
// count as crests: from outside shell and lumen are one body, from inside it is all that is not lumen. Earlier shell stands in
// later lumens.
double Whitening::body(const Vec3& p, bool from_inside, const Nearby& near) const noexcept {
  using field::Part;
  const scene::Scene& scene = field_.scene();
  double outer_so_far = -reach_, lumen = -reach_;
  const auto add = [&](double outer, double hollow) {
    // Beyond the growth front the lumen's function is positive everywhere; the tube's ends there.
    lumen = std::max(lumen, std::min({hollow, outer, -outer_so_far}));
    outer_so_far = std::max(outer_so_far, outer);
  };
  if (near.chamber) {
    double hollow = field_.value({Part::kChamberHollow, 0.0}, p);
    if (scene.chamber.open) hollow = std::max(hollow, field_.value({Part::kChamberOpening, field_.opening_theta()}, p));
    add(field_.value({Part::kChamber, 0.0}, p), hollow);
  }
  if (scene.pillar.present) add(field_.value({Part::kPillar, 0.0}, p), -reach_);
  for (int i = 0; i < near.count; ++i) {
    double outer, hollow;
    field_.whorl(p, near.passage[i], outer, hollow);
    add(outer, hollow);
  }
  return from_inside ? -lumen : outer_so_far;
}

double Whitening::relief(const Vec3& p, bool from_inside) const noexcept {
  const Nearby near = nearby(p);
  double sum = 0.0;  // over the corners of an octahedron, which weigh all second derivatives alike
  for (int axis = 0; axis < 3; ++axis)
    for (const double side : {-reach_, reach_}) {
      Vec3 corner = p;
      corner[axis] += side;
      sum += std::clamp(body(corner, from_inside, near), -reach_, reach_);
    }
  return -sum / (6.0 * reach_);
}

Vec3f Whitening::albedo(const trace::Hit& hit) const noexcept {
  const Vec3 p(hit.position);
  // What is a crest to the mould is a hollow to the shell's inside. What stands on the shell is coated as a plane is.
  const double stands_out = hit.part == trace::Part::kOrnament ? 0.0
                            : hit.part == trace::Part::kMould  ? -relief(p, true)
                                                               : relief(p, hit.part == trace::Part::kInterior);
  const double thickness = std::clamp(kPlain * std::exp(kGain * stands_out), kThinnest, kThickest);
  const auto bare = static_cast<float>(std::exp(-thickness));
  return Vec3f(kCoat + (kGround - kCoat) * bare);
}

}  // namespace whorl::transport
