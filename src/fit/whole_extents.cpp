// SPDX-License-Identifier: Apache-2.0
// Height and width of the whole shell: supports of spirals, with the growth front as their end.
#include "fit/extents.h"
#include "fit/whorl_ellipse.h"
#include "growth/extents.h"
#include "growth/outline.h"
#include "math/bracketed_root.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>

namespace whorl::fit {

using growth::HalfPlanePoint;

FrontPoint front_point(const Form& form, double theta_front, double psi) {
  if (form.tan_inclination == 0.0) return {theta_front, WhorlEllipse(form.law, theta_front).point(psi)};
  const double depth = form.law.at(theta_front).depth;
  double theta = theta_front;
  HalfPlanePoint p{};
  constexpr int kRounds = 30;  // each gains a digit or two
  for (int round = 0; round < kRounds; ++round) {
    p = WhorlEllipse(form.law, theta).point(psi);
    const double next = theta_front + growth::front_lead(form.tan_inclination, depth, p);
    if (std::abs(next - theta) < 1e-13) break;
    theta = next;
  }
  return {theta, p};
}

namespace {

// Greatest value of f(front point) over the front.
template <class F>
double greatest_on_front(const Form& form, double theta_front, const F& f) {
  constexpr int kSamples = 32;
  const auto value = [&](double psi) { return f(front_point(form, theta_front, psi).at); };
  double best = -std::numeric_limits<double>::infinity(), at = 0.0;
  for (int i = 0; i < kSamples; ++i) {
    const double psi = kTwoPi * i / kSamples, here = value(psi);
    if (here > best) {
      best = here;
      at = psi;
    }
  }
  return greatest_value(value, at - kTwoPi / kSamples, at + kTwoPi / kSamples);
}

class Outside {
 public:
  Outside(const Form& form, double theta_front) : form_(form), end_(theta_front), last_(form.law, theta_front) {
    if (form.tan_inclination != 0.0)
      for (int i = 0; i < kSamples; ++i) front_[static_cast<std::size_t>(i)] = front_point(form, end_, kTwoPi * i / kSamples);
    outermost_ = form.tan_inclination == 0.0
                     ? end_
                     : front_point(form, end_, last_.angle_of(last_.support_point(1.0, 0.0))).theta;
    chamber_radius_ = growth::embryonic_chamber(form.law).radius;
  }

  /// How far the shell reaches from the axis in the direction of an azimuth.
  double reach(double azimuth) const {
    double best = std::max(chamber_radius_, on_front(azimuth));
    const growth::CoilingLaw& law = form_.law;
    // Where the outer margin stands farthest out: rho(theta) cos(theta - azimuth) is level at tan(theta - azimuth) = rho'/rho.
    const double turns = std::floor((outermost_ - azimuth) / kTwoPi + 0.5);
    for (double turn = turns; turn >= turns - 1.0; turn -= 1.0) {
      double theta = azimuth + kTwoPi * turn;
      for (int round = 0; round < (law.one_expansion && law.by_section.is_constant() ? 1 : 4); ++round) {
        const growth::Station s = law.at(theta);
        const double margin = WhorlEllipse(law, theta).outer() - s.distance;
        const double slope = s.distance * law.by_distance.rate(theta) + margin * law.by_section.rate(theta);
        theta = azimuth + kTwoPi * turn + std::atan2(slope, s.distance + margin);
      }
      if (theta > outermost_ || theta < law.theta_start) continue;
      best = std::max(best, WhorlEllipse(law, theta).outer() * std::cos(theta - azimuth));
      break;
    }
    return best;
  }

 private:
  static constexpr int kSamples = 96;

  double on_front(double azimuth) const {
    if (form_.tan_inclination == 0.0) return last_.outer() * std::cos(end_ - azimuth);
    const auto along = [&](std::size_t i) {
      const FrontPoint& p = front_[i % kSamples];
      return std::max(p.at.rho, 0.0) * std::cos(p.theta - azimuth);
    };
    std::size_t best = 0;
    for (std::size_t i = 1; i < kSamples; ++i)
      if (along(i) > along(best)) best = i;
    // Summit of the parabola through the best sample and its neighbours: right to 1e-6 at this spacing.
    const double a = along(best + kSamples - 1), b = along(best), c = along(best + 1), bend = a - 2.0 * b + c;
    return bend < 0.0 ? b - (c - a) * (c - a) / (8.0 * bend) : b;
  }

  const Form& form_;
  double end_, outermost_, chamber_radius_;
  WhorlEllipse last_;
  std::array<FrontPoint, kSamples> front_;
};

}  // namespace

double base_depth(const Form& form, double theta_front) {
  if (form.tan_inclination == 0.0) return WhorlEllipse(form.law, theta_front).bottom();
  return greatest_on_front(form, theta_front, [](HalfPlanePoint p) { return p.z; });
}

double apex_depth(const Form& form, double theta_front) {
  const growth::ChamberShape chamber = growth::embryonic_chamber(form.law);
  const WhorlEllipse first(form.law, form.law.theta_start), last(form.law, theta_front);
  double top = std::min({chamber.centre_z - chamber.half_height, first.top(), last.top()});
  if (!form.law.one_expansion) {
    // Depth and section grow at different rates: the top may lie between the ends.
    constexpr int kAWhorl = 12;
    const int steps = std::max(2, static_cast<int>((theta_front - form.law.theta_start) / kTwoPi * kAWhorl));
    for (int i = 1; i < steps; ++i) {
      const double theta = form.law.theta_start + (theta_front - form.law.theta_start) * i / steps;
      top = std::min(top, WhorlEllipse(form.law, theta).top());
    }
  }
  if (form.tan_inclination != 0.0 && last.top() <= top)
    top = std::min(top, -greatest_on_front(form, theta_front, [](HalfPlanePoint p) { return -p.z; }));
  return top;
}

double shell_height(const Form& form, double theta_front) {
  return base_depth(form, theta_front) - apex_depth(form, theta_front);
}

double shell_width(const Form& form, double theta_front) {
  constexpr int kDirections = 12;
  const Outside outside(form, theta_front);
  const auto width = [&](double azimuth) { return outside.reach(azimuth) + outside.reach(azimuth + kPi); };
  double best = 0.0, at = theta_front;
  for (int i = 0; i < kDirections; ++i) {
    const double azimuth = theta_front - kPi * i / kDirections, here = width(azimuth);
    if (here > best) {
      best = here;
      at = azimuth;
    }
  }
  return std::max(best, greatest_value(width, at - kPi / kDirections, at + kPi / kDirections));
}

}  // namespace whorl::fit
