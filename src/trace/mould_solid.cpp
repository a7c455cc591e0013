// SPDX-License-Identifier: Apache-2.0
// Rays against the lumen as if it were the solid.
#include "trace/mould_solid.h"

#include <vector>

namespace whorl::trace {

using field::State;

bool MouldSolid::entry(const Ray& ray, Crossing& found) const {
  const Vec3 start = Vec3(ray.origin) + static_cast<double>(ray.t_min) * Vec3(ray.direction);
  const State state = shell_.field().place_at(start).state;
  if (state == State::kLumen) {
    found = {ray.t_min, State::kLumen, State::kLumen, field::Part::kWhorlHollow, shell_.field().scene().law.theta_lip};
    return true;
  }
  thread_local std::vector<Crossing> crossings;
  shell_.crossings(ray, state, crossings);
  for (const Crossing& crossing : crossings)
    if (crossing.after == State::kLumen && crossing.t >= ray.t_min && crossing.t <= ray.t_max) {
      found = crossing;
      return true;
    }
  return false;
}

bool MouldSolid::closest(const Ray& ray, Hit& hit) const noexcept {
  Ray rest = ray;
  const bool shell_met = rest_ && rest_->closest(ray, hit);
  if (shell_met) rest.t_max = hit.t;
  Crossing met;
  if (!entry(rest, met)) return shell_met;
  const field::Field& field = shell_.field();
  hit = {};
  hit.t = met.t;
  hit.position = ray.origin + met.t * ray.direction;
  hit.part = Part::kMould;
  const bool tube = met.part == field::Part::kWhorl || met.part == field::Part::kWhorlHollow;
  hit.passage = tube ? met.theta : field.scene().law.theta_start;
  // The function that changes sign there has its gradient across the mould's surface; out of the mould is towards the eye.
  Vec3 normal = met.before == State::kLumen ? Vec3(0.0) : field.gradient({met.part, met.theta}, Vec3(hit.position));
  const double length = normal.length(), facing = normal.dot(Vec3(ray.direction));
  normal = length > 0.0 ? normal * ((facing > 0.0 ? -1.0 : 1.0) / length) : -Vec3(ray.direction);
  hit.normal = Vec3f(normal);
  hit.safe_offset = static_cast<float>(3.0 * shell_.cells().tolerance_mm + 1e-6 * field.scene().height_mm);
  return true;
}

bool MouldSolid::occluded(const Ray& ray) const noexcept {
  Crossing met;
  return (rest_ && rest_->occluded(ray)) || entry(ray, met);
}

}  // namespace whorl::trace
