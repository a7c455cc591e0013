// SPDX-License-Identifier: Apache-2.0
// Asks a program that the tests did not build.
#include "support/independent_reader.h"

#include "support/catch.h"

#include <cstdio>

#include <sys/wait.h>

namespace whorl::support {
namespace {

SecondOpinion run(const std::string& line) {
  SecondOpinion opinion;
  FILE* pipe = popen((line + " 2>&1").c_str(), "r");
  REQUIRE(pipe != nullptr);
  char bytes[4096];
  for (std::size_t got = 0; (got = fread(bytes, 1, sizeof bytes, pipe)) > 0;) opinion.words.append(bytes, got);
  const int status = pclose(pipe);
  opinion.code = WIFEXITED(status) ? WEXITSTATUS(status) : 128;
  return opinion;
}

}  // namespace

std::optional<SecondOpinion> ask(const std::string& command, const std::filesystem::path& path) {
  const std::string program = command.substr(0, command.find(' '));
  if (run("command -v " + program).code != 0) {
    WARN(program << " is not installed: " << path.extension().string() << " files get no second opinion");
    return std::nullopt;
  }
  return run(command + " '" + path.string() + "'");
}

}  // namespace whorl::support
