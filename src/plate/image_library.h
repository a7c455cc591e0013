// SPDX-License-Identifier: Apache-2.0
// The door to OpenImageIO for plate/image_*: what differs between 2.4 (Debian 12) and 2.5 (Debian 13) is settled here.
#pragma once

#include "diagnostics/error.h"

#include <OpenImageIO/filesystem.h>
#include <OpenImageIO/imagebuf.h>
#include <OpenImageIO/imagebufalgo.h>
#include <OpenImageIO/imageio.h>

#include <filesystem>
#include <memory>
#include <string>

namespace whorl::plate {

/// A date that is unknown, as Exif writes it (blanks for the digits). The writers of TIFF and EXR would fill in today's, and
/// the same figure would not have the same bytes tomorrow.
inline constexpr const char* kNoDate = "    :  :     :  :  ";

/// Throws FileTrouble: which file, and what the library says.
[[noreturn]] inline void image_trouble(const std::filesystem::path& path, const std::string& reason) {
  throw diagnostics::FileTrouble(path.string() + ": cannot write the picture: " +
                                 (reason.empty() ? std::string("no reason given by the image library") : reason));
}

/// A writer for the format that `extension` names ("png", "tif", "exr"). Throws FileTrouble.
inline std::unique_ptr<OIIO::ImageOutput> image_output(const std::string& extension, const std::filesystem::path& path) {
  std::unique_ptr<OIIO::ImageOutput> output = OIIO::ImageOutput::create("any." + extension);
  if (!output) image_trouble(path, OIIO::geterror());
  return output;
}

}  // namespace whorl::plate
