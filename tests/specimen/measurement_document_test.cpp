// SPDX-License-Identifier: Apache-2.0
// scenes/MEASUREMENTS.md says of every key and every definition what the program does with it.
#include "specimen/key_table.h"
#include "specimen/measurement_file.h"
#include "support/catch.h"

#include <fmt/format.h>

#include <fstream>
#include <iterator>

using namespace whorl::specimen;

namespace {

std::string document() {
  std::ifstream file(std::string(WHORL_SCENE_DIR) + "/MEASUREMENTS.md");
  return {std::istreambuf_iterator<char>(file), {}};
}

}  // namespace

TEST_CASE("The document of measurements holds every key with its meaning, under its table", "[specimen]") {
  const std::string text = document();
  REQUIRE(!text.empty());
  for (const KeyRow& row : measurement_key_table()) {
    const std::string heading = fmt::format("\n### `{}`\n", row.table.empty() ? "format" : written_table(row.table));
    const std::size_t start = text.find(heading);
    CAPTURE(heading, row.key);
    REQUIRE(start != std::string::npos);
    const std::string part = text.substr(start, text.find("\n### ", start + 1) - start);
    const std::size_t line = part.find(fmt::format("\n| `{}` | ", row.key));
    REQUIRE(line != std::string::npos);
    CHECK(part.substr(line + 1, part.find('\n', line + 1) - line - 1).ends_with(fmt::format("| {} |", row.meaning)));
  }
}

TEST_CASE("The document of measurements holds every definition with its abbreviations and meaning", "[specimen]") {
  const std::string text = document();
  std::size_t rows = 0;
  for (const DefinitionRow& row : all_definitions()) {
    std::string abbreviations(row.abbreviations);
    for (std::size_t bar; (bar = abbreviations.find('|')) != std::string::npos;) abbreviations.replace(bar, 1, ", ");
    CAPTURE(row.quantity, row.definition);
    CHECK(text.find(fmt::format("\n| `{}` | `{}` | {} | {} | {} |\n", row.quantity, row.definition, abbreviations,
                                row.at_stages ? "yes" : "no", row.meaning)) != std::string::npos);
    CHECK(&row_of(row.id) == &row);  // the catalogue is in the order of the enumeration
    ++rows;
  }
  std::size_t written = 0;
  for (std::size_t at = text.find("\n| `"); at != std::string::npos; at = text.find("\n| `", at + 1)) ++written;
  CHECK(written == rows + measurement_key_table().size());
}

TEST_CASE("The example in the document of measurements is read without faults", "[specimen]") {
  const std::string text = document();
  const std::size_t start = text.find("```toml\nformat = 1") + 8;
  const MeasurementFile file = parse_measurements(text.substr(start, text.find("```", start) - start), "example.toml");
  REQUIRE(file.specimens.size() == 1);
  CHECK(file.specimens[0].readings.size() == 9);
  CHECK(file.specimens[0].series.size() == 1);
}
