// SPDX-License-Identifier: Apache-2.0
// Writes scenes for tests.
#include "support/scene_text.h"

#include "specimen/key_table.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <algorithm>

namespace whorl::support {

SceneText::SceneText() {
  set("", "format", "1");
  set("specimen", "name", "\"Cochlidion argutum\"").set("specimen", "coiling", "\"dextral\"");
  set("growth", "whorls", "7.25").set("growth", "W", "1.42").set("growth", "D", "0.06").set("growth", "T", "2.6");
  set("size", "shell_height", "24.0");
  set("wall", "thickness", "0.45");
}

SceneText SceneText::with_every_key() {
  SceneText scene;
  scene.set("specimen", "coiling", "\"sinistral\"");
  for (const char* key : {"catalogue", "author", "locality", "note", "licence"}) {
    scene.set("specimen", key, fmt::format("\"the {}\"", key));
  }
  scene.set("specimen", "mineral", "\"calcite\"");
  scene.set("growth", "W", "[[0.5, 1.6], [3, 1.5], [6.25, 1.4]]").set("growth", "start", "1.25");
  scene.set("growth", "W_distance", "1.41").set("growth", "W_depth", "1.43").set("growth", "W_section", "[[1.0, 1.7]]");
  scene.set("section", "S", "1.15").set("section", "roll", "-7.5");
  scene.set("section.lobe", "at", "60.0").set("section.lobe", "reach", "0.2").set("section.lobe", "width", "25");
  scene.set("wall", "growth", "\"constant\"").set("wall", "columella", "0.18");
  scene.set("lip", "inclination", "12").set("lip", "thickness", "0.8");
  scene.set("look", "exterior", "\"#010203\"")
      .set("look", "interior", "\"#AABBCC\"")
      .set("look", "section", "\"#ff8000\"");
  scene.set("look", "gloss", "0.75");
  scene.set("look", "lip", "\"#040506\"")
      .set("look", "lip_breadth", "1.25")
      .set("look", "callus", "\"#070809\"")
      .set("look", "callus_breadth", "1.5")
      .set("look", "exterior_finish", "\"periostracum\"")
      .set("look", "interior_finish", "\"nacre\"")
      .set("look", "periostracum", "\"#0c0d0e\"")
      .set("look", "mould", "\"#0f1011\"");
  scene.set("preserved", "from", "3.5").set("preserved", "to", "0.25").set("preserved", "counted", "\"from the lip\"");
  scene.set("preserved", "parts", "\"outside\"");
  scene.set("nacre", "tablet", "410").set("nacre", "spread", "30").set("nacre", "sheet", "12").set("nacre", "layers", "40");
  scene.set("nacre", "sheet_index", "1.55").set("nacre", "drift", "0.125");
  scene.set("translucence", "mean_free_path", "0.15").set("translucence", "anisotropy", "0.7");
  scene.set("translucence", "colour", "\"#f0f1f2\"");
  const auto pigment = [&scene](const char* table, const char* red) {
    scene.set(table, "colour", fmt::format("\"#{}0a0b\"", red)).set(table, "opacity", "0.625").set(table, "fade", "0.375");
    scene.set(table, "onset", "1.5").set(table, "end", "6.5");
  };
  scene.set("band", "at", "45").set("band", "width", "12.5");
  pigment("band", "11");
  scene.set("flame", "per_whorl", "14").set("flame", "breadth", "0.4").set("flame", "at", "10").set("flame", "width", "150");
  scene.set("flame", "taper", "0.6").set("flame", "sway", "0.7").set("flame", "bends", "3").set("flame", "seed", "5");
  scene.set("flame", "irregularity", "0.1");
  pigment("flame", "12");
  scene.set("spot", "per_whorl", "20").set("spot", "length", "0.3").set("spot", "at", "-30").set("spot", "width", "9");
  scene.set("spot", "stagger", "0.5").set("spot", "irregularity", "0.2").set("spot", "seed", "6");
  pigment("spot", "13");
  scene.set("pattern", "activator_decay", "60").set("pattern", "inhibitor_decay", "40").set("pattern", "source", "50");
  scene.set("pattern", "activator_base", "0.01").set("pattern", "inhibitor_base", "2").set("pattern", "seed", "7");
  scene.set("pattern", "activator_spread", "0.5").set("pattern", "inhibitor_spread", "0.25");
  scene.set("pattern", "variation", "0.15").set("pattern", "threshold", "1.75");
  pigment("pattern", "14");
  scene.set("cord", "at", "15").set("cord", "width", "11").set("cord", "height", "0.125").set("cord", "onset", "1.5");
  scene.set("cord", "end", "6.5").set("cord", "growth", "0.75");
  const auto series = [&scene](const char* table, const char* seed) {
    scene.set(table, "per_whorl", "13").set(table, "height", "0.0625").set(table, "at", "-25").set(table, "width", "75");
    scene.set(table, "behind_lip", "0.03").set(table, "irregularity", "0.3").set(table, "seed", seed);
    scene.set(table, "onset", "1.25").set(table, "end", "6.25").set(table, "growth", "0.5");
  };
  series("rib", "8");
  scene.set("rib", "breadth", "0.7");
  series("nodule", "9");
  scene.set("nodule", "length", "0.8");
  scene.set("stripe", "at", "20").set("stripe", "width", "7").set("stripe", "height", "0.4").set("stripe", "onset", "1.75");
  scene.set("stripe", "growth", "1.25");
  scene.set("stripe", "end", "6").set("stripe", "colour", "\"#210a0b\"");
  series("lamella", "10");
  scene.set("lamella", "thickness", "0.2").set("lamella", "lean", "15").set("lamella", "colour", "\"#220a0b\"");
  series("spine", "11");
  scene.drop("spine", "height").drop("spine", "width").set("spine", "length", "4").set("spine", "breadth", "0.9");
  scene.set("spine", "tip", "0.125").set("spine", "bend", "35").set("spine", "lean", "-12").set("spine", "hollow", "0.6");
  scene.set("spine", "open", "70").set("spine", "colour", "\"#230a0b\"");
  series("attached", "12");
  scene.set("attached", "shape", "\"tube\"").set("attached", "breadth", "0.6").set("attached", "rows", "3");
  scene.set("attached", "stagger", "0.5").set("attached", "lean", "9").set("attached", "colour", "\"#240a0b\"");
  scene.set("encruster", "scene", "\"other.toml\"").set("encruster", "behind_lip", "0.5").set("encruster", "at", "75");
  scene.set("encruster", "pose", "\"lying\"").set("encruster", "turn", "45").set("encruster", "sunk", "0.1");
  scene.set("light", "azimuth", "90")
      .set("light", "stops", "-2.5")
      .set("light", "elevation", "30")
      .set("light", "softness", "5")
      .set("light", "fill", "0.5");
  scene.set("lamp", "behind_lip", "0.25")
      .set("lamp", "offset", "0.75")
      .set("lamp", "at", "200")
      .set("lamp", "shape", "\"ring\"")
      .set("lamp", "ring", "1.5")
      .set("lamp", "bulbs", "9")
      .set("lamp", "radius", "0.5")
      .set("lamp", "strength", "70")
      .set("lamp", "temperature", "2700");
  scene.set("radiograph", "energy", "35");
  scene.set("contact_sheet", "W", "[1.5, 2.0]").set("contact_sheet", "T", "[0.5, 1.0, 2]");
  scene.set("stereo", "angle", "7").set("stereo", "spacing", "62");
  scene.set("plate", "width", "85").set("plate", "resolution", "300").set("plate", "background", "\"clear\"");
  scene.set("plate", "columns", "2")
      .set("plate", "gap", "2.5")
      .set("plate", "letters", "\"(a)\"")
      .set("plate", "bar", "10.0");
  scene.set("plate", "quality", "\"draft\"").set("plate", "unobserved", "\"hatch\"").set("plate", "hatch_spacing", "0.9");
  return scene.set("panel", "view", "{ azimuth = 30.0, elevation = 10.0 }").set("panel", "scale", "2.0")
      .set("panel", "look", "\"whitened\"")
      .set("panel", "picture", "\"single\"")
      .set("panel", "shows", "\"mould\"");
}

SceneText& SceneText::set(const std::string& table, const std::string& key, const std::string& value) {
  auto& keys = tables_[table];
  const auto found = std::find_if(keys.begin(), keys.end(), [&](const auto& entry) { return entry.first == key; });
  if (found != keys.end()) {
    found->second = value;
  } else {
    keys.emplace_back(key, value);
  }
  return *this;
}

SceneText& SceneText::drop(const std::string& table, const std::string& key) {
  auto& keys = tables_[table];
  keys.erase(std::remove_if(keys.begin(), keys.end(), [&](const auto& entry) { return entry.first == key; }),
             keys.end());
  return *this;
}

std::string SceneText::text() const {
  std::string text;
  for (const auto& [table, keys] : tables_) {
    if (!table.empty()) text += fmt::format("{}\n", specimen::written_table(table));
    for (const auto& [key, value] : keys) text += fmt::format("{} = {}\n", key, value);
  }
  return text;
}

std::vector<diagnostics::Problem> problems_of(const std::string& text) {
  try {
    specimen::parse_scene(text, "scene");
  } catch (const diagnostics::InvalidInput& error) {
    return error.problems();
  }
  return {};
}

std::string complaint_about(const std::string& text) {
  std::string all;
  for (const diagnostics::Problem& problem : problems_of(text)) {
    all += fmt::format("{}:{}: {}\n", problem.where.line, problem.where.column, problem.message);
  }
  return all;
}

}  // namespace whorl::support
