// SPDX-License-Identifier: Apache-2.0
// What the parts of the shell are made of.
#pragma once

#include "shaders_cpu/surface/coated_diffuse.h"
#include "specimen/specimen.h"
#include "trace/surfaces.h"
#include "transport/paint.h"
#include "transport/translucent_wall.h"
#include "transport/whitening.h"

#include <memory>
#include <vector>

namespace whorl::transport {

/// What lies on the matt body: one of a clear coat and nacre, or neither.
struct Finish {
  std::shared_ptr<const shaders_cpu::CoatAlbedo> coat;
  std::shared_ptr<const shaders_cpu::NacreCoat> nacre;
  Vec3f tint{1.0f};  // of the body through a coloured skin
};

/// Colours are linear, with sRGB primaries.
struct Materials {
  Vec3f exterior{0.8f}, interior{0.8f};                  // albedo of the matt body
  std::vector<Vec3f> attached;                           // of each series of attached elements; others have the outside's
  Vec3f mould{0.5f};                                     // albedo of the internal mould, which is matt
  Vec3f section_display{0.5f};                           // a cut face prints as exactly this, unlit
  Finish outer, inner;
  Finish rim;                                            // of the inside within the lip, where `inner` is nacre
  std::shared_ptr<const TranslucentWall> wall;           // none: opaque shell
  float nacre_drift = 0.0f;                              // of the tablets' thickness over the shell, as a share

  std::shared_ptr<const Whitening> whitening;            // there: it hides all of the above but cut faces
  std::shared_ptr<const Paint> paint;                    // none: the colours above, even

  /// The surface at a hit as light sees it; a cut face counts as matt shell of its own colour.
  shaders_cpu::CoatedDiffuse surface(const trace::Hit& hit) const noexcept;
};

/// GGX roughness goes with the gloss of each finish; nacre has a satin lustre of at least this gloss.
inline constexpr double kPolishedGloss = 1.0, kGlazedGloss = 0.85, kPeriostracumGloss = 0.2, kNacreGloss = 0.7;
/// Refractive index of conchiolin, the protein of the skin: within the range 1.43 .. 1.56 of organic layers.
inline constexpr double kPeriostracumIndex = 1.54;

/// A coat of the mineral's index with the roughness of a gloss (0 matt .. 1 polished).
std::shared_ptr<const shaders_cpu::CoatAlbedo> make_coat(specimen::Mineral mineral, double gloss);

/// Materials as a scene file states them. The field must outlive them.
Materials make_materials(const field::Field& field, const specimen::Specimen& specimen);
/// The same shell coated for relief; cut faces keep their lightness.
Materials whitened(Materials materials, const field::Field& field);

}  // namespace whorl::transport
