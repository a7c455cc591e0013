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
    while (at_ < text_.size()) {
      const char c = text_[at_];
      if (c == '#') {
        at_ = std::min(text_.find('\n', at_), text_.size());
      } else if (c == '[' && line_begins_ && open_.empty()) {
        line_begins_ = false;
        if (!header_begins_well(problems)) return;
      } else if (c == '"' || c == '\'') {
        if (!quote_may_stand(problems) || !skip_quotes(c, problems)) return;
        line_begins_ = false;
        in_word_ = true;
      } else if (static_cast<unsigned char>(c) >= 0x80) {
        complain_of_character(problems);
        return;
      } else {
        step(c);
      }
    }
  }

 private:
  bool repeats(char c, std::size_t times) const { return text_.substr(at_, times) == std::string(times, c); }

  /// Past one character that is neither quote nor comment.
  void step(char c) {
    ++at_;
    const bool space = c == ' ' || c == '\t' || c == '\r' || c == '\n';
    if (c == '\n') {
      line_begins_ = true;
      if (open_.empty()) in_value_ = false;
    } else if (!space) {
      line_begins_ = false;
    }
    if (space) {
      in_word_ = false;
    } else if (!in_value_) {
      in_word_ = c != '.' && c != ',' && c != '=';
      if (c == '=') in_value_ = true;
      if (c == '}') close(c);
    } else if ((c == '[' || c == '{') && !in_word_) {
      open_.push_back(c);
      in_value_ = c == '[';
    } else if (c == ']' || c == '}') {
      close(c);
    } else if (c == ',') {
      in_word_ = false;
      if (!open_.empty()) in_value_ = open_.back() == '[';
    } else {
      in_word_ = true;
    }
  }

  void close(char bracket) {
    if (!open_.empty() && open_.back() == (bracket == ']' ? '[' : '{')) {
      open_.pop_back();
      in_value_ = true;  // lists and inline tables are values
    }
    in_word_ = true;
  }

  bool quote_may_stand(ProblemList& problems) const {
    if (!in_word_) return true;
    problems.add(position_at(text_, at_), "a quote stands in the middle of a word or right behind another quote");
    return false;
  }

  /// From an opening quote to behind the closing one; quotes in one line end with it at the latest.
  bool skip_quotes(char quote, ProblemList& problems) {
    const bool many_lines = repeats(quote, 3);
    at_ += many_lines ? 3 : 1;
    for (; at_ < text_.size(); ++at_) {
      if (quote == '"' && text_[at_] == '\\') {
        if (!backslash_may_stand(problems)) return false;
        ++at_;
        if (at_ < text_.size() && text_[at_] == '\n' && !many_lines) return true;
      } else if (many_lines && repeats(quote, 3)) {
        at_ += 3;
        for (int more = 0; more < 2 && repeats(quote, 1); ++more) ++at_;  // quotes may stand before the closing three
        return true;
      } else if (!many_lines && text_[at_] == quote) {
        ++at_;
        return true;
      } else if (!many_lines && text_[at_] == '\n') {
        return true;
      }
    }
    at_ = text_.size();
    return true;
  }

  bool backslash_may_stand(ProblemList& problems) const {
    const std::size_t next = text_.find_first_not_of(" \t\r\n", at_ + 1);
    if (next == std::string_view::npos || static_cast<unsigned char>(text_[next]) < 0x80) return true;
    problems.add(position_at(text_, at_),
                 fmt::format("a backslash stands before \"{}\"; take it away, or write the text in one line",
                             shown(first_character(text_.substr(next)))));
    return false;
  }

  /// Moves to the first character of the name.
  bool header_begins_well(ProblemList& problems) {
    const std::size_t start = at_++;
    if (at_ < text_.size() && text_[at_] == '[') ++at_;
    while (at_ < text_.size() && (text_[at_] == ' ' || text_[at_] == '\t')) ++at_;
    const std::string_view good = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789_-\"'";
    // A header that breaks off, or an empty one, or one of a second bracket too late, is well told of by toml++.
    if (at_ >= text_.size() || std::string_view("]\r\n[").find(text_[at_]) != std::string_view::npos) return true;
    if (good.find(text_[at_]) != std::string_view::npos) return true;
    if (static_cast<unsigned char>(text_[at_]) >= 0x80) {
      complain_of_character(problems);
    } else {
      problems.add(position_at(text_, start),
                   fmt::format("the name of a table cannot begin with \"{}\"", shown(text_.substr(at_, 1))));
    }
    return false;
  }

  void complain_of_character(ProblemList& problems) const {
    const std::string_view character = first_character(text_.substr(at_));
    problems.add(position_at(text_, at_), fmt::format("the character \"{}\" (U+{:04X}) stands outside quotes; names of "
                                                      "keys and tables, and all values but texts, "
                                                      "are written in plain ASCII",
                                                      shown(character), static_cast<unsigned>(code_point(character))));
  }

  std::string_view text_;
  std::size_t at_ = 0;
  bool line_begins_ = true;
  bool in_value_ = false;  // behind an equals sign, or in a list; else among keys
  bool in_word_ = false;   // behind something that only a space or a sign ends
  std::string open_;       // the brackets of lists and inline tables that are open, outermost first
};

}  // namespace

void guard_toml(std::string_view text, ProblemList& problems) { Scanner(text).scan(problems); }

}  // namespace whorl::specimen
