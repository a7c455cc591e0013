// SPDX-License-Identifier: Apache-2.0
// Parses TOML and says what the commonest slips look like where the reading breaks off.
#include "specimen/toml_text.h"

#include "specimen/problem_list.h"

#include <fmt/format.h>

#include <algorithm>

namespace whorl::specimen {
namespace {

constexpr std::size_t kLongestReason = 300;  // characters

/// The rest of the text from a place on; columns count characters.
std::string_view from_place(std::string_view text, diagnostics::Position place) {
  for (std::uint32_t line = 1; line < place.line && !text.empty(); ++line)
    text.remove_prefix(std::min(text.find('\n'), text.size() - 1) + 1);
  for (std::uint32_t column = 1; column < place.column && !text.empty(); ++column) {
    do text.remove_prefix(1);
    while (!text.empty() && (static_cast<unsigned char>(text[0]) & 0xC0u) == 0x80u);
  }
  return text;
}

/// What the two commonest slips look like where the reading broke off.
std::string_view hint_at(std::string_view text, diagnostics::Position place) {
  const std::string_view rest = from_place(text, place);
  const std::string_view before = text.substr(0, text.size() - rest.size());
  const std::string_view line = before.substr(before.rfind('\n') + 1);
  const auto is_digit = [](std::string_view s, std::size_t i) { return i < s.size() && s[i] >= '0' && s[i] <= '9'; };
  if (rest.starts_with(',') && is_digit(line, line.size() - 1) && is_digit(rest, 1)) {
    return " (a decimal number takes a point, not a comma)";
  }
  const bool at_line_end = rest.empty() || rest[0] == '\n' || rest[0] == '\r';
  if (at_line_end && std::count(line.begin(), line.end(), '"') % 2 == 1) return " (is the closing quote missing?)";
  return {};
}

}  // namespace

toml::table parse_toml(const std::string& text, const std::string& source) {
  ProblemList problems;
  try {
    return toml::parse(std::string_view(text));
  } catch (const toml::parse_error& error) {
    const toml::source_position at = error.source().begin;
    problems.add({at.line, at.column}, fmt::format("this is not TOML: {}{}", shown(error.description(), kLongestReason),
                                                   hint_at(text, {at.line, at.column})));
  }
  problems.throw_if_any(source);
  return {};
}

}  // namespace whorl::specimen
