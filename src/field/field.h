// SPDX-License-Identifier: Apache-2.0
// The compiled scene as functions of a place: signed lengths, bounds over boxes, and the order of growth.
#pragma once

#include "math/interval.h"
#include "scene/scene.h"

#include <cstdint>

namespace whorl::field {

/// The functions whose signs make the shell. Each is a signed length, positive inside what it names, true to first order
/// near its zero set. The two whorl functions belong to one passage: one turn of the tube past a place.
enum class Part : std::uint8_t {
  kChamber,         // outside of the embryonic shell
  kChamberHollow,   // its lumen
  kChamberOpening,  // where the tube's lumen opens into it
  kPillar,          // columella
  kWhorl,           // outside of the tube at one passage, cut by the growth front
  kWhorlHollow,     // its lumen, flared round the rim
};

/// One function: its part and, for the tube, a growth angle. At a point the passage meant is the one whose growth angle
/// is nearest to it.
struct Term {
  Part part = Part::kWhorl;
  double theta = 0.0;
};

/// What is at a place. Earlier shell wins: the first thing in growth order whose outside holds the place decides.
enum class State : std::uint8_t { kOutside, kLumen, kSolid };

struct Place {
  State state = State::kOutside;
  Term owner;  // meaningful unless kOutside
};

/// Circular blend of two signed lengths: the intersection a > 0 and b > 0 with its edge rounded to `radius`.
inline double rounded_min(double a, double b, double radius) {
  const double u = std::max(radius - a, 0.0), v = std::max(radius - b, 0.0);
  return std::max(radius, std::min(a, b)) - std::sqrt(u * u + v * v);
}

/// Signed length a, drawn out by `amount` towards b > 0 within `radius` of it: a whorl flares where it joins the columella.
/// Smooth (C2), unlike the circular blend, since this runs along the whole pillar.
inline double flared(double a, double b, double radius, double amount) {
  const double near = std::max(0.0, 1.0 + b / radius);
  return a + amount * near * near * near;
}

/// All functions are total, thread-safe and do not throw. The scene must outlive the field. Lengths in mm.
class Field {
 public:
  explicit Field(const scene::Scene& scene);

  const scene::Scene& scene() const { return scene_; }

  double value(const Term& term, const Vec3& p) const noexcept;
  /// Both functions of the passage nearest to `theta`, at the cost of little more than one.
  void whorl(const Vec3& p, double theta, double& outer, double& hollow) const noexcept;
  /// The outside of the tube alone at the passage nearest to `theta`: without the flare towards the columella, and running
  /// on past the lip.
  double tube(const Vec3& p, double theta) const noexcept;
  /// Its lumen, likewise running on past the lip.
  double lumen(const Vec3& p, double theta) const noexcept;
  /// By central differences over a thousandth of the passage's half-breadth. Not normalised.
  Vec3 gradient(const Term& term, const Vec3& p) const noexcept;

  /// Bounds of the function over a box; never too narrow. For a box that holds part of the axis the passages of all
  /// azimuths within half a turn of `term.theta` are meant.
  Interval bounds(const Term& term, const Box3& box) const noexcept;
  /// Bounds of both functions of a passage.
  void whorl_bounds(const Box3& box, double theta, Interval& outer, Interval& hollow) const noexcept;
  /// An upper bound of the gradient's length over a box that keeps clear of the axis.
  double steepness(const Term& term, const Box3& box) const noexcept;

  /// What is at a place, from the functions themselves.
  Place place_at(const Vec3& p) const noexcept;

  /// Growth angles of the first and last passage that can matter at azimuth `phi`: theta = phi + 2 pi j.
  void passages(double phi, double& first, double& last) const noexcept;
  /// The passage at which the chamber opens into the tube: within half a turn of it lies all of the opening.
  double opening_theta() const noexcept;

  /// Growth angle (of the passage nearest to `theta`) and section angle in radians at a point.
  void coordinates(const Vec3& p, double theta, double& growth, double& around) const noexcept;

  /// A place against the plain outside of the tube's passage nearest to a growth angle.
  struct OnTube {
    double growth;     // along growth lines: the growth at which the lip stood there
    double psi;        // section angle
    double elevation;  // above the plain surface, along its normal; mm. True near the surface, and along normals to 1 %
    double across;     // mm across the growth front a radian of growth
    double rho;        // distance from the axis, mm
    double scale;      // size of the whorl there / at the lip
  };
  OnTube on_tube(const Vec3& p, double theta) const noexcept;

 private:
  struct InSection;  // a point in the coordinates of one passage
  InSection in_section(const Vec3& p, double theta) const noexcept;
  // Signed length inside a chain's surface, and the length that one unit of section coordinates spans at this section angle.
  double chain(const InSection& at, const Vec3& p, bool hollow, double& unit) const noexcept;
  bool out_of_reach(double theta, const Vec3& p) const noexcept;
  double relief(const InSection& at, double plain, double unit) const noexcept;
  Interval relief_bounds(const Box3& box, const Interval& theta, const Interval& rho, double psi_from, double psi_span,
                         const Interval& half_breadth, const Interval& plain, const Interval& unit) const noexcept;
  double front(const InSection& at) const noexcept;
  double opening_penalty(double theta) const noexcept;
  void piece_bounds(const Box3& box, Interval rho, Interval theta, Interval& outer, Interval& hollow) const noexcept;
  double pillar(const Vec3& p) const noexcept;

  const scene::Scene& scene_;
  double start_half_breadth_;
  double greatest_reach_ = 0.0;  // of any outer outline
};

}  // namespace whorl::field
