// SPDX-License-Identifier: Apache-2.0
// The only door to FreeType, which sets the type.
#include "plate/text_mask.h"

#include "diagnostics/error.h"

#include <ft2build.h>
#include FT_FREETYPE_H
#include FT_OUTLINE_H

#include <algorithm>
#include <cmath>
#include <memory>
#include <string_view>
#include <type_traits>

namespace whorl::plate {
namespace {

// Not by the image library's own lettering: up to 2.4 it knows no character beyond ASCII and prints "5" for "µ"
// (OpenImageIO issue 3933).

constexpr double kPointsPerInch = 72.0;
constexpr long kSubpixels = 64;  // FreeType counts in 64ths of a pixel

struct CloseLibrary {
  void operator()(FT_Library library) const { FT_Done_FreeType(library); }
};
struct CloseFace {
  void operator()(FT_Face face) const { FT_Done_Face(face); }
};
using Library = std::unique_ptr<std::remove_pointer_t<FT_Library>, CloseLibrary>;
using Face = std::unique_ptr<std::remove_pointer_t<FT_Face>, CloseFace>;

[[noreturn]] void type_trouble(const std::string& font, const std::string& what) {
  throw diagnostics::FileTrouble(font + ": " + what + "; install the package fonts-liberation anew");
}

/// Code points of well-formed UTF-8; a broken sequence gives what bits it has.
std::vector<FT_ULong> code_points(std::string_view utf8) {
  std::vector<FT_ULong> points;
  for (const char c : utf8) {
    const unsigned byte = static_cast<unsigned char>(c);
    if ((byte & 0xc0u) == 0x80u && !points.empty()) {
      points.back() = points.back() << 6 | (byte & 0x3fu);
    } else {
      points.push_back(byte < 0x80u ? byte : byte < 0xe0u ? byte & 0x1fu : byte < 0xf0u ? byte & 0x0fu : byte & 0x07u);
    }
  }
  return points;
}

struct Glyph {
  int left = 0, top = 0;  // of its ink, from the pen's start, y up
  int width = 0, height = 0;
  std::vector<unsigned char> coverage;  // 0 .. 255
};

/// Sets one line of type; the pen stands between pixels where it must.
std::vector<Glyph> set_line(FT_Face face, const std::string& text, const std::string& font) {
  std::vector<Glyph> line;
  FT_Pos pen = 0;
  FT_UInt before = 0;
  for (const FT_ULong point : code_points(text)) {
    const FT_UInt index = FT_Get_Char_Index(face, point);
    if (index == 0) type_trouble(font, "the typeface has no character for a part of \"" + text + "\"");
    FT_Vector kern{0, 0};
    if (before != 0 && FT_Get_Kerning(face, before, index, FT_KERNING_UNFITTED, &kern) == 0) pen += kern.x;
    before = index;
    if (FT_Load_Glyph(face, index, FT_LOAD_NO_HINTING | FT_LOAD_NO_BITMAP) != 0)
      type_trouble(font, "the typeface cannot draw \"" + text + "\"");
    const FT_GlyphSlot slot = face->glyph;
    const FT_Pos whole = pen >= 0 ? pen / kSubpixels : (pen - kSubpixels + 1) / kSubpixels;
    FT_Outline_Translate(&slot->outline, pen - whole * kSubpixels, 0);
    // The unhinted advance, in 65536ths of a pixel.
    pen += std::lround(static_cast<double>(slot->linearHoriAdvance) * kSubpixels / 65536.0);
    if (FT_Render_Glyph(slot, FT_RENDER_MODE_NORMAL) != 0) type_trouble(font, "the typeface cannot draw \"" + text + "\"");
    Glyph glyph;
    glyph.left = static_cast<int>(whole) + slot->bitmap_left;
    glyph.top = slot->bitmap_top;
    glyph.width = static_cast<int>(slot->bitmap.width);
    glyph.height = static_cast<int>(slot->bitmap.rows);
    for (int y = 0; y < glyph.height; ++y) {
      const unsigned char* row = slot->bitmap.buffer + static_cast<std::ptrdiff_t>(y) * slot->bitmap.pitch;
      glyph.coverage.insert(glyph.coverage.end(), row, row + glyph.width);
    }
    if (glyph.width > 0 && glyph.height > 0) line.push_back(std::move(glyph));
  }
  return line;
}

TextMask joined(const std::vector<Glyph>& line) {
  TextMask mask;
  if (line.empty()) return mask;
  int left = line[0].left, right = left, top = line[0].top, bottom = top;
  for (const Glyph& glyph : line) {
    left = std::min(left, glyph.left), right = std::max(right, glyph.left + glyph.width);
    top = std::max(top, glyph.top), bottom = std::min(bottom, glyph.top - glyph.height);
  }
  mask.width = right - left;
  mask.height = top - bottom;
  mask.base = top;
  mask.coverage.assign(static_cast<std::size_t>(mask.width) * static_cast<std::size_t>(mask.height), 0.0f);
  for (const Glyph& glyph : line)
    for (int y = 0; y < glyph.height; ++y)
      for (int x = 0; x < glyph.width; ++x) {
        float& cover = mask.coverage[static_cast<std::size_t>(top - glyph.top + y) * static_cast<std::size_t>(mask.width) +
                                     static_cast<std::size_t>(glyph.left - left + x)];
        const float more = static_cast<float>(glyph.coverage[static_cast<std::size_t>(y * glyph.width + x)]) / 255.0f;
        cover = std::min(1.0f, cover + more);  // kerned neighbours share a pixel, not its area
      }
  return mask;
}

}  // namespace

TextMask text_mask(const std::string& text, double points, double resolution_ppi, Weight weight) {
  const std::string font = find_font(weight).string();
  FT_Library raw_library = nullptr;
  if (FT_Init_FreeType(&raw_library) != 0) type_trouble(font, "the typesetting library does not start");
  const Library library(raw_library);
  FT_Face raw_face = nullptr;
  if (FT_New_Face(library.get(), font.c_str(), 0, &raw_face) != 0) type_trouble(font, "this is no typeface that can be read");
  const Face face(raw_face);
  // At 72 units an inch a point is a pixel: the size is given in pixels.
  const double size_px = std::max(1.0, points / kPointsPerInch * resolution_ppi);
  if (FT_Set_Char_Size(face.get(), 0, std::lround(size_px * kSubpixels), 72, 72) != 0)
    type_trouble(font, "the typeface has no such size");
  return joined(set_line(face.get(), text, font));
}

}  // namespace whorl::plate
