// SPDX-License-Identifier: Apache-2.0
// A PNG file as its chunks: taken apart, checked, put together (ISO/IEC 15948, section 5).
#pragma once

#include <cstdint>
#include <string>
#include <string_view>
#include <vector>

namespace whorl::plate {

struct PngChunk {
  std::string type;  // four letters
  std::string data;
};

/// CRC-32 as PNG uses it (ISO 3309), over a chunk's type and data.
std::uint32_t png_crc(std::string_view bytes);

/// Throws std::runtime_error for bytes that are no whole PNG or have a wrong checksum.
std::vector<PngChunk> split_png(std::string_view bytes);
std::string join_png(const std::vector<PngChunk>& chunks);

/// An uncompressed iTXt chunk: UTF-8 text under a keyword.
PngChunk png_text(std::string_view keyword, std::string_view text);

}  // namespace whorl::plate
