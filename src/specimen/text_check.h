// SPDX-License-Identifier: Apache-2.0
// Whether bytes are text, and whether a text may stand in a caption.
#pragma once

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>

namespace whorl::specimen {

/// The offset of the first byte that is no well-formed UTF-8 (Unicode 15, table 3-7), or nothing.
std::optional<std::size_t> first_bad_byte(std::string_view bytes);

/// Characters (code points) of well-formed UTF-8.
std::size_t count_characters(std::string_view text);

/// What is wrong with a name or remark: blank, too long, control characters. Empty where nothing is.
std::string fault_of_text(std::string_view text, double most_characters);

}  // namespace whorl::specimen
