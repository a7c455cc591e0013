// SPDX-License-Identifier: Apache-2.0
// How much light a rough clear coat reflects in all, as a function of the direction it is seen from.
#pragma once

#include <algorithm>
#include <array>
#include <cmath>

namespace whorl::shaders_cpu {

/// Directional albedo of a GGX coat (single scattering, Fresnel included): E(cos) for one index and roughness,
/// tabulated by deterministic quadrature when built (some hundredths of a second), to 5e-5.
class CoatAlbedo {
 public:
  static constexpr int kNodes = 257;

  /// `index` >= 1, `alpha` (GGX roughness) > 0 .. 1.
  CoatAlbedo(double index, double alpha);

  float index() const noexcept { return index_; }
  float alpha() const noexcept { return alpha_; }
  /// Share of the light from direction `cosine` (0 .. 1) that the coat reflects.
  float at(float cosine) const noexcept {
    // Nodes lie at cos = (i / last)^2: E bends most at grazing angles.
    const float place = std::sqrt(std::clamp(cosine, 0.0f, 1.0f)) * static_cast<float>(kNodes - 1);
    const int i = std::min(static_cast<int>(place), kNodes - 2);
    const auto k = static_cast<std::size_t>(i);
    const float low = cos_of(i), high = cos_of(i + 1);
    return nodes_[k] + (nodes_[k + 1] - nodes_[k]) * ((cosine - low) / (high - low));
  }
  /// 2 times the integral of E(c) c over c in [0, 1], of the interpolated E itself: the coupling then closes exactly.
  float mean() const noexcept { return mean_; }

 private:
  static constexpr float cos_of(int node) noexcept {
    const float u = static_cast<float>(node) / static_cast<float>(kNodes - 1);
    return u * u;
  }
  std::array<float, kNodes> nodes_{};
  float index_, alpha_, mean_ = 0.0f;
};

/// E by quadrature: within 2e-5 at order 16, 1e-6 at order 64. `cosine` in (0, 1].
double coat_albedo_quadrature(double cosine, double index, double alpha, int order);

}  // namespace whorl::shaders_cpu
