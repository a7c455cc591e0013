// SPDX-License-Identifier: Apache-2.0
// The named views of a shell: from which side the reader looks, and the page's frame in the solid.
#pragma once

#include "math/vec.h"
#include "specimen/specimen.h"

#include <string>
#include <string_view>

namespace whorl::plate {

/// One way to look at a shell, orthographically.
///
/// `page_to_shell` has x to the page's right, y up the page, z towards the reader, all unit vectors in the frame of the
/// dextral solid (axis of coiling = z, growth towards +z, so the page's up is -z). A sinistral shell is the mirror
/// image of that solid, so its frames are left-handed and everything else stays as it is.
///
/// `azimuth_deg`: how far the reader has walked to his right round the upright shell, from the apertural view;
/// `elevation_deg`: how far he has risen towards the apex (90 apical, -90 umbilical). Both for the shell as it is seen,
/// dextral or sinistral.
struct View {
  specimen::ViewName name = specimen::ViewName::kApertural;
  std::string label;
  double azimuth_deg = 0.0;    // 0 .. 360
  double elevation_deg = 0.0;  // -90 .. 90
  Frame page_to_shell;
  /// The page to which light and cut are fixed: `page_to_shell`, but for one eye of a stereo pair that of the view between the eyes.
  Frame fixed_page;
  double stereo_deg = 0.0;  // angle between the eyes of a pair that is still to be parted; 0 for a single picture
  bool cut = false;  // the half with a positive page z (about the axis of coiling) is taken away
};

/// The turn about the axis that means azimuth 0, and its sense, as the record states them.
inline constexpr const char* kAzimuthRule =
    "aperture faces the reader: the horizontal part of the aperture's normal points out of the page";
inline constexpr const char* kAzimuthZero = "apertural view";
inline constexpr const char* kAzimuthSense = "degrees the reader walks to his right round the upright shell";
inline constexpr const char* kElevationSense = "degrees the reader rises from the horizontal towards the apex";

/// How far behind the lip an axial section cuts on the page's right, degrees: enough for the lip and its rim to lie
/// in the half that is taken away, little enough for the last whorl to be shown nearly whole.
inline constexpr double kSectionBehindLip = 60.0;

/// The page's frame in the dextral solid whose lip stands at growth angle `lip_rad`.
Frame page_frame(double lip_rad, specimen::Coiling coiling, double azimuth_deg, double elevation_deg);

/// A named view. For ViewName::kFree, give `free_azimuth_deg` and `free_elevation_deg` (clamped to -90 .. 90).
View make_view(specimen::ViewName name, double lip_rad, specimen::Coiling coiling, double free_azimuth_deg = 0.0,
               double free_elevation_deg = 0.0);

/// The view that a panel of the scene file asks for; a pair has the angle between its eyes.
View make_view(const specimen::Panel& panel, const specimen::Stereo& stereo, double lip_rad, specimen::Coiling coiling);

enum class Eye { kLeft, kRight };
/// What one eye sees of a pair: the reader turned about the page's vertical by half the angle.
View eye_view(const View& pair, Eye eye);
/// What the label of an eye's view adds to that of its pair.
inline constexpr std::string_view kLeftEye = " (left eye)", kRightEye = " (right eye)";

}  // namespace whorl::plate
