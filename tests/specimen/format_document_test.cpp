// SPDX-License-Identifier: Apache-2.0
// scenes/FORMAT.md says of every key what the program does with it.
#include "specimen/key_table.h"
#include "specimen/scene_file.h"
#include "support/catch.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <fstream>
#include <iterator>

using namespace whorl::specimen;

namespace {

std::string document() {
  std::ifstream file(std::string(WHORL_SCENE_DIR) + "/FORMAT.md");
  return {std::istreambuf_iterator<char>(file), {}};
}

std::string allowed(const KeyRow& row) {
  switch (row.type) {
    case KeyType::kText: return fmt::format("text of {} to {} characters", row.range.low, row.range.high);
    case KeyType::kColour: return "colour `\"#rrggbb\"`";
    case KeyType::kWord:
    case KeyType::kView: {
      std::vector<std::string> words;
      for (const auto word : words_of(row)) words.push_back(fmt::format("`\"{}\"`", word));
      return fmt::format("{}{}", fmt::join(words, ", "), row.type == KeyType::kView ? ", or a table, see below" : "");
    }
    case KeyType::kBar: return fmt::format("`\"auto\"`, or a number {}", written_range(row));
    case KeyType::kStages: return fmt::format("number or stages, {}", written_range(row));
    case KeyType::kNumbers: return fmt::format("list of numbers, {}", written_range(row));
    case KeyType::kReading: return fmt::format("number, {}, or `\"85 (63)\"`", written_range(row));
    case KeyType::kWhole: return fmt::format("whole number, {}", written_range(row));
    case KeyType::kNumber: return fmt::format("number, {}", written_range(row));
  }
  return {};
}

std::string fallback(const KeyRow& row) {
  if (row.fallback == kRequired) return "**required**";
  if (row.fallback == kNoDefault) return "none";
  if (row.fallback.starts_with('(')) return std::string(row.fallback.substr(1, row.fallback.size() - 2));
  return fmt::format("`{}`", row.fallback);
}

std::string documented(const KeyRow& row) {
  return fmt::format("| `{}` | {} | {} | {} |\n", row.key, allowed(row), fallback(row), row.meaning);
}

}  // namespace

TEST_CASE("The document of the format holds every key with its range, default and meaning, under its table",
          "[specimen]") {
  const std::string text = document();
  REQUIRE(!text.empty());
  for (const KeyRow& row : key_table()) {
    const std::string heading = fmt::format("\n### `{}`\n", row.table.empty() ? "format" : written_table(row.table));
    const std::size_t start = text.find(heading);
    CAPTURE(heading, documented(row));
    REQUIRE(start != std::string::npos);
    const std::size_t end = text.find("\n### ", start + 1);
    CHECK(text.substr(start, end - start).find(documented(row)) != std::string::npos);
  }
}

TEST_CASE("The document of the format holds no row that the program does not know", "[specimen]") {
  const std::string text = document();
  std::size_t rows = 0;
  for (std::size_t at = text.find("\n| `"); at != std::string::npos; at = text.find("\n| `", at + 1)) ++rows;
  CHECK(rows == key_table().size());
}

TEST_CASE("The example in the document of the format is a scene without faults", "[specimen]") {
  const std::string text = document();
  const std::size_t start = text.find("```toml\nformat = 1");
  REQUIRE(start != std::string::npos);
  const std::size_t first = start + 8;
  const Specimen specimen = parse_scene(text.substr(first, text.find("```", first) - first), "example");
  CHECK(specimen.growth.whorls == 6.0);
  CHECK(specimen.plate.panels.size() == 3);
}
