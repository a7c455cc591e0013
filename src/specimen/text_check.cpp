// SPDX-License-Identifier: Apache-2.0
// UTF-8, control characters, lengths.
#include "specimen/text_check.h"

#include <fmt/format.h>

#include <algorithm>

namespace whorl::specimen {
namespace {

unsigned byte_at(std::string_view text, std::size_t i) {
  return i < text.size() ? static_cast<unsigned char>(text[i]) : 0u;
}

/// Length of the well-formed sequence at `i`, 0 where there is none.
std::size_t sequence_length(std::string_view text, std::size_t i) {
  const unsigned lead = byte_at(text, i);
  if (lead < 0x80) return 1;
  if (lead < 0xC2 || lead > 0xF4) return 0;
  const std::size_t length = lead < 0xE0 ? 2 : lead < 0xF0 ? 3 : 4;
  // The second byte shuts out overlong forms, surrogates and what lies above U+10FFFF.
  const unsigned low = lead == 0xE0 ? 0xA0u : lead == 0xF0 ? 0x90u : 0x80u;
  const unsigned high = lead == 0xED ? 0x9Fu : lead == 0xF4 ? 0x8Fu : 0xBFu;
  const unsigned second = byte_at(text, i + 1);
  if (second < low || second > high) return 0;
  for (std::size_t j = 2; j < length; ++j) {
    if (byte_at(text, i + j) < 0x80 || byte_at(text, i + j) > 0xBF) return 0;
  }
  return length;
}

bool is_control(std::string_view text, std::size_t i) {
  const unsigned byte = byte_at(text, i);
  return byte < 0x20 || byte == 0x7F || (byte == 0xC2 && byte_at(text, i + 1) < 0xA0);
}

}  // namespace

std::optional<std::size_t> first_bad_byte(std::string_view bytes) {
  for (std::size_t i = 0; i < bytes.size();) {
    const std::size_t length = sequence_length(bytes, i);
    if (length == 0) return i;
    i += length;
  }
  return std::nullopt;
}

std::string_view first_character(std::string_view text) {
  return text.substr(0, text.empty() ? 0 : std::max<std::size_t>(1, sequence_length(text, 0)));
}

char32_t code_point(std::string_view character) {
  // The lead byte carries 7, 5, 4 or 3 bits, every other one 6.
  const unsigned lead = byte_at(character, 0);
  char32_t number = lead < 0x80 ? lead : lead < 0xE0 ? lead & 0x1Fu : lead < 0xF0 ? lead & 0x0Fu : lead & 0x07u;
  for (std::size_t i = 1; i < character.size(); ++i) number = (number << 6) | (byte_at(character, i) & 0x3Fu);
  return number;
}

diagnostics::Position position_at(std::string_view text, std::size_t offset) {
  const std::string_view before = text.substr(0, offset);
  const std::size_t line_start = before.rfind('\n') + 1;  // npos + 1 is 0
  const auto line = 1 + std::count(before.begin(), before.end(), '\n');
  return {static_cast<std::uint32_t>(line),
          static_cast<std::uint32_t>(1 + count_characters(before.substr(line_start)))};
}

std::size_t count_characters(std::string_view text) {
  return static_cast<std::size_t>(
      std::count_if(text.begin(), text.end(), [](char c) { return (static_cast<unsigned char>(c) & 0xC0u) != 0x80u; }));
}

std::string fault_of_text(std::string_view text, double most_characters) {
  if (text.find_first_not_of(' ') == std::string_view::npos)
    return "is blank; write something, or leave out a key that may be left out";
  const std::size_t characters = count_characters(text);
  if (static_cast<double>(characters) > most_characters) {
    return fmt::format("has {} characters; must be at most {}", characters, most_characters);
  }
  for (std::size_t i = 0; i < text.size(); ++i) {
    if (is_control(text, i))
      return fmt::format("holds a control character (byte {}: tab, new line or the like); it must be one plain line",
                         i + 1);
  }
  return {};
}

}  // namespace whorl::specimen
