// SPDX-License-Identifier: Apache-2.0
// Reads and writes the frame of a PNG file; never looks into the picture data.
#include "plate/png_chunks.h"

#include <array>
#include <stdexcept>

namespace whorl::plate {
namespace {

constexpr std::string_view kSignature("\x89PNG\r\n\x1a\n", 8);

std::array<std::uint32_t, 256> crc_table() {
  std::array<std::uint32_t, 256> table{};
  for (std::uint32_t n = 0; n < 256; ++n) {
    std::uint32_t c = n;
    for (int bit = 0; bit < 8; ++bit) c = (c & 1u) != 0 ? 0xedb88320u ^ (c >> 1) : c >> 1;
    table[n] = c;
  }
  return table;
}

std::uint32_t read_number(std::string_view bytes) {
  std::uint32_t value = 0;
  for (const char byte : bytes.substr(0, 4)) value = value << 8 | static_cast<unsigned char>(byte);
  return value;
}

std::string number(std::uint32_t value) {
  std::string bytes;
  for (int shift = 24; shift >= 0; shift -= 8) bytes += static_cast<char>(value >> shift & 0xffu);
  return bytes;
}

}  // namespace

std::uint32_t png_crc(std::string_view bytes) {
  static const std::array<std::uint32_t, 256> table = crc_table();
  std::uint32_t crc = 0xffffffffu;
  for (const char byte : bytes) crc = table[(crc ^ static_cast<unsigned char>(byte)) & 0xffu] ^ (crc >> 8);
  return crc ^ 0xffffffffu;
}

std::vector<PngChunk> split_png(std::string_view bytes) {
  if (bytes.substr(0, kSignature.size()) != kSignature) throw std::runtime_error("no PNG signature");
  bytes.remove_prefix(kSignature.size());
  std::vector<PngChunk> chunks;
  while (!bytes.empty()) {
    if (bytes.size() < 12 || read_number(bytes) > bytes.size() - 12) throw std::runtime_error("a PNG chunk is cut short");
    const std::size_t length = read_number(bytes);
    if (png_crc(bytes.substr(4, length + 4)) != read_number(bytes.substr(length + 8)))
      throw std::runtime_error("a PNG chunk has a wrong checksum");
    chunks.push_back({std::string(bytes.substr(4, 4)), std::string(bytes.substr(8, length))});
    bytes.remove_prefix(length + 12);
  }
  return chunks;
}

std::string join_png(const std::vector<PngChunk>& chunks) {
  std::string bytes(kSignature);
  for (const PngChunk& chunk : chunks) {
    bytes += number(static_cast<std::uint32_t>(chunk.data.size()));
    const std::size_t begin = bytes.size();
    bytes += chunk.type;
    bytes += chunk.data;
    bytes += number(png_crc(std::string_view(bytes).substr(begin)));
  }
  return bytes;
}

PngChunk png_text(std::string_view keyword, std::string_view text) {
  std::string data(keyword);
  data += '\0';               // ends the keyword
  data += std::string(2, '\0');  // not compressed, method 0
  data += std::string(2, '\0');  // no language, no translated keyword
  data += text;
  return {"iTXt", data};
}

}  // namespace whorl::plate
