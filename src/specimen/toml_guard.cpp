// SPDX-License-Identifier: Apache-2.0
// A scanner that knows just enough of TOML to tell quotes, comments, values and headers apart.
#include "specimen/toml_guard.h"

#include "specimen/text_check.h"
#include "specimen/toml_door.h"

#include <fmt/format.h>

namespace whorl::specimen {
namespace {

class Scanner {
 public:
  explicit Scanner(std::string_view text) : text_(text) {}

  void scan(ProblemList& problems) {
    if (text_.starts_with("\xEF\xBB\xBF")) at_ = 3;
    bool line_begins = true, header = false;
    int depth = 0;  // of lists and inline tables that are open
    while (at_ < text_.size()) {
      const char c = text_[at_];
      if (c == '\n') {
        line_begins = true;
        header = false;
        ++at_;
      } else if (c == ' ' || c == '\t' || c == '\r') {
        ++at_;
      } else if (c == '#') {
        at_ = std::min(text_.find('\n', at_), text_.size());
      } else if (line_begins && depth == 0 && c == '[') {
        line_begins = false;
        header = true;
        if (!header_begins_well(problems)) return;
      } else if (c == '"' || c == '\'') {
        line_begins = false;
        skip_quotes(c);
      } else if (static_cast<unsigned char>(c) >= 0x80) {
        complain_of_character(problems);
        return;
      } else {
        line_begins = false;
        if (!header && (c == '[' || c == '{')) ++depth;
        if (!header && (c == ']' || c == '}') && depth > 0) --depth;
        ++at_;
      }
    }
  }

 private:
  bool repeats(char c, std::size_t times) const {
    return text_.substr(at_, times) == std::string(times, c);
  }

  /// From an opening quote to behind the closing one; quotes in one line end with it at the latest.
  void skip_quotes(char quote) {
    const bool many_lines = repeats(quote, 3);
    at_ += many_lines ? 3 : 1;
    for (; at_ < text_.size(); ++at_) {
      if (quote == '"' && text_[at_] == '\\') {
        ++at_;
        if (at_ < text_.size() && text_[at_] == '\n' && !many_lines) return;
      } else if (many_lines && repeats(quote, 3)) {
        at_ += 3;
        for (int more = 0; more < 2 && repeats(quote, 1); ++more) ++at_;  // quotes may stand before the closing three
        return;
      } else if (!many_lines && text_[at_] == quote) {
        ++at_;
        return;
      } else if (!many_lines && text_[at_] == '\n') {
        return;
      }
    }
    at_ = text_.size();
  }

  /// Moves to the first character of the name.
  bool header_begins_well(ProblemList& problems) {
    const std::size_t start = at_++;
    if (at_ < text_.size() && text_[at_] == '[') ++at_;
    while (at_ < text_.size() && (text_[at_] == ' ' || text_[at_] == '\t')) ++at_;
    const std::string_view good =
        "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789_-\"'";
    // A header that breaks off, or an empty one, or one of a second bracket too late, is well told of by toml++.
    if (at_ >= text_.size() || std::string_view("]\r\n[").find(text_[at_]) != std::string_view::npos) return true;
    if (good.find(text_[at_]) != std::string_view::npos) return true;
    if (static_cast<unsigned char>(text_[at_]) >= 0x80) {
      complain_of_character(problems);
    } else {
      problems.add(position_at(text_, start), fmt::format("the name of a table cannot begin with \"{}\"", shown(text_.substr(at_, 1))));
    }
    return false;
  }

  void complain_of_character(ProblemList& problems) const {
    const std::string_view character = first_character(text_.substr(at_));
    problems.add(position_at(text_, at_),
                 fmt::format("the character \"{}\" (U+{:04X}) stands outside quotes; names of keys and tables, and all values but texts, "
                             "are written in plain ASCII", shown(character), static_cast<unsigned>(code_point(character))));
  }

  std::string_view text_;
  std::size_t at_ = 0;
};

}  // namespace

void guard_toml(std::string_view text, ProblemList& problems) { Scanner(text).scan(problems); }

}  // namespace whorl::specimen
