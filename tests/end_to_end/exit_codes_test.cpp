// SPDX-License-Identifier: Apache-2.0
// The exit codes and streams that users' scripts rest on, asked of the built program.
#include "support/catch.h"
#include "support/program.h"

#include <algorithm>
#include <filesystem>
#include <set>
#include <sstream>

using namespace whorl::support;
namespace fs = std::filesystem;

namespace {

const std::string kValid =
    "format = 1\n[specimen]\nname = \"Cochlidion argutum\"\ncoiling = \"dextral\"\n"
    "[growth]\nwhorls = 5.0\nW = 1.8\nD = 0.1\nT = 2.0\n[section]\nS = 1.1\n[size]\nshell_height = 20.0\n"
    "[wall]\nthickness = 0.4\n[[panel]]\nview = \"apertural\"\n";

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

std::vector<std::string> lines_of(const std::string& text) {
  std::istringstream stream(text);
  std::vector<std::string> lines;
  for (std::string line; std::getline(stream, line);) lines.push_back(line);
  return lines;
}

/// What a regression file says of its message: its first line is "# expect: words".
std::string expected_words(const std::string& text) {
  const std::string mark = "# expect: ", first = text.substr(0, text.find('\n'));
  return first.compare(0, mark.size(), mark) == 0 ? first.substr(mark.size()) : "";
}

std::vector<fs::path> regression_files() {
  std::vector<fs::path> files;
  for (const auto& entry : fs::recursive_directory_iterator(fs::path(WHORL_TEST_DIR) / "regressions")) {
    if (entry.path().extension() == ".toml") files.push_back(entry.path());
  }
  std::sort(files.begin(), files.end());
  return files;
}

void expect_only_errors(const Ran& ran) {
  CHECK(ran.out.empty());
  CHECK_FALSE(ran.err.empty());
  for (const std::string& line : lines_of(ran.err)) CHECK(line.compare(0, 7, "error: ") == 0);
}

}  // namespace

TEST_CASE("A faulty scene file ends with 3 and a message of its own, and nothing is written", "[end_to_end]") {
  std::set<std::string> messages;
  const std::vector<fs::path> files = regression_files();
  CHECK_FALSE(files.empty());
  for (const fs::path& file : files) {
    const ScratchFolder folder;
    const fs::path out = folder.path() / "out";
    const Ran ran = run_program({"plate", file.string(), "-o", out.string(), "--quality", "draft", "--quiet"});
    INFO(file.string() << "\n" << ran.err);
    CHECK(ran.code == 3);
    expect_only_errors(ran);
    CHECK(contains(ran.err, file.filename().string()));
    CHECK(contains(ran.err, expected_words(read_file(file))));
    CHECK((!fs::exists(out) || fs::is_empty(out)));
    CHECK(messages.insert(ran.err).second);
  }
}

TEST_CASE("check and measure refuse what plate refuses, with the same words", "[end_to_end]") {
  // One fault of the text, one of the values, one of the geometry.
  for (const char* name : {"text_not_closed.toml", "W_one.toml", "geometry/whorls_cross_the_axis.toml"}) {
    const std::string file = (fs::path(WHORL_TEST_DIR) / "regressions" / name).string();
    const ScratchFolder folder;
    const Ran plate = run_program({"plate", file, "-o", folder.path().string(), "--quiet"});
    for (const std::string command : {"check", "measure"}) {
      const Ran ran = run_program({command, file, "--quiet"});
      INFO(command << " " << file << "\n" << ran.err);
      CHECK(ran.code == 3);
      expect_only_errors(ran);
      CHECK(ran.err == plate.err);
    }
  }
}

TEST_CASE("A file that cannot be read ends with 6 and is named", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string missing = (folder.path() / "missing.toml").string();
  // /proc/self/mem opens, but reading its start is an error (proc(5)).
  for (const std::string& path : {missing, folder.path().string(), missing + "/below.toml", std::string("/proc/self/mem")}) {
    const Ran ran = run_program({"check", path});
    INFO(path << "\n" << ran.err);
    CHECK(ran.code == 6);
    expect_only_errors(ran);
    CHECK(contains(ran.err, path));
  }
  for (const std::vector<std::string>& words :
       {std::vector<std::string>{"plate", missing, "--quiet"}, {"measure", missing}, {"turntable", missing, "-o", missing}}) {
    const Ran ran = run_program(words);
    INFO(words.front() << "\n" << ran.err);
    CHECK(ran.code == 6);
    CHECK(contains(ran.err, missing));
  }
}

TEST_CASE("A file without the right to read it ends with 6", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string path = folder.with_file("locked.toml", kValid);
  fs::permissions(path, fs::perms::none);
  if (run_program({"check", path}).code == 0) return;  // an administrator may read everything
  const Ran ran = run_program({"check", path});
  CHECK(ran.code == 6);
  CHECK(contains(ran.err, "Permission denied"));
}

TEST_CASE("An output folder that cannot be made ends with 6", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", kValid);
  const Ran ran = run_program({"plate", scene, "-o", scene + "/out", "--quality", "draft", "--quiet"});
  INFO(ran.err);
  CHECK(ran.code == 6);
  expect_only_errors(ran);
}

TEST_CASE("Wrong usage ends with 2 and one line", "[end_to_end]") {
  for (const std::vector<std::string>& words :
       {std::vector<std::string>{}, {"plate"}, {"check", "a", "--threads", "many"}}) {
    const Ran ran = run_program(words);
    INFO(ran.err);
    CHECK(ran.code == 2);
    expect_only_errors(ran);
    CHECK(lines_of(ran.err).size() == 1);
    CHECK(contains(ran.err, "--help'"));
  }
}

TEST_CASE("What was asked for goes to standard output, and 0 says that it is there", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string scene = folder.with_file("a.toml", kValid);
  for (const std::vector<std::string>& words :
       {std::vector<std::string>{"--version"}, {"plate", "--help"}, {"check", scene}}) {
    const Ran ran = run_program(words);
    INFO(ran.err);
    CHECK(ran.code == 0);
    CHECK_FALSE(ran.out.empty());
    CHECK(ran.err.empty());
  }
}

TEST_CASE("A dash reads the scene from standard input", "[end_to_end]") {
  const Ran good = run_program({"check", "-"}, {kValid, {}, false, ""});
  INFO(good.err);
  CHECK(good.code == 0);
  CHECK(contains(good.out, "standard input: valid"));
  const Ran bad = run_program({"check", "-"}, {kValid + "\n[size]\n", {}, false, ""});
  CHECK(bad.code == 3);
  expect_only_errors(bad);
}

TEST_CASE("Results that do not arrive end with 6, not with 0", "[end_to_end]") {
  const Ran ran = run_program({"--version"}, {"", {}, false, "/dev/full"});
  CHECK(ran.code == 6);
  CHECK(contains(ran.err, "standard output"));
}
