// SPDX-License-Identifier: Apache-2.0
// From the name of a file to a shell in its place.
#include "compile/encrusters.h"

#include "compile/compile.h"
#include "growth/surface_frame.h"
#include "specimen/scene_file.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <limits>

namespace whorl::compile {
namespace {

constexpr double kDeepest = 0.6;  // of the wall, as feet of other elements

// The other shell's frame on the surface: its axis of coiling is z, growth towards +z, so that the apex looks along -z.
Frame frame_on(const growth::SurfaceFrame& f, const specimen::Encruster& e, bool mirrored) {
  const double turn = radians(e.turn_deg);
  const Vec3 ahead = std::cos(turn) * f.forward + std::sin(turn) * f.normal.cross(f.forward);
  const Vec3 aside = f.normal.cross(ahead);
  Frame frame;
  if (e.pose.value == specimen::Pose::kUpright)
    frame = {ahead, -aside, -f.normal};
  else
    frame = {f.normal, aside, -ahead};
  if (frame.x.cross(frame.y).dot(frame.z) < 0.0) frame.y = -frame.y;
  if (mirrored) frame.y = -frame.y;
  return frame;
}

// How far the shell reaches against the surface's normal from its own pole.
double reach_below(const scene::Scene& guest, const Frame& frame, const Vec3& normal) {
  double lowest = std::numeric_limits<double>::infinity();
  for (const Vec3& p : growth::surface_points(exterior_of(guest), 180, 96)) lowest = std::min(lowest, frame.to_world(p).dot(normal));
  return lowest;
}

}  // namespace

void build_encrusters(scene::Scene& scene, const specimen::Specimen& specimen, const growth::Exterior& shell, Faults& faults) {
  for (const specimen::Encruster& e : specimen.attachments.encrusters) {
    const std::filesystem::path path = std::filesystem::path(specimen.source).parent_path() / e.scene.value;
    const auto refuse = [&](const std::string& why) {
      faults.add(e.scene.where, fmt::format("[[encruster]] scene = \"{}\": {}", e.scene.value, why));
    };
    const double growth = scene.law.theta_lip - kTwoPi * e.behind_lip;
    if (growth < scene.law.theta_start) {
      faults.add(e.behind_lip.where, fmt::format("[[encruster]] behind_lip = {:g}: lies before the tube begins; must be at most {:.3g} whorls",
                                                 e.behind_lip.value, (scene.law.theta_lip - scene.law.theta_start) / kTwoPi));
      continue;
    }
    try {
      const specimen::Specimen other = specimen::read_scene_file(path.string());
      if (!other.attachments.encrusters.empty()) {
        refuse("that shell has encrusters of its own, which is not allowed; take them out of that file");
        continue;
      }
      scene::Guest guest;
      guest.shell = std::make_shared<const scene::Scene>(compile_scene(other));
      const growth::SurfaceFrame f = growth::surface_frame(shell, growth, radians(e.at_deg));
      const double most = kDeepest * scene.wall.thickness(scene.law, f.theta, {std::hypot(f.point.x, f.point.y), f.point.z});
      if (e.sunk_mm > most) {
        faults.add(e.sunk_mm.where, fmt::format("[[encruster]] sunk = {:g} mm: at most {:.3g} mm, three fifths of the wall there", e.sunk_mm.value, most));
        continue;
      }
      guest.frame = frame_on(f, e, other.identity.coiling.value != specimen.identity.coiling.value);
      guest.origin = f.point - f.normal * (reach_below(*guest.shell, guest.frame, f.normal) + e.sunk_mm);
      guest.passage = f.theta;
      guest.series = static_cast<std::uint32_t>(scene.attached.series.size());
      scene.attached.series.push_back({other.look.exterior.value});
      scene.attached.series.push_back({other.look.interior.value});
      scene.attached.guests.push_back(std::move(guest));
    } catch (const diagnostics::InvalidInput& error) {
      const diagnostics::Problem& first = error.problems().front();
      refuse(fmt::format("that file has {} {}, the first in line {}: {}", error.problems().size(), error.problems().size() == 1 ? "fault" : "faults",
                         first.where.line, first.message));
    } catch (const diagnostics::Error& error) {
      refuse(error.what());
    }
  }
}

}  // namespace whorl::compile
