// SPDX-License-Identifier: Apache-2.0
// The colour of the shell's body at a place: ground colours, lip, callus, and the pattern laid over them.
#pragma once

#include "field/field.h"
#include "scene/edge_pattern.h"
#include "shaders_cpu/surface/pattern.h"
#include "specimen/specimen.h"
#include "trace/surfaces.h"

#include <optional>
#include <variant>
#include <vector>

namespace whorl::transport {

/// Colours are linear, with sRGB primaries. Growth is counted along growth lines: a place has the growth at which the lip stood there.
/// Keeps a reference to the field. Safe for several threads at once.
class Paint {
 public:
  Paint(const field::Field& field, const specimen::Look& look, const specimen::Colouring& colouring);

  /// Albedo of the matt body at a hit on outside, inside or ornament.
  Vec3f albedo(const trace::Hit& hit) const noexcept;

  /// Whether a place belongs to the lip: less than its breadth behind the rim.
  bool on_lip(const trace::Hit& hit) const noexcept;
  /// Drift of the nacre's thickness there, -1 .. 1.
  float drift(const trace::Hit& hit) const noexcept;

  /// How far behind the rim's crest a place of this growth angle lies, mm; negative before it.
  double behind_rim(const Vec3& p, double theta) const noexcept;
  /// Share of the callus in the colour at a hit, 0 .. 1.
  float callus_share(const trace::Hit& hit) const noexcept;

 private:
  using Shape = std::variant<shaders_cpu::BandShape, shaders_cpu::FlameShape, shaders_cpu::SpotShape,
                             const scene::EdgePattern*>;
  struct Layer {
    Shape shape;
    Vec3f colour;
    float opacity, onset, end;       // in whorls
    float threshold = 1.0f, fade = 0.0f;  // of a computed pattern
  };
  double growth_angle(const trace::Hit& hit) const noexcept;
  Vec3f outside(const trace::Hit& hit) const noexcept;

  const field::Field& field_;
  Vec3f exterior_, interior_;
  std::optional<Vec3f> lip_, callus_;
  double lip_breadth_, callus_breadth_;
  std::vector<Layer> layers_;
};

}  // namespace whorl::transport
