// SPDX-License-Identifier: Apache-2.0
// What the parts of the shell are made of.
#pragma once

#include "shaders_cpu/surface/coated_diffuse.h"
#include "specimen/specimen.h"
#include "trace/surfaces.h"
#include "transport/paint.h"
#include "transport/whitening.h"

#include <memory>

namespace whorl::transport {

/// Colours are linear, with sRGB primaries.
struct Materials {
  Vec3f exterior{0.8f}, interior{0.8f}, ornament{0.8f};  // albedo of the matt body
  Vec3f section_display{0.5f};                           // a cut face prints as exactly this, unlit
  std::shared_ptr<const shaders_cpu::CoatAlbedo> coat;   // none: plain matt surfaces

  std::shared_ptr<const Whitening> whitening;            // there: it hides all of the above but cut faces
  std::shared_ptr<const Paint> paint;                    // none: the colours above, even

  /// The surface at a hit as light sees it; a cut face counts as matt shell of its own colour.
  shaders_cpu::CoatedDiffuse surface(const trace::Hit& hit) const noexcept;
};

/// A coat of the mineral's index with the roughness of a gloss (0 matt .. 1 polished).
std::shared_ptr<const shaders_cpu::CoatAlbedo> make_coat(specimen::Mineral mineral, double gloss);

/// Materials as a scene file states them; ornament takes the colour of the outside. The field must outlive them.
Materials make_materials(const field::Field& field, const specimen::Specimen& specimen);
/// The same shell coated for relief; cut faces keep their lightness.
Materials whitened(Materials materials, const field::Field& field);

}  // namespace whorl::transport
