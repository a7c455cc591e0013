// SPDX-License-Identifier: Apache-2.0
// A turn about the axis of coiling as it will be pictured: size, scale and view of every frame.
#pragma once

#include "plate/figure_plan.h"
#include "specimen/specimen.h"

#include <vector>

namespace whorl::sequence {

/// Frames 0 .. frames - 1 of one full turn. Frame 0 is the apertural view, the azimuth (plate::View) grows by 360 / frames
/// a frame, and the last frame is one step short of the first. All frames share size, scale and the place of the pole.
struct TurnPlan {
  int frames = 0;
  int width = 0, height = 0;  // pixels; both even, as video encoders want them
  double resolution_ppi = 0.0;
  double mm_per_pixel = 0.0;  // mm of shell
  double paper_scale = 0.0;   // mm on paper for a mm of shell, as on the scene's plate
  Vec2 pole_px;               // whole numbers: corners of pixels. The axis runs between columns x - 1 and x
  plate::Extents extents_mm;  // of the whole turn
  double lip_rad = 0.0;
  specimen::Coiling coiling = specimen::Coiling::kDextral;

  double azimuth_deg(int frame) const { return 360.0 * frame / frames; }
  /// The frame as a figure of one panel, without letter or bar.
  plate::FigurePlan figure(int frame) const;
};

/// The frames have the common scale of the scene's plate, and room for every azimuth, so that neither depends on how many
/// frames there are. `points_mm` lie on the outer surface, in the frame of the dextral solid.
/// Throws InvalidInput where the plate cannot be laid out, or a frame would have more than plate::kMostPixels.
TurnPlan plan_turn(const specimen::Specimen& specimen, const std::vector<Vec3>& points_mm, int frames);

/// Part `part` of `of` (1 <= part <= of): every of-th frame from part - 1 on, so that each part has early and late ones.
std::vector<int> frames_of_slice(int frames, int part, int of);

}  // namespace whorl::sequence
