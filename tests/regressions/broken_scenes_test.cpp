// SPDX-License-Identifier: Apache-2.0
// Replays every broken scene file of this folder: each is refused with the message that its first line expects.
#include "diagnostics/error.h"
#include "specimen/scene_file.h"
#include "support/catch.h"

#include <filesystem>
#include <fstream>
#include <iterator>
#include <map>
#include <string>
#include <vector>

using whorl::specimen::parse_scene;
using whorl::specimen::read_scene_file;

namespace {

const std::filesystem::path kFolder = std::filesystem::path(WHORL_TEST_DIR) / "regressions";
const std::string kMark = "# expect: ";

// Files that cannot hold a comment, or would be sound with one.
const std::map<std::string, std::string> kExpectedElsewhere{
    {"blank.toml", "blank.toml: the file is blank"},
    {"byte_order_mark_alone.toml", "the file is blank"},
    {"empty.toml", "empty.toml: the file is empty; a scene begins with the line: format = 1"},
    {"picture.toml", "the file holds a NUL byte: it is binary, not a text"},
    {"utf16.toml", "the file is UTF-16; save it with the encoding UTF-8"},
};

std::vector<std::filesystem::path> scenes_in(const std::filesystem::path& folder) {
  std::vector<std::filesystem::path> paths;
  for (const auto& entry : std::filesystem::directory_iterator(folder)) {
    if (entry.path().extension() == ".toml") paths.push_back(entry.path());
  }
  return paths;
}

std::string bytes_of(const std::filesystem::path& path) {
  std::ifstream file(path, std::ios::binary);
  return {std::istreambuf_iterator<char>(file), {}};
}

std::string expected_of(const std::filesystem::path& path) {
  const auto elsewhere = kExpectedElsewhere.find(path.filename().string());
  if (elsewhere != kExpectedElsewhere.end()) return elsewhere->second;
  const std::string text = bytes_of(path);
  const std::string first_line = text.substr(0, text.find('\n'));
  return first_line.rfind(kMark, 0) == 0 ? first_line.substr(kMark.size()) : "";
}

std::string complaint_about(const std::filesystem::path& path) {
  try {
    read_scene_file(path.string());
  } catch (const whorl::diagnostics::InvalidInput& error) {
    return error.what();
  }
  return "nothing";
}

}  // namespace

TEST_CASE("Every broken scene file is refused with the message that it expects", "[specimen][regressions]") {
  const auto paths = scenes_in(kFolder);
  CHECK(paths.size() >= 45);
  for (const auto& path : paths) {
    const std::string expected = expected_of(path);
    CAPTURE(path.string(), expected);
    REQUIRE(!expected.empty());
    const std::string complaint = complaint_about(path);
    CAPTURE(complaint);
    CHECK(complaint.find(expected) != std::string::npos);
  }
}

TEST_CASE("Every message of a broken scene file begins with file, line and column, in the order of the lines",
          "[specimen][regressions]") {
  for (const auto& path : scenes_in(kFolder)) {
    const std::string text = bytes_of(path);
    try {
      parse_scene(text, "named.toml");
      FAIL("accepted: " << path.string());
    } catch (const whorl::diagnostics::InvalidInput& error) {
      CHECK(error.code() == whorl::diagnostics::ExitCode::kInvalidInput);
      CHECK(std::string(error.what()).rfind("named.toml:", 0) == 0);
      const auto lines = 1 + std::count(text.begin(), text.end(), '\n');
      std::uint32_t before = 0;
      for (const auto& problem : error.problems()) {
        CAPTURE(path.string(), problem.message, problem.where.line);
        CHECK(problem.where.line >= before);
        CHECK(problem.where.line <= lines);
        before = problem.where.line;
      }
    }
  }
}

TEST_CASE("Scenes that only geometry finds wrong are accepted by the reader and say what they expect of it",
          "[specimen][regressions]") {
  const auto paths = scenes_in(kFolder / "geometry");
  CHECK(paths.size() >= 3);
  for (const auto& path : paths) {
    CAPTURE(path.string());
    CHECK(!expected_of(path).empty());
    CHECK_NOTHROW(read_scene_file(path.string()));
  }
}
