// SPDX-License-Identifier: Apache-2.0
// Chebyshev coefficients by discrete orthogonality, cut to total degree three, as monomials.
#include "trace/cubic.h"

namespace whorl::trace {
namespace {

constexpr int N = kFitNodes;

// analysis[m][i]: weight of node i in Chebyshev coefficient m. Discrete orthogonality makes truncation least squares.
const std::array<std::array<double, N>, N>& analysis() {
  static const auto table = [] {
    std::array<std::array<double, N>, N> a{};
    for (std::size_t m = 0; m < N; ++m)
      for (std::size_t i = 0; i < N; ++i)
        a[m][i] = (m == 0 ? 1.0 : 2.0) / N * std::cos(static_cast<double>(m) * std::acos(fit_nodes()[i]));
    return a;
  }();
  return table;
}

// Chebyshev polynomial m as monomials.
constexpr double kMonomials[N][N] = {{1, 0, 0, 0}, {0, 1, 0, 0}, {-1, 0, 2, 0}, {0, -3, 0, 4}};

// Place of monomial x^i y^j z^k in a Cubic; -1 for degree > 3.
constexpr int place(int i, int j, int k) {
  if (i + j + k > 3) return -1;
  constexpr int first[4][4] = {{0, 4, 7, 9}, {10, 13, 15, -1}, {16, 18, -1, -1}, {19, -1, -1, -1}};
  return first[k][j] + i;
}

}  // namespace

CubicFit fit_cubic(const std::array<double, N * N * N>& values) {
  const auto& a = analysis();
  double c[N][N][N] = {};  // [z][y][x]
  {
    double t[N][N][N] = {}, u[N][N][N] = {};
    for (int k = 0; k < N; ++k)
      for (int j = 0; j < N; ++j)
        for (std::size_t m = 0; m < N; ++m)
          for (std::size_t i = 0; i < N; ++i)
            t[k][j][m] += a[m][i] * values[static_cast<std::size_t>((k * N + j) * N) + i];
    for (int k = 0; k < N; ++k)
      for (std::size_t m = 0; m < N; ++m)
        for (std::size_t j = 0; j < N; ++j)
          for (int i = 0; i < N; ++i) u[k][m][i] += a[m][j] * t[k][j][i];
    for (std::size_t m = 0; m < N; ++m)
      for (std::size_t k = 0; k < N; ++k)
        for (int j = 0; j < N; ++j)
          for (int i = 0; i < N; ++i) c[m][j][i] += a[m][k] * u[k][j][i];
  }
  CubicFit fit{};
  std::array<double, kCubicTerms> sum{};
  for (int k = 0; k < N; ++k)
    for (int j = 0; j < N; ++j)
      for (int i = 0; i < N; ++i) {
        const double v = c[k][j][i];
        if (i + j + k > 3) {
          fit.left_out += std::abs(v);
          continue;
        }
        if (i + j + k == 0)
          fit.middle = v;
        else
          fit.swing += std::abs(v);
        for (int q = 0; q <= k; ++q)
          for (int r = 0; r <= j; ++r)
            for (int s = 0; s <= i; ++s)
              sum[static_cast<std::size_t>(place(s, r, q))] +=
                  v * kMonomials[i][s] * kMonomials[j][r] * kMonomials[k][q];
      }
  for (std::size_t i = 0; i < kCubicTerms; ++i) fit.cubic[i] = static_cast<float>(sum[i]);
  return fit;
}

}  // namespace whorl::trace
