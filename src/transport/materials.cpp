// SPDX-License-Identifier: Apache-2.0
// From stated colours and gloss to surfaces.
#include "transport/materials.h"

#include "math/basis3f.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/tone/srgb.h"

namespace whorl::transport {
namespace {

Vec3f linear(const specimen::Colour& c) { return Vec3f(shaders_cpu::srgb_decode_bytes(c.red, c.green, c.blue)); }

}  // namespace

shaders_cpu::CoatedDiffuse Materials::surface(const trace::Hit& hit) const noexcept {
  if (whitening && hit.part != trace::Part::kCutFace) return {whitening->albedo(hit), nullptr};
  if (paint && hit.part != trace::Part::kCutFace) return {paint->albedo(hit), coat.get()};
  switch (hit.part) {
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

Materials make_materials(const field::Field& field, const specimen::Specimen& specimen) {
  const specimen::Look& look = specimen.look;
  Materials m;
  m.exterior = m.ornament = linear(look.exterior.value);
  m.interior = linear(look.interior.value);
  m.section_display = linear(look.section.value);
  m.coat = make_coat(specimen.identity.mineral, look.gloss.value);
  m.paint = std::make_shared<const Paint>(field, look, specimen.colouring);
  return m;
}

Materials whitened(Materials materials, const field::Field& field) {
  materials.whitening = std::make_shared<const Whitening>(field);
  materials.section_display = Vec3f(luminance(materials.section_display));
  return materials;
}

}  // namespace whorl::transport
