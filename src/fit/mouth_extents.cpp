// SPDX-License-Identifier: Apache-2.0
// The mouth: the last whorl's outline where earlier whorls leave it bare.
#include "fit/extents.h"
#include "fit/whorl_ellipse.h"
#include "growth/outline.h"
#include "math/bracketed_root.h"

#include <algorithm>
#include <limits>
#include <vector>

namespace whorl::fit {
namespace {

using growth::HalfPlanePoint;

// Whorls older than this lie behind younger ones.
constexpr int kTurns = 4;
constexpr int kSamples = 64;

class Mouth {
 public:
  Mouth(const Form& form, double theta_front)
      : form_(form), end_(theta_front), straight_(form.tan_inclination == 0.0), last_(form.law, theta_front),
        depth_(form.law.at(theta_front).depth) {
    for (int turn = 1; turn <= kTurns && end_ - turn * kTwoPi > form.law.theta_start; ++turn)
      earlier_.emplace_back(form.law, end_ - turn * kTwoPi);
    find_corners();
  }

  bool empty() const { return corners_.empty() && !all_bare_; }

  /// How far the mouth reaches along (n_rho, n_z). The earlier whorls are convex, so the farthest place is the outline's own
  /// farthest one, or a corner where the outline goes under an earlier whorl or meets the axis.
  double reach(double n_rho, double n_z) const {
    double best = -std::numeric_limits<double>::infinity();
    const auto along = [&](HalfPlanePoint p) { return n_rho * p.rho + n_z * p.z; };
    for (const HalfPlanePoint& corner : corners_) best = std::max(best, along(corner));
    if (straight_) {
      const HalfPlanePoint p = last_.support_point(n_rho, n_z);
      if (bare(p) >= 0.0) best = std::max(best, along(p));
      return best;
    }
    double top = -std::numeric_limits<double>::infinity(), at = 0.0;
    for (int i = 0; i < kSamples; ++i) {
      if (bare_[static_cast<std::size_t>(i)] < 0.0) continue;
      const double here = along(outline_[static_cast<std::size_t>(i)]);
      if (here > top) {
        top = here;
        at = kTwoPi * i / kSamples;
      }
    }
    if (top == -std::numeric_limits<double>::infinity()) return best;
    const auto value = [&](double psi) {
      const HalfPlanePoint p = front_point(form_, end_, psi).at;
      return bare(p) >= 0.0 ? along(p) : -std::numeric_limits<double>::infinity();
    };
    return std::max({best, top, greatest_value(value, at - kTwoPi / kSamples, at + kTwoPi / kSamples)});
  }
  double width(double n_rho, double n_z) const { return reach(n_rho, n_z) + reach(-n_rho, -n_z); }

 private:
  // Positive where no earlier whorl covers a place and it is on this side of the axis.
  double bare(HalfPlanePoint p) const {
    double least = p.rho / last_.outer();
    if (straight_) {
      for (const WhorlEllipse& ellipse : earlier_) least = std::min(least, ellipse.level(p) - 1.0);
      return least;
    }
    const double theta = end_ + growth::front_lead(form_.tan_inclination, depth_, p);
    for (std::size_t turn = 1; turn <= earlier_.size(); ++turn)
      least = std::min(least, WhorlEllipse(form_.law, theta - kTwoPi * static_cast<double>(turn)).level(p) - 1.0);
    return least;
  }

  void find_corners() {
    bare_.resize(kSamples);
    outline_.resize(kSamples);
    for (int i = 0; i < kSamples; ++i) {
      const HalfPlanePoint p = front_point(form_, end_, kTwoPi * i / kSamples).at;
      outline_[static_cast<std::size_t>(i)] = p;
      bare_[static_cast<std::size_t>(i)] = bare(p);
      all_bare_ = all_bare_ && bare_[static_cast<std::size_t>(i)] > 0.0;
    }
    std::vector<double> on_axis;
    for (std::size_t i = 0; i < kSamples; ++i) {
      const std::size_t next = (i + 1) % kSamples;
      if ((bare_[i] > 0.0) == (bare_[next] > 0.0)) continue;
      const auto value = [&](double psi) { return bare(front_point(form_, end_, psi).at); };
      const double from = kTwoPi * static_cast<double>(i) / kSamples;
      const double psi = bracketed_root(value, from, from + kTwoPi / kSamples, bare_[i], bare_[next]);
      corners_.push_back(front_point(form_, end_, psi).at);
    }
    // Where the section crosses the axis, the mouth ends there: also between earlier whorls and the outline.
    for (std::size_t i = 0; i < kSamples; ++i) {
      const std::size_t next = (i + 1) % kSamples;
      if ((outline_[i].rho > 0.0) == (outline_[next].rho > 0.0)) continue;
      const double f = outline_[i].rho / (outline_[i].rho - outline_[next].rho);
      on_axis.push_back(outline_[i].z + f * (outline_[next].z - outline_[i].z));
    }
    if (on_axis.size() != 2 || !straight_) return;
    const double from = std::min(on_axis[0], on_axis[1]), to = std::max(on_axis[0], on_axis[1]);
    const auto value = [&](double z) {
      double least = 1.0;
      for (const WhorlEllipse& ellipse : earlier_) least = std::min(least, ellipse.level({0.0, z}) - 1.0);
      return least;
    };
    constexpr int kOnAxis = 16;
    double z = from, here = value(from);
    for (int i = 1; i <= kOnAxis; ++i) {
      const double z_next = from + (to - from) * i / kOnAxis, next = value(z_next);
      if ((here > 0.0) != (next > 0.0)) corners_.push_back({0.0, bracketed_root(value, z, z_next, here, next)});
      z = z_next;
      here = next;
    }
  }

  const Form& form_;
  double end_;
  bool straight_, all_bare_ = true;
  WhorlEllipse last_;
  double depth_;
  std::vector<WhorlEllipse> earlier_;
  std::vector<HalfPlanePoint> corners_, outline_;
  std::vector<double> bare_;
};

}  // namespace

std::optional<MouthExtents> mouth_extents(const Form& form, double theta_front, bool with_longest) {
  const Mouth mouth(form, theta_front);
  if (mouth.empty()) return std::nullopt;
  MouthExtents extents{mouth.width(0.0, 1.0), mouth.width(1.0, 0.0), 0.0, 0.0};
  if (!with_longest) return extents;
  constexpr int kDirections = 24;
  const auto length = [&](double angle) { return mouth.width(std::cos(angle), std::sin(angle)); };
  double best = 0.0, at = 0.0;
  for (int i = 0; i < kDirections; ++i) {
    const double angle = kPi * i / kDirections, here = length(angle);
    if (here > best) {
      best = here;
      at = angle;
    }
  }
  // The direction itself, for the width square to it: golden section on a level summit finds it to a part in 1e4 only, so
  // the summit's place comes from the parabola through three lengths.
  const double step = kPi / kDirections;
  double centre = at;
  for (double h = step; h > 1e-3; h *= 0.25) {
    const double a = length(centre - h), b = length(centre), c = length(centre + h), bend = a - 2.0 * b + c;
    if (bend < 0.0) centre += std::clamp(0.5 * h * (a - c) / bend, -h, h);
  }
  extents.longest = std::max(best, length(centre));
  extents.across_longest = mouth.width(-std::sin(centre), std::cos(centre));
  return extents;
}

}  // namespace whorl::fit
