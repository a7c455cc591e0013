// SPDX-License-Identifier: Apache-2.0
// Whether bytes are text, and whether a text may stand in a caption.
#pragma once

#include "diagnostics/position.h"

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>

namespace whorl::specimen {

/// The offset of the first byte that is no well-formed UTF-8 (Unicode 15, table 3-7), or nothing.
std::optional<std::size_t> first_bad_byte(std::string_view bytes);

/// The first character of well-formed UTF-8, all its bytes; empty of an empty text.
std::string_view first_character(std::string_view text);

/// The number of one well-formed character.
char32_t code_point(std::string_view character);

/// Line and column of a byte; columns count characters.
diagnostics::Position position_at(std::string_view text, std::size_t offset);

/// Characters (code points) of well-formed UTF-8.
std::size_t count_characters(std::string_view text);

/// What is wrong with a name or remark: blank, too long, control characters. Empty where nothing is.
std::string fault_of_text(std::string_view text, double most_characters);

}  // namespace whorl::specimen
