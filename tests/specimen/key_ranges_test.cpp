// SPDX-License-Identifier: Apache-2.0
// Every row of the table of keys against the reader: ranges, types, names.
#include "specimen/key_table.h"
#include "support/catch.h"
#include "support/scene_text.h"

#include <fmt/format.h>

#include <cmath>

using namespace whorl::specimen;
using whorl::support::complaint_about;
using whorl::support::SceneText;

namespace {

std::string sound_value(const KeyRow& row) {
  if (row.type == KeyType::kColour) return "\"#112233\"";
  if (row.type == KeyType::kView) return "\"apertural\"";
  if (row.type == KeyType::kText) return "\"words\"";
  if (row.key == "shape") return "\"bead\"";
  return row.key == "reach" ? "0.1" : "1";
}

/// A sound scene in which `row` may take any value of its range, with `value` (TOML text) in that place.
SceneText scene_with(const KeyRow& row, const std::string& value) {
  SceneText scene;
  scene.set("growth", "whorls", "40").set("size", "shell_height", "5000");
  const std::string table(row.table), key(row.key);
  if (table == "size") scene.drop("size", "shell_height").set("wall", "thickness", "0.001");
  if (key == "unobserved") scene.set("preserved", "parts", "\"whole\"");
  if (key == "bend") scene.set("spine", "length", "1000");  // bends as sharply as may be
  if (key == "open") scene.set("spine", "hollow", "0.5");
  if (key == "callus_breadth") scene.set("look", "callus", "\"#000000\"");
  if (table != "panel.view" && is_list(table))
    for (const KeyRow& other : key_table())
      if (other.table == table && other.fallback == kRequired && !(key == "bend" && other.key == "length")) scene.set(table, std::string(other.key), sound_value(other));
  if (table == "panel.view") {
    const std::string other = key == "azimuth" ? "elevation" : "azimuth";
    return scene.set("panel", "view", fmt::format("{{ {} = {}, {} = 0 }}", key, value, other));
  }
  return scene.set(table, key, value);
}

bool is_numeric(const KeyRow& row) {
  return row.type == KeyType::kNumber || row.type == KeyType::kWhole || row.type == KeyType::kStages ||
         row.type == KeyType::kBar;
}

/// The least step that matters: whole numbers step by one.
double step_at(const KeyRow& row, double value) {
  return row.type == KeyType::kWhole ? 1.0 : 1e-9 * std::max(1.0, std::abs(value));
}

std::string named(const KeyRow& row) { return written_key(row.table, row.key); }

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

}  // namespace

TEST_CASE("Every numeric key accepts both ends of its range", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (!is_numeric(row)) continue;
    const double low = row.range.low + (row.range.low_open ? step_at(row, row.range.low) : 0.0);
    const double high = row.range.high - (row.range.high_open ? step_at(row, row.range.high) : 0.0);
    for (const double value : {low, high}) {
      CAPTURE(named(row), value);
      CHECK(complaint_about(scene_with(row, fmt::format("{}", value))) == "");
    }
  }
}

TEST_CASE("Every numeric key refuses what lies just below or above its range and says key, value and range",
          "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (!is_numeric(row)) continue;
    const double below = row.range.low - (row.range.low_open ? 0.0 : step_at(row, row.range.low));
    const double above = row.range.high + (row.range.high_open ? 0.0 : step_at(row, row.range.high));
    for (const double value : {below, above, -1e300, 1e300}) {
      if (row.type == KeyType::kWhole && std::abs(value) > 1e299) continue;
      const std::string complaint = complaint_about(scene_with(row, fmt::format("{}", value)));
      CAPTURE(named(row), value, complaint);
      if (row.key == "format" && value > 1.0) {
        CHECK(contains(complaint, "format = 2: this program reads format 1; a newer program is needed"));
      } else {
        CHECK(contains(complaint, fmt::format("{} = {}: must be {}\n", named(row), value, written_range(row))));
      }
    }
  }
}

