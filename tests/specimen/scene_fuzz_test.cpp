// SPDX-License-Identifier: Apache-2.0
// Mutations of sound scenes, the same in every run: the reader accepts or refuses, and does nothing else.
#include "diagnostics/error.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

#include <array>
#include <cmath>
#include <cstdint>
#include <random>

using namespace whorl::specimen;
using whorl::support::SceneText;

namespace {

// Scraps that have upset parsers of numbers, texts and tables.
const std::array<const char*, 36> kScraps{"nan",
                                          "-inf",
                                          "1e999",
                                          "-0.0",
                                          "0x7fffffffffffffff",
                                          "9223372036854775808",
                                          "1_0",
                                          "''",
                                          "\"\"",
                                          "\"\"\"",
                                          "[[",
                                          "]]",
                                          "[",
                                          "]",
                                          "{",
                                          "}",
                                          "=",
                                          ".",
                                          ",",
                                          "\n",
                                          "\r",
                                          "#",
                                          "\\u0000",
                                          "\xC3",
                                          "\xEF\xBB\xBF",
                                          "true",
                                          "1979-05-27T07:32:00Z",
                                          "[[panel]]\n",
                                          "format = 2\n",
                                          "a.b.c = 1\n",
                                          "\xC3\xB6",
                                          "\xCC\xA0",
                                          "\xE2\x80\x9C",
                                          "[&]\n",
                                          "'''",
                                          "\\"};

/// The same things said in all the ways that TOML has.
const char* const kManyWays =
    "\xEF\xBB\xBF# Schneckenhaus, gr\xC3\xB6\xC3\x9F"
    "er\r\n"
    "format = 0x1\n"
    "specimen.name = \"\"\"\\\n  K\xC3\xA4"
    "ferchen \\u00B5 \"eins\" \"\"\"\n"
    "specimen.\"coiling\" = 'dextral'   # rechts\n"
    "wall = { 'thickness' = 4.5e-1, growth = \"constant\" }\n"
    "lamp = [ { radius = 0.2 }, { radius = 0.1, behind_lip = 1 } ]\n"
    "[ growth ]\n"
    "whorls = +6\nW = [ # Stufen\n  [ 0, 1.5 ],\n  [ 4.0, 1_0.0 ],\n]\nD = -0.0\nT = 20e-1\n"
    "[size]\r\n\"aperture_width\" = 8.5\r\n"
    "[[ section . lobe ]]\nat = 6\nreach = 0.1\n"
    "[[panel]]\nview = { azimuth = 1, elevation = 2 }\n[[panel]]\nview = '''axial section'''\n";

class Mutator {
 public:
  explicit Mutator(std::uint64_t seed) : random_(seed) {}

  std::string mutated(std::string text) {
    const std::size_t changes = 1 + below(4);
    for (std::size_t i = 0; i < changes; ++i) change(text);
    return text;
  }

 private:
  // Not std::uniform_int_distribution, which differs between libraries.
  std::size_t below(std::size_t bound) { return bound == 0 ? 0 : static_cast<std::size_t>(random_() % bound); }

  void change(std::string& text) {
    const std::size_t at = below(text.size() + 1), length = below(12);
    switch (below(12)) {
      case 0: text.insert(at, kScraps[below(kScraps.size())]); break;
      case 1: text.replace(at, length, kScraps[below(kScraps.size())]); break;
      case 2: text.erase(at, length); break;
      case 3: text.insert(at, text.substr(below(text.size() + 1), 8 * length)); break;
      case 4:
        if (at < text.size()) text[at] = static_cast<char>(below(256));
        break;
      case 5:
        if (at < text.size()) text[at] = static_cast<char>(static_cast<unsigned char>(text[at]) ^ (1u << below(8)));
        break;
      case 6: replace_value(text, at); break;
      default: change_digit(text, at); break;
    }
  }

  void change_digit(std::string& text, std::size_t at) {
    const std::size_t digit = text.find_first_of("0123456789", at);
    if (digit != std::string::npos) text[digit] = static_cast<char>('0' + below(10));
  }

  /// What stands behind the next equals sign becomes a scrap.
  void replace_value(std::string& text, std::size_t at) {
    const std::size_t sign = text.find("= ", at);
    if (sign == std::string::npos) return;
    text.replace(sign + 2, text.find('\n', sign) - sign - 2, kScraps[below(kScraps.size())]);
  }

  std::mt19937_64 random_;  // its sequence is fixed by the C++ standard
};

/// What later stages rest on.
bool is_sound(const Specimen& s) {
  bool sound = s.growth.whorls >= 0.5 && s.growth.whorls <= 40.0 && s.growth.D < 1.0 && s.growth.T >= 0.0 &&
               !s.growth.W.value.empty() && s.growth.start <= s.growth.whorls - 0.25 && s.size.mm > 0.0 &&
               s.wall.thickness_mm > 0.0 && s.lip.thickness_mm > 0.0 && s.wall.thickness_mm < 0.5 * s.size.mm &&
               s.plate.columns >= 1 && !s.plate.panels.empty() && !s.identity.name.value.empty();
  for (const Stage& stage : s.growth.W.value) sound = sound && stage.W > 1.0 && std::isfinite(stage.W);
  for (const Panel& panel : s.plate.panels) sound = sound && panel.scale >= 0.1 && std::isfinite(panel.azimuth_deg);
  for (const Lamp& lamp : s.lamps) sound = sound && lamp.radius_mm > 0.0 && lamp.temperature_k >= 1000.0;
  return sound;
}

}  // namespace

TEST_CASE("20,000 mutations of sound scenes are read as sound specimens or refused with at least one fault",
          "[specimen][fuzz]") {
  const std::array<std::string, 3> sound{SceneText().text(), SceneText::with_every_key().text(), kManyWays};
  for (const std::string& text : sound) REQUIRE_NOTHROW(parse_scene(text, "sound"));
  Mutator mutator(20240501);
  int accepted = 0, refused = 0;
  for (int i = 0; i < 20000; ++i) {
    const std::string text = mutator.mutated(sound[static_cast<std::size_t>(i % 3)]);
    try {
      const Specimen specimen = parse_scene(text, "mutation");
      ++accepted;
      if (!is_sound(specimen)) FAIL("accepted, but not sound:\n" << text);
    } catch (const whorl::diagnostics::InvalidInput& error) {
      ++refused;
      if (error.problems().empty()) FAIL("refused without a fault:\n" << text);
    } catch (const std::exception& error) {
      FAIL("mutation " << i << " ended with " << error.what() << ":\n" << text);
    }
  }
  // Both happen often, or the mutations test nothing.
  CHECK(accepted > 1000);
  CHECK(refused > 1000);
}
