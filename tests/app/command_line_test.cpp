// SPDX-License-Identifier: Apache-2.0
// The command line: what is understood, and what is said about what is not.
#include "app/command_line.h"
#include "diagnostics/error.h"
#include "support/catch.h"

#include <algorithm>

using namespace whorl::app;
using Words = std::vector<std::string>;

namespace {

Options options_of(const Words& words) { return std::get<Options>(read_command_line(words)); }
std::string answer_to(const Words& words) { return std::get<Answer>(read_command_line(words)).text; }

std::string complaint_about(const Words& words) {
  try {
    read_command_line(words);
  } catch (const whorl::diagnostics::UsageError& error) {
    return error.what();
  }
  return "nothing";
}

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

}  // namespace

TEST_CASE("The common options mean the same before and behind the command", "[app]") {
  const Words common{"--threads", "3", "--seed", "18446744073709551615", "--exact", "--quiet"};
  const Words command{"plate", "tall.toml", "-o", "out", "--quality", "proof", "--only", "B"};
  Words before = common, behind = command;
  before.insert(before.end(), command.begin(), command.end());
  behind.insert(behind.end(), common.begin(), common.end());
  for (const Words& words : {before, behind}) {
    const Options options = options_of(words);
    CHECK(options.command == Command::kPlate);
    CHECK(options.scene == "tall.toml");
    CHECK(options.out == "out");
    CHECK(options.quality == whorl::specimen::Quality::kProof);
    CHECK(options.only_panel == "B");
    CHECK(options.threads == 3);
    CHECK(options.seed == 18446744073709551615u);
    CHECK(options.exact);
    CHECK(options.quiet);
  }
}

TEST_CASE("What is not given keeps its stated default", "[app]") {
  const Options options = options_of({"plate", "tall.toml"});
  CHECK(options.out == ".");
  CHECK_FALSE(options.quality.has_value());
  CHECK_FALSE(options.only_panel.has_value());
  CHECK(options.threads == 0);
  CHECK(options.seed == 0);
  CHECK_FALSE(options.exact);
  CHECK_FALSE(options.quiet);
}

TEST_CASE("A lone dash is standard input, and after two dashes a name may begin with one", "[app]") {
  CHECK(options_of({"check", "-"}).scene == "-");
  CHECK(options_of({"check", "--", "--odd.toml"}).scene == "--odd.toml");
}

TEST_CASE("Of an option given twice the last value holds", "[app]") {
  CHECK(options_of({"check", "a", "--threads", "1", "--threads=2"}).threads == 2);
}

TEST_CASE("A slice is a part of a whole", "[app]") {
  const Options options = options_of({"turntable", "a.toml", "-o", "d", "--frames", "72", "--slice", "2/3"});
  CHECK(options.frames == 72);
  CHECK(options.slice.part == 2);
  CHECK(options.slice.of == 3);
  for (const char* wrong : {"0/3", "4/3", "1", "/", "1/", "/2", "1/0", "-1/2", "1/2/3", "1 /2", "a/b", ""}) {
    INFO(wrong);
    CHECK(contains(complaint_about({"turntable", "a", "-o", "d", "--slice", wrong}), "I/N with 1 <= I <= N"));
  }
}

TEST_CASE("Help exists for the program and for each command, with an example", "[app]") {
  CHECK(contains(answer_to({"--help"}), "Example:\n  whorlwright plate "));
  CHECK(answer_to({"-h"}) == answer_to({"--help"}));
  for (const std::string command : {"plate", "measure", "check", "turntable", "fit"}) {
    INFO(command);
    CHECK(contains(answer_to({"--help"}), "\n  " + command));
    const std::string help = answer_to({command, "--help"});
    CHECK(contains(help, "Usage: whorlwright " + command));
    CHECK(contains(help, "\n  whorlwright " + command + " scenes/"));
    CHECK(answer_to({command, "-h"}) == help);
    CHECK(answer_to({command, "a.toml", "-h"}) == help);
  }
}

TEST_CASE("The version is one line of the program's name and three numbers", "[app]") {
  CHECK(answer_to({"--version"}) == std::string("whorlwright ") + WHORLWRIGHT_VERSION + "\n");
  CHECK(answer_to({"check", "--version"}) == answer_to({"--version"}));
  CHECK(std::count(std::begin(WHORLWRIGHT_VERSION), std::end(WHORLWRIGHT_VERSION), '.') == 2);
}

TEST_CASE("Each wrong command line gets one line that names the fault and the way to help", "[app]") {
  struct Wrong {
    Words words;
    std::string named, help;
  };
  const std::string program = "see 'whorlwright --help'", plate = "see 'whorlwright plate --help'";
  const std::vector<Wrong> all{
      {{}, "a command is missing", program},
      {{""}, "there is no command ''", program},
      {{"plaet", "a"}, "there is no command 'plaet'; there are plate, measure, check, turntable, fit; perhaps 'plate'", program},
      {{"--quite"}, "there is no option '--quite'; perhaps '--quiet' was meant", program},
      {{"plate"}, "SCENE is required", plate},
      {{"plate", "a", "b"}, "'b' is one word too many", plate},
      {{"plate", "--qualty", "draft"}, "there is no option '--qualty'; perhaps '--quality' was meant", plate},
      {{"plate", "a", "--json"}, "there is no option '--json'", plate},
      {{"plate", "a", "--quality", "fine"}, "--quality: 'fine' is no quality; there are draft, proof and print", plate},
      {{"plate", "a", "--quality"}, "--quality: its value is missing", plate},
      {{"plate", "a", "-o", ""}, "-o: is empty; a folder belongs here", plate},
      {{"plate", "a", "--only="}, "--only: ", plate},
      {{"plate", "a", "--threads", "-1"}, "--threads: '-1' is no whole number from 0 to 1024", plate},
      {{"plate", "a", "--threads", "2.5"}, "--threads: '2.5' is no whole number from 0 to 1024", plate},
      {{"plate", "a", "--threads", "4000000000"}, "--threads: '4000000000' is no whole number", plate},
      {{"plate", "a", "--seed", "18446744073709551616"}, "--seed: '18446744073709551616' is no whole number", plate},
      {{"fit"}, "MEASUREMENTS is required", "see 'whorlwright fit --help'"},
      {{"turntable", "a"}, "-o is required", "see 'whorlwright turntable --help'"},
      {{"turntable", "a", "-o", "d", "--frames", "0"}, "--frames: '0' is no whole number from 1 to 3600",
       "see 'whorlwright turntable --help'"},
  };
  for (const Wrong& wrong : all) {
    const std::string said = complaint_about(wrong.words);
    INFO(said);
    CHECK(contains(said, wrong.named));
    CHECK(contains(said, wrong.help));
    CHECK_FALSE(contains(said, "\n"));
  }
}
