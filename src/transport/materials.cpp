// SPDX-License-Identifier: Apache-2.0
// From stated colours and gloss to surfaces.
#include "transport/materials.h"

#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/tone/srgb.h"

namespace whorl::transport {
namespace {

Vec3f linear(const specimen::Colour& c) { return Vec3f(shaders_cpu::srgb_decode_bytes(c.red, c.green, c.blue)); }

}  // namespace

shaders_cpu::CoatedDiffuse Materials::surface(trace::Part part) const noexcept {
  switch (part) {
    case trace::Part::kInterior: return {interior, coat.get()};
    case trace::Part::kOrnament: return {ornament, coat.get()};
    case trace::Part::kCutFace: return {section_display, nullptr};
    default: return {exterior, coat.get()};
  }
}

std::shared_ptr<const shaders_cpu::CoatAlbedo> make_coat(specimen::Mineral mineral, double gloss) {
  const double index =
      mineral == specimen::Mineral::kAragonite ? shaders_cpu::kAragoniteIndex : shaders_cpu::kCalciteIndex;
  return std::make_shared<const shaders_cpu::CoatAlbedo>(index, shaders_cpu::alpha_of_gloss(gloss));
}

Materials make_materials(const specimen::Look& look, specimen::Mineral mineral) {
  Materials m;
  m.exterior = m.ornament = linear(look.exterior.value);
  m.interior = linear(look.interior.value);
  m.section_display = linear(look.section.value);
  m.coat = make_coat(mineral, look.gloss.value);
  return m;
}

}  // namespace whorl::transport
