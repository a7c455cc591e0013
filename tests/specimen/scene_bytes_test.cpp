// SPDX-License-Identifier: Apache-2.0
// Files that are missing, too large, or no text; lines and lists without end.
#include "diagnostics/error.h"
#include "specimen/scene_file.h"
#include "specimen/text_check.h"
#include "support/catch.h"
#include "support/program.h"
#include "support/scene_text.h"

#include <fmt/format.h>

#include <filesystem>
#include <fstream>

#include <fcntl.h>
#include <unistd.h>

using namespace whorl::specimen;
using namespace whorl::diagnostics;
using whorl::support::complaint_about;
using whorl::support::SceneText;
using whorl::support::ScratchFolder;

namespace {

std::string trouble_with(const std::string& path) {
  try {
    read_scene_file(path);
  } catch (const FileTrouble& error) {
    CHECK(error.code() == ExitCode::kFileTrouble);
    return error.what();
  }
  return "none";
}

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

std::string repeated(const std::string& part, std::size_t times) {
  std::string all;
  for (std::size_t i = 0; i < times; ++i) all += part;
  return all;
}

}  // namespace

TEST_CASE("A file that is missing, a folder, or below a file is file trouble, and the message says which",
          "[specimen]") {
  const ScratchFolder folder;
  const std::string missing = (folder.path() / "missing.toml").string();
  const std::string file = folder.with_file("file.toml", SceneText().text());
  CHECK(trouble_with(missing) == fmt::format("cannot open {}: No such file or directory", missing));
  CHECK(trouble_with(folder.path().string()) ==
        fmt::format("cannot read {}: it is a folder; a file is wanted", folder.path().string()));
  CHECK(contains(trouble_with(file + "/below.toml"), "Not a directory"));
  CHECK(trouble_with("") == "cannot open : No such file or directory");
  CHECK(read_scene_file(file).source == file);
}

TEST_CASE("A file of 50 MB is refused without being read whole", "[specimen]") {
  const ScratchFolder folder;
  const std::string path = folder.with_file("large.toml", SceneText().text());
  std::filesystem::resize_file(path, 50'000'000);  // the rest reads as NUL bytes; the size is what is complained of
  try {
    read_scene_file(path);
    FAIL("accepted");
  } catch (const InvalidInput& error) {
    CHECK(error.what() ==
          path + ": the file is larger than 1 MiB; a scene file has a few thousand bytes, is this the right file?");
  }
}

TEST_CASE("Exactly 1 MiB is read, one byte more is not", "[specimen]") {
  std::string text = SceneText().text();
  while (text.size() < 1024 * 1024)
    text += repeated("#", std::min<std::size_t>(1024 * 1024 - text.size() - 1, 4000)) + "\n";
  REQUIRE(text.size() == 1024 * 1024);
  CHECK(complaint_about(text) == "");
  CHECK(contains(complaint_about(text + "\n"), "larger than 1 MiB"));
}

TEST_CASE("The name - reads standard input", "[specimen]") {
  const ScratchFolder folder;
  const int scene = open(folder.with_file("in", SceneText().text()).c_str(), O_RDONLY);
  const int kept = dup(STDIN_FILENO);
  dup2(scene, STDIN_FILENO);
  const Specimen specimen = read_scene_file("-");
  dup2(kept, STDIN_FILENO);
  close(kept);
  close(scene);
  CHECK(specimen.source == "-");
  CHECK(specimen.growth.whorls == 7.25);
}

TEST_CASE("A byte order mark and line ends of both kinds are read", "[specimen]") {
  std::string text = SceneText().text();
  CHECK(complaint_about("\xEF\xBB\xBF" + text) == "");
  for (std::size_t at = 0; (at = text.find('\n', at)) != std::string::npos; at += 2) text.replace(at, 1, "\r\n");
  CHECK(complaint_about(text) == "");
}

