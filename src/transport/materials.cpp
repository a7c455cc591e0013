// SPDX-License-Identifier: Apache-2.0
// From stated colours and gloss to surfaces.
#include "transport/materials.h"

#include "math/basis3f.h"
#include "shaders_cpu/surface/fresnel.h"
#include "shaders_cpu/tone/srgb.h"

#include <algorithm>

namespace whorl::transport {
namespace {

Vec3f linear(const specimen::Colour& c) { return Vec3f(shaders_cpu::srgb_decode_bytes(c.red, c.green, c.blue)); }

Finish make_finish(specimen::Finish kind, const specimen::Specimen& specimen) {
  const specimen::Look& look = specimen.look;
  const specimen::Mineral mineral = specimen.identity.mineral;
  Finish finish;
  switch (kind) {
    case specimen::Finish::kPlain: finish.coat = make_coat(mineral, look.gloss); break;
    case specimen::Finish::kPolished: finish.coat = make_coat(mineral, kPolishedGloss); break;
    case specimen::Finish::kGlazed: finish.coat = make_coat(mineral, kGlazedGloss); break;
    case specimen::Finish::kPeriostracum:
      finish.coat = std::make_shared<const shaders_cpu::CoatAlbedo>(kPeriostracumIndex,
                                                                    shaders_cpu::alpha_of_gloss(kPeriostracumGloss));
      finish.tint = linear(look.periostracum);
      break;
    case specimen::Finish::kNacre: {
      const specimen::Nacre& n = specimen.nacre;
      finish.nacre = std::make_shared<const shaders_cpu::NacreCoat>(
          shaders_cpu::NacreStack{n.tablet_nm, n.spread_nm, n.sheet_nm, n.sheet_index, n.layers},
          shaders_cpu::alpha_of_gloss(std::max(kNacreGloss, look.gloss.value)));
      break;
    }
  }
  return finish;
}

}  // namespace

shaders_cpu::CoatedDiffuse Materials::surface(const trace::Hit& hit) const noexcept {
  if (hit.part == trace::Part::kCutFace) return {section_display, nullptr};
  if (hit.part == trace::Part::kMould && !whitening) return {mould, nullptr};
  if (whitening) return {whitening->albedo(hit), nullptr};
  const bool inside = hit.part == trace::Part::kInterior;
  const Finish* finish = inside ? &inner : &outer;
  if (inside && inner.nacre && paint && paint->on_lip(hit)) finish = &rim;
  if (hit.part == trace::Part::kOrnament)
    return {(hit.series < attached.size() ? attached[hit.series] : exterior) * finish->tint, finish->coat.get(), finish->nacre.get()};
  const Vec3f body = paint ? paint->albedo(hit) : inside ? interior : exterior;
  shaders_cpu::CoatedDiffuse surface{body * finish->tint, finish->coat.get(), finish->nacre.get()};
  if (finish->nacre && paint && nacre_drift > 0.0f) surface.nacre_scale = 1.0f + nacre_drift * paint->drift(hit);
  return surface;
}

std::shared_ptr<const shaders_cpu::CoatAlbedo> make_coat(specimen::Mineral mineral, double gloss) {
  const double index =
      mineral == specimen::Mineral::kAragonite ? shaders_cpu::kAragoniteIndex : shaders_cpu::kCalciteIndex;
  return std::make_shared<const shaders_cpu::CoatAlbedo>(index, shaders_cpu::alpha_of_gloss(gloss));
}

Materials make_materials(const field::Field& field, const specimen::Specimen& specimen) {
  const specimen::Look& look = specimen.look;
  Materials m;
  m.exterior = linear(look.exterior.value);
  m.interior = linear(look.interior.value);
  m.section_display = linear(look.section.value);
  m.mould = linear(look.mould.value);
  m.outer = make_finish(look.exterior_finish, specimen);
  m.inner = look.interior_finish.value == look.exterior_finish.value ? m.outer : make_finish(look.interior_finish, specimen);
  m.rim = make_finish(specimen::Finish::kPlain, specimen);
  m.nacre_drift = static_cast<float>(specimen.nacre.drift.value);
  for (const scene::AttachedSeries& series : field.scene().attached.series)
    m.attached.push_back(series.colour ? linear(*series.colour) : m.exterior);
  m.paint = std::make_shared<const Paint>(field, look, specimen.colouring);
  return m;
}

Materials whitened(Materials materials, const field::Field& field) {
  materials.whitening = std::make_shared<const Whitening>(field);
  materials.section_display = Vec3f(luminance(materials.section_display));
  return materials;
}

}  // namespace whorl::transport