TEST_CASE("No numeric key takes nan or an infinity", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (!is_numeric(row) || row.type == KeyType::kWhole) continue;
    for (const char* value : {"nan", "-nan", "inf", "-inf"}) {
      CAPTURE(named(row), value);
      CHECK(contains(complaint_about(scene_with(row, value)),
                     fmt::format("is no finite number; must be {}", written_range(row))));
    }
  }
}

TEST_CASE("Every decimal key takes a whole number, every whole key refuses a decimal one", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (!is_numeric(row)) continue;
    CAPTURE(named(row));
    if (row.type == KeyType::kWhole) {
      const std::string complaint = complaint_about(scene_with(row, fmt::format("{}.0", row.range.low)));
      CHECK(contains(complaint, named(row)));
      CHECK(contains(complaint, "found a decimal number"));
    } else if (row.range.holds(std::ceil(row.range.low + 0.5))) {
      CHECK(complaint_about(scene_with(row, fmt::format("{}", std::ceil(row.range.low + 0.5)))) == "");
    }
  }
}

TEST_CASE("Every key is read, and says what it found and wants where the type is wrong", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    const std::string complaint = complaint_about(scene_with(row, "2001-02-03"));
    CAPTURE(named(row), complaint);
    CHECK(contains(complaint,
                   fmt::format("{} = 2001-02-03: found a date or time, wanted is {}", named(row), written_wish(row))));
  }
}

TEST_CASE("Every word of every key is known, and a word with one slip is recognised", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    for (const std::string_view word : words_of(row)) {
      CAPTURE(named(row), word);
      CHECK(complaint_about(scene_with(row, fmt::format("\"{}\"", word))) == "");
      if (word.size() < 4) continue;
      const std::string slip = fmt::format("\"{}{}\"", word.substr(0, 3), word.substr(4));
      CHECK(contains(complaint_about(scene_with(row, slip)), fmt::format("unknown word; did you mean \"{}\"?", word)));
    }
  }
}

TEST_CASE("A key with one slip is recognised in its table", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (row.key.size() < 4 || row.table == "panel.view") continue;
    SceneText scene = scene_with(row, "1");
    scene.set(std::string(row.table), fmt::format("{}{}", row.key.substr(0, 2), row.key.substr(3)), "1");
    const std::string complaint = complaint_about(scene);
    CAPTURE(named(row), complaint);
    CHECK(contains(complaint, fmt::format("did you mean \"{}\"?", row.key)));
  }
}

TEST_CASE("A key in the wrong table is shown its own table, and the nearest key of the one it stands in",
          "[specimen]") {
  for (const KeyRow& row : key_table()) {
    for (const char* table : {"growth", "look", "lip"}) {
      if (find_key(table, row.key) != nullptr) continue;
      const std::string complaint = complaint_about(SceneText().set(table, std::string(row.key), "1"));
      CAPTURE(named(row), table, complaint);
      CHECK(contains(complaint, fmt::format("unknown key \"{}\" in [{}]; it belongs to ", row.key, table)));
      CHECK(contains(complaint, written_table(row.table)));
      CHECK((contains(complaint, "the nearest known one here is \"") || contains(complaint, "did you mean \"")));
    }
  }
}

TEST_CASE("Every required key is missed at the place of its table, or of the file", "[specimen]") {
  for (const KeyRow& row : key_table()) {
    if (row.fallback != kRequired || row.table == "panel.view") continue;
    SceneText scene = scene_with(row, "1");
    if (row.table == "lamp") scene.set("lamp", "strength", "1");
    if (row.table == "panel") scene.set("panel", "scale", "1");
    scene.drop(std::string(row.table), std::string(row.key));
    const std::string complaint = complaint_about(scene);
    CAPTURE(named(row), complaint);
    CHECK(contains(complaint, fmt::format(":1: {} is missing: state {}", named(row), written_wish(row))));
  }
}
