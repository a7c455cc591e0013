// SPDX-License-Identifier: Apache-2.0
// Which lamp a shadow ray is sent to, where there are several.
#pragma once

#include "math/basis3f.h"
#include "shaders_cpu/light/sphere_lamp.h"

#include <cstddef>
#include <span>

namespace whorl::transport {

/// Lamps are chosen by what each would send to a place were nothing in the way: radiance times solid angle.
class LampChoice {
 public:
  LampChoice(std::span<const shaders_cpu::SphereLamp> lamps, const Vec3f& from) noexcept : lamps_(lamps), from_(from) {
    if (lamps.size() > 1)
      for (const auto& lamp : lamps) total_ += weight(lamp);
  }

  /// Index of the lamp for a uniform number, which is made uniform again; the number of lamps where none shines.
  std::size_t choose(float& u) const noexcept {
    if (lamps_.size() < 2) return 0;
    if (!(total_ > 0.0f)) return lamps_.size();
    float left = u * total_;
    std::size_t last = lamps_.size();
    for (std::size_t k = 0; k < lamps_.size(); ++k) {
      const float w = weight(lamps_[k]);
      if (!(w > 0.0f)) continue;
      last = k;
      if (left < w) break;
      left -= w;
    }
    if (last < lamps_.size()) u = std::min(left / weight(lamps_[last]), 0x1.fffffep-1f);
    return last;
  }
  /// Of a direction to the lamp: that it is chosen, and drawn evenly from its cone.
  float pdf(const shaders_cpu::SphereLamp& lamp) const noexcept {
    const float cone = shaders_cpu::LampView(lamp, from_).cone.pdf();
    return lamps_.size() < 2 ? cone : total_ > 0.0f ? cone * weight(lamp) / total_ : 0.0f;
  }

 private:
  float weight(const shaders_cpu::SphereLamp& lamp) const noexcept {
    return luminance(lamp.radiance) * shaders_cpu::LampView(lamp, from_).cone.one_minus_cos;
  }

  std::span<const shaders_cpu::SphereLamp> lamps_;
  Vec3f from_;
  float total_ = 0.0f;
};

}  // namespace whorl::transport
