// SPDX-License-Identifier: Apache-2.0
// What the parts of the shell are made of.
#pragma once

#include "shaders_cpu/surface/coated_diffuse.h"
#include "specimen/specimen.h"
#include "trace/surfaces.h"

#include <memory>

namespace whorl::transport {

/// Colours are linear, with sRGB primaries.
struct Materials {
  Vec3f exterior{0.8f}, interior{0.8f}, ornament{0.8f};  // albedo of the matt body
  Vec3f section_display{0.5f};                           // a cut face prints as exactly this, unlit
  std::shared_ptr<const shaders_cpu::CoatAlbedo> coat;   // none: plain matt surfaces

  /// The surface of a part as light sees it; a cut face counts as matt shell of its own colour.
  shaders_cpu::CoatedDiffuse surface(trace::Part part) const noexcept;
};

/// A coat of the mineral's index with the roughness of a gloss (0 matt .. 1 polished).
std::shared_ptr<const shaders_cpu::CoatAlbedo> make_coat(specimen::Mineral mineral, double gloss);

/// Materials as a scene file states them; ornament takes the colour of the outside.
Materials make_materials(const specimen::Look& look, specimen::Mineral mineral);

}  // namespace whorl::transport
