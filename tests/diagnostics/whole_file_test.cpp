// SPDX-License-Identifier: Apache-2.0
// Files appear whole or not at all.
#include "diagnostics/error.h"
#include "diagnostics/whole_file.h"
#include "support/catch.h"
#include "support/program.h"

#include <fmt/format.h>

#include <fstream>
#include <memory>
#include <thread>
#include <vector>

#include <unistd.h>

using namespace whorl::diagnostics;
using whorl::support::read_file;
using whorl::support::ScratchFolder;

namespace {

std::vector<std::string> names_in(const std::filesystem::path& folder) {
  std::vector<std::string> names;
  for (const auto& entry : std::filesystem::directory_iterator(folder))
    names.push_back(entry.path().filename().string());
  return names;
}

std::string trouble_with(const std::filesystem::path& path) {
  try {
    write_whole_file(path, "x");
  } catch (const FileTrouble& error) {
    return error.what();
  }
  return "none";
}

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

}  // namespace

TEST_CASE("A whole file holds the bytes given, and nothing else is left beside it", "[diagnostics]") {
  const ScratchFolder folder;
  const std::string bytes("with\0zero\n\xFF", 11);
  write_whole_file(folder.path() / "a.txt", bytes);
  CHECK(read_file(folder.path() / "a.txt") == bytes);
  write_whole_file(folder.path() / "a.txt", "");
  CHECK(read_file(folder.path() / "a.txt").empty());
  CHECK(names_in(folder.path()) == std::vector<std::string>{"a.txt"});
}

TEST_CASE("A file in the making stands beside its final place, hidden, with its extension", "[diagnostics]") {
  const ScratchFolder folder;
  const WholeFile file(folder.path() / "tall.b.png");
  CHECK(file.working_path() == folder.path() / fmt::format(".tall.b.{}.part.png", getpid()));
  CHECK(std::filesystem::exists(file.working_path()));
  CHECK_FALSE(std::filesystem::exists(folder.path() / "tall.b.png"));
}

TEST_CASE("A file that is not committed leaves the earlier one untouched and nothing beside it", "[diagnostics]") {
  const ScratchFolder folder;
  const std::filesystem::path path = folder.with_file("a.txt", "earlier");
  {
    const WholeFile file(path);
    std::ofstream(file.working_path()) << "half";
  }
  CHECK(read_file(path) == "earlier");
  CHECK(names_in(folder.path()).size() == 1);
}

TEST_CASE("A committed file replaces the earlier one; a second commit changes nothing", "[diagnostics]") {
  const ScratchFolder folder;
  const std::filesystem::path path = folder.with_file("a.txt", "earlier");
  WholeFile file(path);
  std::ofstream(file.working_path()) << "later";
  file.commit();
  CHECK(read_file(path) == "later");
  CHECK_NOTHROW(file.commit());
  CHECK(names_in(folder.path()).size() == 1);
}

TEST_CASE("A library may replace the working file before the commit", "[diagnostics]") {
  const ScratchFolder folder;
  WholeFile file(folder.path() / "a.txt");
  std::filesystem::remove(file.working_path());
  std::ofstream(file.working_path()) << "anew";
  file.commit();
  CHECK(read_file(folder.path() / "a.txt") == "anew");
}

TEST_CASE("Where the working file has gone, the commit says so and the earlier file stays", "[diagnostics]") {
  const ScratchFolder folder;
  const std::filesystem::path path = folder.with_file("a.txt", "earlier");
  WholeFile file(path);
  std::filesystem::remove(file.working_path());
  CHECK_THROWS_AS(file.commit(), FileTrouble);
  CHECK(read_file(path) == "earlier");
}

TEST_CASE("Places that cannot be written are file trouble that names the file and the reason", "[diagnostics]") {
  const ScratchFolder folder;
  const std::string file = folder.with_file("file", "kept");
  CHECK(contains(trouble_with(folder.path() / "missing" / "a.txt"), "missing: No such file or directory"));
  CHECK(contains(trouble_with(file + "/a.txt"), "Not a directory"));
  CHECK(contains(trouble_with(folder.path()), "there is a folder of that name"));
  CHECK(contains(trouble_with(folder.path() / ""), "this names a folder"));
  CHECK(contains(trouble_with(""), "this names a folder"));
  CHECK(contains(trouble_with(folder.path() / std::string(300, 'n')), "File name too long"));
  CHECK(contains(trouble_with("/dev/null"), "something other than a plain file"));
  CHECK(names_in(folder.path()).size() == 1);
}

TEST_CASE("One file is not written twice at a time, but again afterwards", "[diagnostics]") {
  const ScratchFolder folder;
  {
    const WholeFile file(folder.path() / "a.txt");
    CHECK(contains(trouble_with(folder.path() / "a.txt"), "this program is writing it already"));
    CHECK(std::filesystem::exists(file.working_path()));
  }
  CHECK(trouble_with(folder.path() / "a.txt") == "none");
}

TEST_CASE("A working file left by a killed process of the same number is replaced", "[diagnostics]") {
  const ScratchFolder folder;
  folder.with_file(fmt::format(".a.{}.part.txt", getpid()), "left over, and longer than the new one");
  write_whole_file(folder.path() / "a.txt", "new");
  CHECK(read_file(folder.path() / "a.txt") == "new");
  CHECK(names_in(folder.path()).size() == 1);
}

TEST_CASE("Many threads write many files, and every one is whole", "[diagnostics]") {
  const ScratchFolder folder;
  std::vector<std::thread> threads;
  for (int t = 0; t < 4; ++t) {
    threads.emplace_back([t, &folder] {
      for (int i = 0; i < 50; ++i) {
        const std::string name = fmt::format("{}_{}.txt", t, i);
        if (i % 5 == 4) {
          const WholeFile given_up(folder.path() / name);
        } else {
          write_whole_file(folder.path() / name, name);
        }
      }
    });
  }
  for (std::thread& thread : threads) thread.join();
  const auto names = names_in(folder.path());
  CHECK(names.size() == 4 * 40);
  for (const std::string& name : names) CHECK(read_file(folder.path() / name) == name);
}

TEST_CASE("A reader sees the earlier file or the later one, never half of one", "[diagnostics]") {
  const ScratchFolder folder;
  const std::filesystem::path path = folder.path() / "a.txt";
  const std::string even(200'000, 'e'), odd(100'000, 'o');
  write_whole_file(path, even);
  std::thread writer([&] {
    for (int i = 0; i < 40; ++i) write_whole_file(path, i % 2 == 0 ? odd : even);
  });
  bool whole = true;
  for (int i = 0; i < 200; ++i) {
    std::ifstream file(path, std::ios::binary);
    const std::string seen{std::istreambuf_iterator<char>(file), {}};
    whole = whole && (seen == even || seen == odd);
  }
  writer.join();
  CHECK(whole);
}
