// SPDX-License-Identifier: Apache-2.0
// Goes through the specimen and tells the stated from the assumed.
#include "plate/disclosure.h"

#include <cmath>

namespace whorl::plate {
namespace {

constexpr bool kForm = true, kLook = false;
/// A key light that stands higher than this out of the page has no side, degrees.
constexpr double kFrontal = 75.0;

const char* size_words(specimen::SizeKind kind) {
  switch (kind) {
    case specimen::SizeKind::kShellHeight: return "shell height";
    case specimen::SizeKind::kShellWidth: return "shell width";
    case specimen::SizeKind::kApertureHeight: return "aperture height";
    case specimen::SizeKind::kApertureWidth: return "aperture width";
  }
  return "";
}

const char* size_key(specimen::SizeKind kind) {
  switch (kind) {
    case specimen::SizeKind::kShellHeight: return "size.shell_height";
    case specimen::SizeKind::kShellWidth: return "size.shell_width";
    case specimen::SizeKind::kApertureHeight: return "size.aperture_height";
    case specimen::SizeKind::kApertureWidth: return "size.aperture_width";
  }
  return "";
}

}  // namespace

std::vector<Basis> basis_of(const specimen::Specimen& s) {
  std::vector<Basis> basis;
  const auto add = [&basis](const char* key, const char* words, const auto& stated, bool shapes) {
    basis.push_back({key, words, stated.given, shapes});
  };
  add("specimen.coiling", "sense of coiling", s.identity.coiling, kForm);
  add("specimen.mineral", "mineral", s.identity.mineral, kLook);
  add("growth.whorls", "number of whorls", s.growth.whorls, kForm);
  add("growth.W", "whorl expansion W", s.growth.W, kForm);
  add("growth.D", "distance from the axis D", s.growth.D, kForm);
  add("growth.T", "translation T", s.growth.T, kForm);
  add("growth.start", "end of the embryonic shell", s.growth.start, kForm);
  if (s.growth.W_distance) add("growth.W_distance", "expansion of the distance", *s.growth.W_distance, kForm);
  if (s.growth.W_depth) add("growth.W_depth", "expansion of the depth", *s.growth.W_depth, kForm);
  if (s.growth.W_section) add("growth.W_section", "expansion of the section", *s.growth.W_section, kForm);
  add("section.S", "section ratio S", s.section.S, kForm);
  add("section.roll", "roll of the section", s.section.roll_deg, kForm);
  if (!s.section.lobes.empty()) basis.push_back({"section.lobe", "lobes of the section", true, kForm});
  add(size_key(s.size.kind), size_words(s.size.kind), s.size.mm, kForm);
  add("wall.thickness", "wall thickness", s.wall.thickness_mm, kForm);
  add("wall.growth", "growth of the wall", s.wall.growth, kForm);
  add("wall.columella", "columella", s.wall.columella, kForm);
  add("lip.inclination", "inclination of the lip", s.lip.inclination_deg, kForm);
  add("lip.thickness", "thickness of the lip", s.lip.thickness_mm, kForm);
  add("look.exterior", "exterior colour", s.look.exterior, kLook);
  add("look.interior", "interior colour", s.look.interior, kLook);
  add("look.section", "colour of cut faces", s.look.section, kLook);
  add("look.gloss", "gloss", s.look.gloss, kLook);
  add("look.exterior_finish", "surface of the outside", s.look.exterior_finish, kLook);
  add("look.interior_finish", "surface of the inside", s.look.interior_finish, kLook);
  if (s.look.lip) add("look.lip", "colour of the lip", *s.look.lip, kLook);
  if (s.look.callus) add("look.callus", "colour of the callus", *s.look.callus, kLook);
  const auto painted = [&basis](const char* key, const char* words, bool stated) {
    if (stated) basis.push_back({key, words, true, kLook});
  };
  painted("band", "colour bands", !s.colouring.bands.empty());
  painted("flame", "flames", !s.colouring.flames.empty());
  painted("spot", "spots", !s.colouring.spots.empty());
  painted("pattern", "pattern computed along the growing edge", !s.colouring.patterns.empty());
  const auto formed = [&basis](const char* key, const char* words, bool stated) {
    if (stated) basis.push_back({key, words, true, kForm});
  };
  formed("cord", "spiral cords", !s.sculpture.cords.empty());
  formed("rib", "axial ribs", !s.sculpture.ribs.empty());
  formed("nodule", "nodules", !s.sculpture.nodules.empty());
  return basis;
}

std::string in_words(const std::vector<std::string>& items) {
  std::string text;
  for (std::size_t i = 0; i < items.size(); ++i) {
    if (i > 0) text += i + 1 == items.size() ? " and " : ", ";
    text += items[i];
  }
  return text;
}

std::string shaping_words(const std::vector<Basis>& basis, bool given) {
  std::vector<std::string> items;
  for (const Basis& one : basis)
    if (one.shapes && one.given == given) items.push_back(one.words);
  return in_words(items);
}

const char* mineral_word(specimen::Mineral mineral) {
  return mineral == specimen::Mineral::kAragonite ? "aragonite" : "calcite";
}

std::string light_words(const specimen::Light& light) {
  if (light.elevation_deg.value > kFrontal) return "the front";
  static const char* const kSides[8] = {"the right", "upper right", "above", "upper left",
                                        "the left",  "lower left",  "below", "lower right"};
  const long sector = std::lround(light.azimuth_deg.value / 45.0);
  return kSides[((sector % 8) + 8) % 8];
}

}  // namespace whorl::plate
