// SPDX-License-Identifier: Apache-2.0
// Distances by the level of projected ellipses.
#include "fit/outline_distance.h"

#include "fit/extents.h"
#include "fit/predict.h"
#include "fit/suture_distance.h"
#include "fit/whorl_ellipse.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <limits>

namespace whorl::fit {
namespace {

using specimen::TracedOutline;

// One section as it shows in a picture whose plane its half-plane stands `turned` away from.
struct Disk {
  growth::Station station;
  double narrowed;
};

Disk disk_at(const growth::CoilingLaw& law, double theta, double turned) {
  return {law.at(theta), std::max(std::cos(turned), 1e-3)};
}

double distance_from(const growth::CoilingLaw& law, const Disk& disk, double x, double z) {
  const double a = disk.station.half_breadth, b = law.S * a;
  const double u = x / disk.narrowed - disk.station.distance, v = disk.station.depth - z;
  const double X = (u * law.roll_cos - v * law.roll_sin) / a, Y = (u * law.roll_sin + v * law.roll_cos) / b;
  const double level = std::sqrt(X * X + Y * Y);
  if (level < 1e-6) return -std::min(a, b);
  const double by_x = (X * law.roll_cos / a + Y * law.roll_sin / b) / disk.narrowed;
  const double by_z = X * law.roll_sin / a - Y * law.roll_cos / b;
  return (level - 1.0) * level / std::sqrt(by_x * by_x + by_z * by_z);
}

class Silhouette {
 public:
  // `right`: the azimuth that lies to the right in the picture.
  Silhouette(const Form& form, double right) : law_(form.law) {
    for (const double side : {1.0, -1.0}) {
      const double azimuth = side > 0.0 ? right : right + kPi;
      for (double turn = std::floor((law_.theta_lip + 0.5 * kPi - azimuth) / kTwoPi);; turn -= 1.0) {
        const double theta = azimuth + kTwoPi * turn;
        const double from = std::max(-kWidest, law_.theta_start - theta), to = std::min(kWidest, law_.theta_lip - theta);
        if (theta + kWidest < law_.theta_start) break;
        if (from > to) continue;
        Passage passage{side, theta, from, (to - from) / kSteps, 1e300, -1e300, {}};
        for (int i = 0; i <= kSteps; ++i) {
          const double turned = from + passage.step * i;
          const Disk disk = disk_at(law_, theta + turned, turned);
          const double reach = std::max(1.0, law_.S) * disk.station.half_breadth;
          passage.top = std::min(passage.top, disk.station.depth - reach);
          passage.bottom = std::max(passage.bottom, disk.station.depth + reach);
          passage.disks[static_cast<std::size_t>(i)] = disk;
        }
        passages_.push_back(passage);
      }
    }
  }

  double distance(double x, double z) const {
    double least = std::numeric_limits<double>::infinity();
    const double near_axis = 0.1 * (law_.distance + law_.half_breadth);
    for (const Passage& passage : passages_) {
      const double along = passage.side * x;
      // No nearer than it lies above or below.
      if (along < -near_axis || std::max(passage.top - z, z - passage.bottom) > least) continue;
      least = std::min(least, nearest(passage, along, z));
    }
    return least;
  }

 private:
  static constexpr double kWidest = radians(89.9);  // a section seen from its edge still ends the shell
  static constexpr int kSteps = 12;
  // The sections within a quarter turn of one flank of the picture.
  struct Passage {
    double side, theta, from, step;
    double top, bottom;
    std::array<Disk, kSteps + 1> disks;
  };

  // The least distance over the sections of a passage: the best of the steps, then the summit of the parabola through three.
  double nearest(const Passage& passage, double x, double z) const {
    double values[kSteps + 1];
    int best = 0;
    for (int i = 0; i <= kSteps; ++i) {
      values[i] = distance_from(law_, passage.disks[static_cast<std::size_t>(i)], x, z);
      if (values[i] < values[best]) best = i;
    }
    if (best == 0 || best == kSteps || passage.step == 0.0) return values[best];
    const double bend = values[best - 1] - 2.0 * values[best] + values[best + 1];
    const double shift = bend > 0.0 ? std::clamp(0.5 * (values[best - 1] - values[best + 1]) / bend, -1.0, 1.0) : 0.0;
    const double turned = passage.from + passage.step * (best + shift);
    return std::min(values[best], distance_from(law_, disk_at(law_, passage.theta + turned, turned), x, z));
  }

