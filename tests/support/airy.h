// SPDX-License-Identifier: Apache-2.0
// Airy's sums for layers: amplitudes by echoes, another way than matrices to the same light.
#pragma once

#include "math/vec.h"

#include <cmath>
#include <complex>
#include <span>
#include <utility>

namespace whorl::test {

using Complex = std::complex<double>;

/// A layer of index n + i k; k >= 0 weakens.
struct AiryLayer {
  Complex index;
  double thickness_nm;
};

/// Reflectance and transmittance of layers from the side of the light, between media; `across`: light swings across the plane of
/// incidence. Airy's formula from the last face upwards, each time with all below as one face (Rouard 1937, Annales de Physique
/// 11(7): 291-384).
inline std::pair<double, double> airy(double outer, std::span<const AiryLayer> layers, int repeats, Complex substrate,
                                      double wavelength_nm, double cosine, bool across) {
  const double s = outer * std::sqrt(1.0 - cosine * cosine);
  const auto cosine_in = [s](Complex n) {
    const Complex c = std::sqrt(1.0 - s * s / (n * n));
    return (n * c).imag() < 0.0 ? -c : c;  // the wave that dies away
  };
  Complex r = 0.0, t = 1.0, below = substrate;
  const auto lay_on = [&](Complex above, Complex turn) {  // turn: phase factor of one way through what lies below the face
    const Complex ca = cosine_in(above), cb = cosine_in(below);
    const Complex a = (across ? above : below) * ca, b = (across ? below : above) * cb;
    const Complex face = (a - b) / (a + b), through = 2.0 * above * ca / (a + b);
    const Complex echoes = 1.0 + face * r * turn * turn;
    t = through * t * turn / echoes;
    r = (face + r * turn * turn) / echoes;
    below = above;
  };
  Complex turn = 1.0;
  for (int i = 0; i < repeats; ++i)
    for (std::size_t k = layers.size(); k-- > 0;) {
      lay_on(layers[k].index, turn);
      turn = std::exp(Complex(0.0, kTwoPi / wavelength_nm) * layers[k].index * layers[k].thickness_nm * cosine_in(layers[k].index));
    }
  lay_on(outer, turn);
  const Complex last = cosine_in(substrate);
  const double flux = across ? (substrate * last).real() : (std::conj(substrate) * last).real();
  return {std::norm(r), std::norm(t) * flux / (outer * cosine)};
}

}  // namespace whorl::test
