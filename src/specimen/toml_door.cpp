// SPDX-License-Identifier: Apache-2.0
// Positions of toml++ values, and their words in messages.
#include "specimen/toml_door.h"

#include <fmt/format.h>

#include <sstream>

namespace whorl::specimen {
namespace {

diagnostics::Position from_source(const toml::source_region& region) {
  return {region.begin.line, region.begin.column};
}

bool continues_character(char c) { return (static_cast<unsigned char>(c) & 0xC0u) == 0x80u; }

}  // namespace

diagnostics::Position position_of(const toml::node& node) { return from_source(node.source()); }
diagnostics::Position position_of(const toml::key& key) { return from_source(key.source()); }

std::string shown(std::string_view text, std::size_t most) {
  std::string result;
  std::size_t characters = 0;
  for (std::size_t i = 0; i < text.size(); ++i) {
    if (!continues_character(text[i]) && ++characters > most) return result + "..";
    const auto byte = static_cast<unsigned char>(text[i]);
    // The second byte of U+0080 .. U+009F, the other set of control characters, follows 0xC2.
    const bool control = byte < 0x20 || byte == 0x7F;
    const bool control_pair = byte == 0xC2 && i + 1 < text.size() && static_cast<unsigned char>(text[i + 1]) < 0xA0;
    if (control || control_pair) {
      result += fmt::format("\\x{:02x}", control ? byte : static_cast<unsigned char>(text[++i]));
    } else {
      result += text[i];
    }
  }
  return result;
}

std::string shown_value(const toml::node& node) {
  if (const auto* value = node.as_string()) return fmt::format("\"{}\"", shown(value->get()));
  if (const auto* value = node.as_integer()) return fmt::format("{}", value->get());
  if (const auto* value = node.as_floating_point()) return fmt::format("{}", value->get());
  if (const auto* value = node.as_boolean()) return value->get() ? "true" : "false";
  if (node.is_array()) return "[ .. ]";
  if (node.is_table()) return "{ .. }";
  std::ostringstream date;
  node.visit([&](const auto& value) {
    if constexpr (!toml::is_container<decltype(value)>) date << value.get();
  });
  return date.str();
}

std::optional<double> number_of(const toml::node& node) {
  if (const auto* value = node.as_floating_point()) return value->get();
  if (const auto* value = node.as_integer()) return static_cast<double>(value->get());
  return std::nullopt;
}

std::string_view kind_of(const toml::node& node) {
  if (node.is_string()) return "a text in quotes";
  if (node.is_integer()) return "a whole number";
  if (node.is_floating_point()) return "a decimal number";
  if (node.is_boolean()) return "true or false";
  if (node.is_array_of_tables()) return "a list of tables";
  if (node.is_array()) return "a list";
  if (node.is_table()) return "a table";
  return "a date or time";
}

}  // namespace whorl::specimen
