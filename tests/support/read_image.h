// SPDX-License-Identifier: Apache-2.0
// Reads a written picture back, for tests only.
#pragma once

#include <cstddef>
#include <filesystem>
#include <string>
#include <vector>

namespace whorl::support {

struct ReadImage {
  int width = 0, height = 0;
  std::vector<std::string> channels;  // names, in the file's order
  std::vector<std::string> types;     // "uint8", "uint16", "half", "float", one a channel
  std::vector<float> values;          // integers as they stand in the file (0 .. 255 or 65535), floats as they are; alpha untouched

  /// Index of a channel by name; fails the test where there is none.
  std::size_t channel(const std::string& name) const;
  float at(int x, int y, std::size_t channel) const {
    return values[(static_cast<std::size_t>(y) * static_cast<std::size_t>(width) + static_cast<std::size_t>(x)) * channels.size() +
                  channel];
  }
  float at(int x, int y, const std::string& name) const { return at(x, y, channel(name)); }
};

/// Fails the test where the file cannot be read.
ReadImage read_image(const std::filesystem::path& path);

}  // namespace whorl::support
