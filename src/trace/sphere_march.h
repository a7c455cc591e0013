// SPDX-License-Identifier: Apache-2.0
// Along a ray through a solid that is known by its signed distance.
#pragma once

namespace whorl::trace {

/// The next place in [t0, t1] at which the sign of `value(t)` is other than `positive` (t0 itself, if it is so there). `clear(v)` is a
/// length without a change of sign round a place of value v; solids thinner than `resolution` may be passed over.
template <class Value, class Clear>
bool next_change(const Value& value, const Clear& clear, double t0, double t1, double resolution, bool positive, double& at) {
  double t = t0, v = value(t);
  if ((v > 0.0) != positive) {
    at = t0;
    return true;
  }
  while (t < t1) {
    const double step = clear(v) > resolution ? clear(v) : resolution;
    const double next = t + step < t1 ? t + step : t1;
    const double w = value(next);
    if ((w > 0.0) == positive) {
      t = next;
      v = w;
      continue;
    }
    double a = t, b = next;  // the sign changes between them
    for (int i = 0; i < 60 && b - a > 1e-3 * resolution; ++i) {
      const double middle = 0.5 * (a + b);
      ((value(middle) > 0.0) == positive ? a : b) = middle;
    }
    at = b;
    return true;
  }
  return false;
}

}  // namespace whorl::trace
