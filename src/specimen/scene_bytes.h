// SPDX-License-Identifier: Apache-2.0
// The bytes of a scene file: fetched, and checked for being text of a sensible size.
#pragma once

#include "specimen/problem_list.h"

#include <cstddef>
#include <string>
#include <string_view>

namespace whorl::specimen {

inline constexpr std::size_t kLargestScene = 1024 * 1024;  // bytes; a scene by hand has a few thousand
// A key of many parts, a.b.c.., nests a table in a table for each; lines of this length keep that within the stack.
inline constexpr std::size_t kLongestLine = 8192;  // bytes

/// "-" is standard input. Reads one byte more than kLargestScene at most. Throws FileTrouble.
std::string fetch_bytes(const std::string& path);

/// What a file is for, in messages: "scene file", and how it begins.
struct FileKind {
  std::string_view name = "scene file", beginning = "a scene begins with the line: format = 1";
};

/// Complains of too large or empty files, of bytes that are no text, of overlong lines.
void check_bytes(std::string_view bytes, ProblemList& problems, const FileKind& kind = {});

}  // namespace whorl::specimen
