// SPDX-License-Identifier: Apache-2.0
// Writes the figure as TIFF for the printer.
#pragma once

#include "plate/picture.h"

#include <filesystem>

namespace whorl::plate {

/// LZW, one flat picture, resolution in pixels per inch, sRGB profile, no alpha unless the picture has it (then straight).
/// The same picture and tags give the same bytes. Appears whole or not at all. Throws FileTrouble.
void write_tiff(const std::filesystem::path& path, const Picture& picture, const PictureTags& tags);

}  // namespace whorl::plate
