// SPDX-License-Identifier: Apache-2.0
// Cubic polynomials over a cell: least-squares fit at Chebyshev points, evaluation at four points at once.
#pragma once

#include <array>
#include <cmath>

namespace whorl::trace {

/// Four floats that the compiler keeps in one vector register on every target.
using Float4 = float __attribute__((vector_size(16)));

inline Float4 splat(float v) { return Float4{v, v, v, v}; }

inline constexpr int kCubicTerms = 20;  // monomials of degree up to three in x, y, z

/// Coefficients in the nested order in which `evaluate` uses them; coordinates are local, -1 .. 1 over the cell.
using Cubic = std::array<float, kCubicTerms>;

/// T is float or Float4.
template <class T>
inline T evaluate(const Cubic& c, T x, T y, T z) {
  const T x0 = c[0] + x * (c[1] + x * (c[2] + x * c[3]));
  const T y1 = c[4] + x * (c[5] + x * c[6]);
  const T y2 = c[7] + x * c[8] + y * c[9];
  const T z1 = c[10] + x * (c[11] + x * c[12]) + y * (c[13] + x * c[14] + y * c[15]);
  const T z2 = c[16] + x * c[17] + y * c[18] + z * c[19];
  return x0 + y * (y1 + y * y2) + z * (z1 + z * z2);
}

/// Gradient by the local coordinates.
inline void gradient(const Cubic& c, float x, float y, float z, float g[3]) {
  g[0] = c[1] + x * (2.0f * c[2] + 3.0f * x * c[3]) + y * (c[5] + 2.0f * x * c[6] + y * c[8]) +
         z * (c[11] + 2.0f * x * c[12] + y * c[14] + z * c[17]);
  g[1] = c[4] + x * (c[5] + x * c[6]) + y * (2.0f * (c[7] + x * c[8]) + 3.0f * y * c[9]) +
         z * (c[13] + x * c[14] + 2.0f * y * c[15] + z * c[18]);
  g[2] = c[10] + x * (c[11] + x * c[12]) + y * (c[13] + x * c[14] + y * c[15]) +
         z * (2.0f * (c[16] + x * c[17] + y * c[18]) + 3.0f * z * c[19]);
}

/// Nodes a side of the fit's grid, and where they lie: the zeros of the fourth Chebyshev polynomial.
inline constexpr int kFitNodes = 4;
inline const std::array<double, kFitNodes>& fit_nodes() {
  static const std::array<double, kFitNodes> nodes = [] {
    std::array<double, kFitNodes> n{};
    for (int i = 0; i < kFitNodes; ++i)
      n[static_cast<std::size_t>(i)] = -std::cos(3.14159265358979323846 * (2 * i + 1) / (2.0 * kFitNodes));
    return n;
  }();
  return nodes;
}

/// The least-squares cubic through values at the 4 x 4 x 4 nodes (x fastest), with what it leaves out and its range.
struct CubicFit {
  Cubic cubic;
  double left_out;      // bound of the difference to the full tensor interpolant: sum of what degree > 3 carries
  double middle, swing; // over the cell the cubic stays within middle +- swing
};
CubicFit fit_cubic(const std::array<double, kFitNodes * kFitNodes * kFitNodes>& values);

}  // namespace whorl::trace
