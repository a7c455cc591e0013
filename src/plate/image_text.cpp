// SPDX-License-Identifier: Apache-2.0
// Draws text by the image library (FreeType behind it) and crops it to the ink.
#include "plate/image_text.h"

#include "plate/image_library.h"

#include <algorithm>
#include <cmath>

namespace whorl::plate {
namespace {

constexpr double kPointsPerInch = 72.0;

}  // namespace

TextMask text_mask(const std::string& text, double points, double resolution_ppi, Weight weight) {
  const std::string font = find_font(weight).string();
  const int size = std::max(1, static_cast<int>(std::lround(points / kPointsPerInch * resolution_ppi)));
  const OIIO::ROI box = OIIO::ImageBufAlgo::text_size(text, size, font);
  if (!box.defined()) throw diagnostics::FileTrouble(font + ": the image library cannot draw text with this typeface");

  // Hinted ink may leave the stated box by a little: draw with room to spare.
  const int room = size / 2 + 2;
  const int pen_x = room - box.xbegin, pen_y = room - box.ybegin;
  OIIO::ImageBuf canvas(OIIO::ImageSpec(box.width() + 2 * room, box.height() + 2 * room, 1, OIIO::TypeDesc::FLOAT));
  OIIO::ImageBufAlgo::zero(canvas);
  const float ink = 1.0f;
  if (!OIIO::ImageBufAlgo::render_text(canvas, pen_x, pen_y, text, size, font, ink))
    throw diagnostics::FileTrouble(font + ": the image library cannot draw text: " + canvas.geterror());

  int left = canvas.spec().width, right = -1, top = canvas.spec().height, bottom = -1;
  for (int y = 0; y < canvas.spec().height; ++y)
    for (int x = 0; x < canvas.spec().width; ++x)
      if (canvas.getchannel(x, y, 0, 0) > 0.0f) {
        left = std::min(left, x), right = std::max(right, x);
        top = std::min(top, y), bottom = std::max(bottom, y);
      }
  TextMask mask;
  if (right < left) return mask;
  mask.width = right - left + 1;
  mask.height = bottom - top + 1;
  mask.base = pen_y - top;
  mask.coverage.reserve(static_cast<std::size_t>(mask.width) * static_cast<std::size_t>(mask.height));
  for (int y = top; y <= bottom; ++y)
    for (int x = left; x <= right; ++x) mask.coverage.push_back(std::clamp(canvas.getchannel(x, y, 0, 0), 0.0f, 1.0f));
  return mask;
}

}  // namespace whorl::plate
