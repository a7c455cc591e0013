// SPDX-License-Identifier: Apache-2.0
// The commands and options as CLI11 knows them, and what is said about wrong ones.
#include "app/command_line.h"

#include "app/option_values.h"
#include "diagnostics/error.h"
#include "diagnostics/nearest_word.h"

#include <CLI/CLI.hpp>
#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <map>

namespace whorl::app {
namespace {

constexpr const char* kProgram = "whorlwright";
constexpr int kMaxThreads = 1024;  // what set_thread_count can mean on any machine of today
constexpr int kMaxFrames = 3600;   // a tenth of a degree a frame

class Parser {
 public:
  Parser() : app_("Scale-true, ray-traced plates of coiled shells from their measurements.", kProgram) {
    app_.require_subcommand(0, 1);
    app_.get_formatter()->column_width(kOptionColumn);
    app_.get_formatter()->label("SUBCOMMAND", "COMMAND");
    app_.set_help_flag("-h,--help", "Print this help, or that of a command, and stop");
    app_.set_version_flag("--version", fmt::format("{} {}", kProgram, WHORLWRIGHT_VERSION), "Print the version and stop");
    app_.footer("Exit codes: 0 done, 1 unexpected failure, 2 wrong usage, 3 invalid input file,\n"
                "4 a fit failed, 6 a file could not be read or written, 75 incomplete: run the same command again.\n\n"
                "Example:\n  whorlwright plate scenes/tall.toml -o out");
    add_common();
    add_plate();
    add_measure();
    add_check();
    add_turntable();
    add_fit();
  }

  std::variant<Options, Answer> read(std::vector<std::string> words) {
    std::reverse(words.begin(), words.end());  // CLI11 takes them from the back
    try {
      app_.parse(words);
    } catch (const CLI::CallForHelp&) {
      return Answer{app_.help()};  // of the chosen command, if there is one
    } catch (const CLI::CallForVersion& version) {
      return Answer{fmt::format("{}\n", version.what())};
    } catch (const CLI::RequiredError& error) {
      refuse_unknown();  // the likelier slip
      refuse(error.what());
    } catch (const CLI::ArgumentMismatch& error) {
      const std::string_view option = error.what();
      refuse(fmt::format("{}: its value is missing", option.substr(0, option.find(':'))));
    } catch (const CLI::ParseError& error) {
      refuse(error.what());
    }
    refuse_unknown();
    if (app_.get_subcommands().empty()) {
      refuse(fmt::format("a command is missing; there are {}", fmt::join(command_names(), ", ")));
    }
    options_.command = commands_.at(&chosen());
    return options_;
  }

 private:
  static constexpr std::size_t kOptionColumn = 26;

  CLI::App& chosen() {
    const std::vector<CLI::App*> parsed = app_.get_subcommands();
    return parsed.empty() ? app_ : *parsed.front();
  }

  std::vector<std::string_view> command_names() const {
    std::vector<std::string_view> names;
    for (const CLI::App* command : app_.get_subcommands(nullptr)) names.push_back(command->get_name());
    return names;
  }

  [[noreturn]] void refuse(std::string message) {
    std::replace(message.begin(), message.end(), '\n', ' ');
    const std::string name = &chosen() == &app_ ? "" : chosen().get_name() + " ";
    throw diagnostics::UsageError(fmt::format("{}; see '{} {}--help'", message, kProgram, name));
  }

  // Words that no option and no place took: CLI11 collects them, we say what may have been meant.
  void refuse_unknown() {
    const std::vector<std::string> left = app_.remaining(true);
    const auto first = std::find_if(left.begin(), left.end(), [](const std::string& word) { return word != "--"; });
    if (first == left.end()) return;
    const std::string& word = *first;
    std::vector<std::string_view> known;
    std::vector<std::string> option_names;
    std::string message;
    if (word.size() > 1 && word.front() == '-') {
      for (const CLI::App* app : std::array<const CLI::App*, 2>{&app_, &chosen()}) {
        for (const CLI::Option* option : app->get_options()) {
          for (const std::string& name : option->get_lnames()) option_names.push_back("--" + name);
        }
      }
      known.assign(option_names.begin(), option_names.end());
      message = fmt::format("there is no option '{}'", word);
    } else if (&chosen() == &app_) {
      known = command_names();
      message = fmt::format("there is no command '{}'; there are {}", word, fmt::join(known, ", "));
    } else {
      message = fmt::format("'{}' is one word too many", word);
    }
    const diagnostics::NearestWord nearest = diagnostics::nearest_word(word.substr(0, word.find('=')), known);
    if (nearest.close) message += fmt::format("; perhaps '{}' was meant", nearest.word);
    refuse(message);
  }

  CLI::App* add(Command command, const char* name, const char* meaning, const char* details, const char* place = "SCENE",
                const char* input = "Scene file (TOML); - is standard input") {
    CLI::App* sub = app_.add_subcommand(name, meaning);
    sub->group("Commands");
    sub->fallthrough();
    sub->allow_extras();
    sub->footer(fmt::format("{}\nOptions of all commands: see '{} --help'.", details, kProgram));
    sub->add_option(place, options_.scene, input)->type_name("")->required();
    commands_[sub] = command;
    return sub;
  }