  const growth::CoilingLaw& law_;
  std::vector<Passage> passages_;
};

struct Box {
  double left = 1e300, right = -1e300, low = 1e300, high = -1e300;  // y towards the apex
};

Box box_of(const TracedOutline& outline) {
  Box box;
  for (const TracedOutline::Point& p : outline.points) {
    box.left = std::min(box.left, p.x);
    box.right = std::max(box.right, p.x);
    box.low = std::min(box.low, p.y);
    box.high = std::max(box.high, p.y);
  }
  return box;
}

Box around(Box box, const SutureLines::Chord& chord) {
  return {std::min({box.left, chord.x0, chord.x1}), std::max({box.right, chord.x0, chord.x1}), std::min({box.low, -chord.z0, -chord.z1}),
          std::max({box.high, -chord.z0, -chord.z1})};
}

double right_azimuth(const Form& form, const TracedOutline& outline, bool sinistral) {
  const double walked = radians(outline.azimuth_deg);
  return form.law.theta_lip - (sinistral ? -walked : walked);
}

Box box_of(const Form& form, const TracedOutline& outline, bool sinistral) {
  if (outline.kind == TracedOutline::Kind::kSection) {
    const WhorlEllipse section(form.law, theta_of(form, outline.stage));
    return {section.inner(), section.outer(), -section.bottom(), -section.top()};
  }
  const double right = right_azimuth(form, outline, sinistral), end = form.law.theta_lip;
  if (outline.kind == TracedOutline::Kind::kSuture) {
    Box box;
    const SutureLines sutures(form, right);
    for (const SutureLines::Chord& chord : sutures.chords()) box = around(box, chord);
    return box;
  }
  const auto reach = [&](double azimuth) {
    double best = 0.0;
    constexpr int kSteps = 48;
    for (int i = 0; i < kSteps; ++i) {
      const double theta = end - kTwoPi * i / kSteps;
      if (theta >= form.law.theta_start) best = std::max(best, WhorlEllipse(form.law, theta).outer() * std::cos(theta - azimuth));
    }
    return best;
  };
  return {-reach(right + kPi), reach(right), -base_depth(form, end), -apex_depth(form, end)};
}

}  // namespace

void outline_distances(const Form& form, const TracedOutline& outline, const Placement& placement, bool sinistral,
                       std::vector<double>& distances) {
  distances.clear();
  const double c = std::cos(placement.tilt), s = std::sin(placement.tilt), mirror = sinistral ? -1.0 : 1.0;
  const double right = right_azimuth(form, outline, sinistral);
  if (outline.kind == TracedOutline::Kind::kSuture) {
    const SutureLines sutures(form, right);
    for (const TracedOutline::Point& p : outline.points) {
      const double u = p.x - placement.x, v = p.y - placement.y;
      distances.push_back(sutures.distance(mirror * (u * c + v * s), u * s - v * c));
    }
    return;
  }
  const Silhouette silhouette(form, right);
  const Disk section = disk_at(form.law, theta_of(form, outline.stage), 0.0);
  for (const TracedOutline::Point& p : outline.points) {
    const double u = p.x - placement.x, v = p.y - placement.y;
    const double x = u * c + v * s, y = v * c - u * s;
    distances.push_back(outline.kind == TracedOutline::Kind::kSection ? distance_from(form.law, section, x, -y)
                                                                      : silhouette.distance(mirror * x, -y));
  }
}

Placement boxed_placement(const Form& form, const TracedOutline& outline, bool sinistral) {
  Box model = box_of(form, outline, sinistral);
  const Box points = box_of(outline);
  if (sinistral && outline.kind != TracedOutline::Kind::kSection) model = {-model.right, -model.left, model.low, model.high};
  return {0.5 * (points.left + points.right - model.left - model.right), 0.5 * (points.low + points.high - model.low - model.high), 0.0};
}

double boxed_scale(const Form& form, const TracedOutline& outline) {
  const Box model = box_of(form, outline, false), points = box_of(outline);
  return std::sqrt((points.right - points.left) * (points.high - points.low) / ((model.right - model.left) * (model.high - model.low)));
}

}  // namespace whorl::fit
