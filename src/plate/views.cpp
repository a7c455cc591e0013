// SPDX-License-Identifier: Apache-2.0
// Where each named view stands, and the mirror that makes a sinistral shell.
#include "plate/views.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::plate {
namespace {

using specimen::Coiling;
using specimen::ViewName;

/// Sine and cosine that are exact at quarter turns, so that a straight view has no stray 1e-16 in its frame.
struct Turn {
  double cosine, sine;
};

Turn turn(double angle_deg) {
  const double quarters = angle_deg / 90.0;
  if (quarters == std::floor(quarters)) {
    switch (static_cast<int>(std::fmod(std::fmod(quarters, 4.0) + 4.0, 4.0))) {
      case 0: return {1.0, 0.0};
      case 1: return {0.0, 1.0};
      case 2: return {-1.0, 0.0};
      default: return {0.0, -1.0};
    }
  }
  const double angle = radians(angle_deg);
  return {std::cos(angle), std::sin(angle)};
}

/// 0 <= angle < 360.
double whole_circle(double angle_deg) {
  const double rest = std::fmod(angle_deg, 360.0);
  return rest < 0.0 ? rest + 360.0 : rest + 0.0;
}

struct Stand {
  const char* label;
  double azimuth_deg, elevation_deg;
};

Stand stand_of(ViewName name, Coiling coiling) {
  switch (name) {
    case ViewName::kApertural: return {"apertural view", 0.0, 0.0};
    case ViewName::kAbapertural: return {"abapertural view", 180.0, 0.0};
    case ViewName::kRightLateral: return {"right lateral view", 90.0, 0.0};
    case ViewName::kLeftLateral: return {"left lateral view", 270.0, 0.0};
    case ViewName::kApical: return {"apical view", 0.0, 90.0};
    case ViewName::kUmbilical: return {"umbilical view", 0.0, -90.0};
    case ViewName::kAxialSection:
      // The same half of growth is taken away from a sinistral shell, so its section is the mirror image too.
      return {"axial section", coiling == Coiling::kDextral ? kSectionBehindLip : 360.0 - kSectionBehindLip, 0.0};
    case ViewName::kFree: break;
  }
  return {"", 0.0, 0.0};
}

}  // namespace

Frame page_frame(double lip_rad, Coiling coiling, double azimuth_deg, double elevation_deg) {
  // Outwards at the lip. The mirror through the plane of the axis and the direction of growth turns it round; this
  // mirror leaves the apertural view facing the reader.
  const double side = coiling == Coiling::kDextral ? 1.0 : -1.0;
  const Vec3 outwards = Vec3(std::cos(lip_rad), std::sin(lip_rad), 0.0) * side;
  const Vec3 onwards(-std::sin(lip_rad), std::cos(lip_rad), 0.0);
  const Vec3 apexwards(0.0, 0.0, -1.0);

  const Turn walk = turn(azimuth_deg), rise = turn(elevation_deg);
  const Vec3 horizontal = onwards * walk.cosine + outwards * walk.sine;
  Frame frame;
  frame.x = outwards * walk.cosine - onwards * walk.sine;
  frame.y = apexwards * rise.cosine - horizontal * rise.sine;
  frame.z = horizontal * rise.cosine + apexwards * rise.sine;
  return frame;
}

View make_view(ViewName name, double lip_rad, Coiling coiling, double free_azimuth_deg, double free_elevation_deg) {
  Stand stand = stand_of(name, coiling);
  if (name == ViewName::kFree) {
    stand.azimuth_deg = whole_circle(free_azimuth_deg);
    stand.elevation_deg = std::clamp(free_elevation_deg, -90.0, 90.0);
  }
  View view;
  view.name = name;
  view.azimuth_deg = stand.azimuth_deg;
  view.elevation_deg = stand.elevation_deg;
  view.label = name == ViewName::kFree
                   ? fmt::format("view from azimuth {:g}°, elevation {:g}°", view.azimuth_deg, view.elevation_deg)
                   : stand.label;
  view.page_to_shell = page_frame(lip_rad, coiling, view.azimuth_deg, view.elevation_deg);
  view.fixed_page = view.page_to_shell;
  view.cut = name == ViewName::kAxialSection;
  return view;
}

View make_view(const specimen::Panel& panel, const specimen::Stereo& stereo, double lip_rad, Coiling coiling) {
  View view = make_view(panel.view.value, lip_rad, coiling, panel.azimuth_deg, panel.elevation_deg);
  if (panel.stereo) view.stereo_deg = stereo.angle_deg;
  return view;
}

View eye_view(const View& pair, Eye eye) {
  View view = pair;
  const Turn half = turn(0.5 * pair.stereo_deg * (eye == Eye::kLeft ? -1.0 : 1.0));
  const Frame& page = pair.page_to_shell;
  view.page_to_shell.z = page.z * half.cosine + page.x * half.sine;
  view.page_to_shell.x = page.x * half.cosine - page.z * half.sine;
  view.label += eye == Eye::kLeft ? kLeftEye : kRightEye;
  view.stereo_deg = 0.0;
  return view;
}

}  // namespace whorl::plate