  /// An option whose value `read` turns into what `target` holds.
  template <class Target, class Read>
  static CLI::Option* add_value(CLI::App* app, const char* names, Target& target, Read read, const char* meaning) {
    CLI::Option* option = app->add_option_function<std::string>(
        names,
        [&target, read, names](const std::string& text) {
          try {
            target = read(text);
          } catch (const BadValue& bad) {
            throw CLI::ValidationError(std::string(names), bad.what());
          }
        },
        meaning);
    return option->multi_option_policy(CLI::MultiOptionPolicy::TakeLast);  // as wrapper scripts rely on
  }

  void add_common() {
    app_.allow_extras();
    add_value(&app_, "--threads", options_.threads, whole_number_between<int>(0, kMaxThreads),
              "Threads to use; 0, the default, is one a core")->type_name("N");
    add_value(&app_, "--seed", options_.seed, whole_number_between<std::uint64_t>(0, UINT64_MAX),
              "Seed of the random numbers (default 0); the same seed, the same pixels")->type_name("N");
    app_.add_flag("--exact", options_.exact, "Use the exact method wherever there is a faster one within bounds");
    app_.add_flag("--quiet", options_.quiet, "No progress, only results and errors");
  }

  void add_quality(CLI::App* sub) {
    add_value(sub, "--quality", options_.quality, quality_named, "draft, proof or print, instead of the scene's own")
        ->type_name("QUALITY");
  }

  void add_plate() {
    CLI::App* sub = add(Command::kPlate, "plate", "Render a scene file's plate: picture, layers, record and caption",
                        "Writes NAME.png, .tif, .exr, .json and .txt into DIR for the scene NAME.toml.\n\n"
                        "Example:\n  whorlwright plate scenes/tall.toml -o out --quality proof\n");
    add_value(sub, "-o", options_.out, non_empty("a folder"), "Folder for the files, made if missing (default: .)")
        ->type_name("DIR");
    add_quality(sub);
    add_value(sub, "--only", options_.only_panel, non_empty("the letter, number or view of a panel"),
              "Render this panel alone: its letter, its number or its view")
        ->type_name("PANEL");
  }

  void add_measure() {
    CLI::App* sub = add(Command::kMeasure, "measure", "Measure lengths, angles, volumes and areas on the solid",
                        "Prints one measure a line with its error, in mm and degrees.\n\n"
                        "Example:\n  whorlwright measure scenes/tall.toml --json > tall.json\n");
    sub->add_flag("--json", options_.json, "Print JSON with the method and error of each measure");
  }

  void add_check() {
    add(Command::kCheck, "check", "Say whether a scene file is valid, and all that is wrong with it",
        "Renders and writes nothing.\n\nExample:\n  whorlwright check scenes/tall.toml\n");
  }

  void add_turntable() {
    CLI::App* sub = add(Command::kTurntable, "turntable", "Render one turn about the coiling axis as numbered frames",
                        "Frames that are there and whole are kept, so an interrupted run goes on where it stopped.\n\n"
                        "Example, half of the frames on each of two machines:\n"
                        "  whorlwright turntable scenes/tall.toml -o frames --slice 1/2\n");
    add_value(sub, "-o", options_.out, non_empty("a folder"), "Folder for the frames, made if missing")
        ->type_name("DIR")
        ->required();
    add_value(sub, "--frames", options_.frames, whole_number_between<int>(1, kMaxFrames),
              "Frames of the full turn (default 36)")->type_name("N");
    add_value(sub, "--slice", options_.slice, slice_of_job, "Render only part I of N, 1 <= I <= N")->type_name("I/N");
    add_quality(sub);
  }

  void add_fit() {
    CLI::App* sub = add(Command::kFit, "fit", "Find the shell that measures what was measured on a specimen",
                        "Prints the parameters with their errors, every measurement with its residual, and a verdict, and\n"
                        "writes a scene file for 'plate' with a report, NAME.fit.json, beside it. Of a table of many specimens\n"
                        "it prints a row each, comma-separated; -o then names a folder. Exit code 4, and no scene, where the\n"
                        "measurements do not fit or do not fix the growth.\n\n"
                        "Example:\n  whorlwright fit scenes/measured/morwenia_broken.toml -o out/morwenia.toml\n",
                        "MEASUREMENTS", "Measurement file (TOML or CSV); - is standard input");
    add_value(sub, "-o", options_.fitted_scene, non_empty("a file"), "Scene file to write, or a folder for many specimens")
        ->type_name("SCENE");
    sub->add_flag("--json", options_.json, "Print the report as JSON");
  }

  CLI::App app_;
  Options options_;
  std::map<const CLI::App*, Command> commands_;
};

}  // namespace

std::variant<Options, Answer> read_command_line(std::vector<std::string> words) {
  return Parser().read(std::move(words));
}

}  // namespace whorl::app
