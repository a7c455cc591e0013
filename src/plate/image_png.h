// SPDX-License-Identifier: Apache-2.0
// Writes the figure as PNG, with its resolution and its colour space.
#pragma once

#include "plate/picture.h"

#include <filesystem>
#include <string>

namespace whorl::plate {

/// The file's bytes: the same for the same picture and tags. `path` is for error messages only. Throws FileTrouble.
std::string encode_png(const Picture& picture, const PictureTags& tags, const std::filesystem::path& path);

/// Appears whole or not at all. Throws FileTrouble.
void write_png(const std::filesystem::path& path, const Picture& picture, const PictureTags& tags);

}  // namespace whorl::plate
