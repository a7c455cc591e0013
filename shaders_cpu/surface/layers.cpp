// SPDX-License-Identifier: Apache-2.0
// Products of characteristic matrices.
#include "shaders_cpu/surface/layers.h"

#include "math/vec.h"

#include <cmath>

namespace whorl::shaders_cpu {
namespace {

using Complex = std::complex<double>;

struct Matrix {
  Complex a{1.0}, b{0.0}, c{0.0}, d{1.0};
};

Matrix operator*(const Matrix& x, const Matrix& y) noexcept {
  return {x.a * y.a + x.b * y.c, x.a * y.b + x.b * y.d, x.c * y.a + x.d * y.c, x.c * y.b + x.d * y.d};
}

Matrix power(Matrix base, int exponent) noexcept {
  Matrix result;
  for (; exponent > 0; exponent /= 2) {
    if (exponent % 2 == 1) result = result * base;
    base = base * base;
  }
  return result;
}

struct Wave {
  Complex cosine;  // in the medium
  Complex eta;     // tilted admittance
};

Wave wave_in(Complex index, double sine_times_index, bool across) noexcept {
  const Complex ratio = sine_times_index / index;
  Complex cosine = std::sqrt(1.0 - ratio * ratio);
  if ((index * cosine).imag() > 0.0) cosine = -cosine;  // the wave that dies away
  return {cosine, across ? index * cosine : index / cosine};
}

void respond(double outer, std::span<const Layer> layers, int repeats, Complex substrate, double wavelength_nm, double cosine,
             bool across, double& reflectance, double& transmittance) noexcept {
  const double sine = std::sqrt(std::max(0.0, 1.0 - cosine * cosine)) * outer;
  const double eta0 = across ? outer * cosine : outer / cosine;
  Matrix once;
  for (const Layer& layer : layers) {
    const Wave w = wave_in(layer.index, sine, across);
    const Complex phase = kTwoPi * layer.index * layer.thickness_nm * w.cosine / wavelength_nm;
    const Complex c = std::cos(phase), s = std::sin(phase) * Complex(0.0, 1.0);
    once = once * Matrix{c, s / w.eta, s * w.eta, c};
  }
  const Matrix m = power(once, repeats);
  const Complex eta = wave_in(substrate, sine, across).eta;
  const Complex b = m.a + m.b * eta, c = m.c + m.d * eta, sum = eta0 * b + c;
  reflectance = std::norm((eta0 * b - c) / sum);
  transmittance = 4.0 * eta0 * eta.real() / std::norm(sum);
}

}  // namespace

StackResponse stack_response(double outer, std::span<const Layer> layers, int repeats, Complex substrate, double wavelength_nm,
                             double cosine) noexcept {
  StackResponse r{};
  respond(outer, layers, repeats, substrate, wavelength_nm, cosine, true, r.reflectance.s, r.transmittance.s);
  respond(outer, layers, repeats, substrate, wavelength_nm, cosine, false, r.reflectance.p, r.transmittance.p);
  return r;
}

}  // namespace whorl::shaders_cpu