TEST_CASE("UTF-8 is well-formed exactly where table 3-7 of the Unicode Standard says so", "[specimen]") {
  for (const char* good : {"", "a", "\x7F", "\xC2\x80", "\xDF\xBF", "\xE0\xA0\x80", "\xED\x9F\xBF", "\xEE\x80\x80",
                           "\xEF\xBF\xBF", "\xF0\x90\x80\x80", "\xF4\x8F\xBF\xBF"}) {
    CAPTURE(good);
    CHECK_FALSE(first_bad_byte(good));
  }
  for (const char* bad : {"\x80", "\xBF", "\xC0\x80", "\xC1\xBF", "\xC2", "\xC2\x7F", "\xC2\xC0", "\xE0\x9F\xBF",
                          "\xE0\xA0", "\xED\xA0\x80", "\xED\xBF\xBF", "\xF0\x8F\xBF\xBF", "\xF4\x90\x80\x80",
                          "\xF5\x80\x80\x80", "\xFF", "\xF0\x90\x80"}) {
    CAPTURE(bad);
    CHECK(first_bad_byte(bad) == 0u);
  }
  CHECK(first_bad_byte("ab\xE9") == 2u);
  CHECK(count_characters("a\xC2\xB5\xE2\x82\xAC\xF0\x9F\x90\x9A") == 4);
}

TEST_CASE("Texts of the greatest length pass, longer ones and control characters of both sets do not", "[specimen]") {
  const auto named = [](const std::string& name) {
    return complaint_about(SceneText().set("specimen", "name", '"' + name + '"'));
  };
  CHECK(named(repeated("ü", 200)) == "");
  CHECK(contains(named(repeated("ü", 201)), "has 201 characters; must be at most 200"));
  CHECK(contains(named(""), "is blank"));
  for (const char* control : {"\\t", "\\n", "\\u0000", "\\u001B", "\\u007F", "\\u0080", "\\u009B"}) {
    CAPTURE(control);
    CHECK(contains(named(std::string("a") + control), "holds a control character"));
  }
  CHECK(named("\\u00A0b") == "");
  const auto noted = [](std::size_t length) {
    return complaint_about(SceneText().set("specimen", "note", '"' + std::string(length, 'n') + '"'));
  };
  CHECK(noted(2000) == "");
  CHECK(contains(noted(2001), "must be at most 2000"));
}

TEST_CASE("Messages hold no control characters, whatever the file holds", "[specimen]") {
  const std::string hostile = "\"\\u001b[2J\\u009b\\u0007\"";
  SceneText scene;
  scene.set("specimen", "coiling", hostile)
      .set("look", "exterior", hostile)
      .set("wall", hostile, "1")
      .set("", hostile, "1");
  const std::string complaint = complaint_about(scene);
  CHECK(contains(complaint, "\\x1b[2J\\x9b\\x07"));
  for (const char c : complaint) CHECK((c == '\n' || static_cast<unsigned char>(c) >= 0x20));
}

TEST_CASE("Lines, tables in tables and lists without end are refused, not followed", "[specimen]") {
  CHECK(contains(complaint_about(SceneText().text() + "# " + std::string(8191, 'x')),
                 "this line has 8193 bytes; a line may have at most 8192"));
  const std::string deep = repeated("a.", 4000) + "a";
  CHECK(contains(complaint_about("[" + deep + "]\n" + deep + " = 1\n"), "unknown table \"a\""));
  CHECK(contains(complaint_about("a = " + repeated("[", 4000)), "this is not TOML"));
  CHECK(contains(complaint_about("a = " + repeated("{a=", 2500)), "this is not TOML"));
  CHECK(contains(complaint_about(SceneText().text() + repeated("[[panel]]\nview = \"apical\"\n", 65)),
                 "65 times [[panel]]; at most 64 are allowed"));
  std::string stages = "[[0, 2]";
  for (int i = 1; i <= 100; ++i) stages += fmt::format(", [{}, 2]", 0.1 * i);
  CHECK(contains(complaint_about(SceneText().set("growth", "W", stages + "]")), "101 stages; at most 100 are allowed"));
}

TEST_CASE("A mebibyte of unknown keys is answered key by key", "[specimen]") {
  std::string text = SceneText().text();
  std::size_t added = 0;
  for (; text.size() < 1'000'000; ++added) text += fmt::format("key{:040} = 1\n", added);
  CHECK(whorl::support::problems_of(text).size() == added);
}
