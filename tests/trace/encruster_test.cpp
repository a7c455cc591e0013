// SPDX-License-Identifier: Apache-2.0
// Other scenes' shells on a shell.
#include "diagnostics/error.h"
#include "growth/surface_frame.h"
#include "support/attached_scene.h"
#include "support/catch.h"

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <random>
#include <string>

#include <unistd.h>

using namespace whorl;

namespace {

// Writes a scene beside which others can be named, for as long as it lives.
class SceneFolder {
 public:
  SceneFolder() : path_(std::filesystem::temp_directory_path() / ("whorl_attached_" + std::to_string(::getpid()))) {
    std::filesystem::create_directories(path_);
  }
  ~SceneFolder() { std::filesystem::remove_all(path_); }
  SceneFolder(const SceneFolder&) = delete;
  SceneFolder& operator=(const SceneFolder&) = delete;
  std::string write(const std::string& name, const std::string& text) const {
    std::ofstream(path_ / name) << text;
    return (path_ / name).string();
  }

 private:
  std::filesystem::path path_;
};

std::string complaint_of_file(const std::string& path) {
  try {
    compile::compile_scene(specimen::read_scene_file(path));
  } catch (const diagnostics::InvalidInput& error) {
    return error.what();
  }
  return "";
}

const char* const kSmallShell =
    "format = 1\n[specimen]\nname = \"Parva insidens\"\ncoiling = \"sinistral\"\n[growth]\nwhorls = 3.0\nW = 2.2\nD = 0.1\nT = 1.2\n"
    "[size]\nshell_height = 4\n[wall]\nthickness = 0.2\n[lip]\nthickness = 0.3\n";

}  // namespace

TEST_CASE("An encruster is its own scene's shell at its own size, set down where stated", "[attached]") {
  const SceneFolder folder;
  folder.write("small.toml", kSmallShell);
  for (const char* pose : {"upright", "lying"}) {
    const std::string path = folder.write("host.toml", test::open_coil_scene() + "[[encruster]]\nscene = \"small.toml\"\nbehind_lip = 0.3\nat = 60\nturn = 50\npose = \"" + pose + "\"\n");
    const scene::Scene scene = compile::compile_scene(specimen::read_scene_file(path));
    const field::Field field(scene);
    const trace::AttachedSolids attached(field);
    REQUIRE(scene.attached.guests.size() == 1);
    CHECK(attached.size() == 1);
    CAPTURE(pose);
    const scene::Guest& guest = scene.attached.guests[0];
    const growth::SurfaceFrame f = growth::surface_frame(compile::exterior_of(scene), scene.law.theta_lip - 0.3 * kTwoPi, radians(60.0));
    // A frame of unit vectors, mirrored since the two coil opposite ways.
    const Frame& g = guest.frame;
    CHECK(g.x.cross(g.y).dot(g.z) == Approx(-1.0));
    CHECK(g.z.dot(f.normal) == Approx(std::string(pose) == "upright" ? -1.0 : 0.0).margin(1e-9));
    // It holds what its own field holds, and touches the surface's plane with its lowest place.
    const field::Field own(*guest.shell);
    std::mt19937_64 engine(9);
    std::uniform_real_distribution<double> uniform;
    const Box3& box = guest.shell->bounds;
    int held = 0;
    double lowest = 1e9, highest = -1e9;
    for (int i = 0; i < 60000; ++i) {
      const Vec3 p = box.min + (box.max - box.min) * Vec3(uniform(engine), uniform(engine), uniform(engine));
      const bool solid = own.place_at(p).state == field::State::kSolid;
      const Vec3 q = guest.origin + g.to_world(p);
      CHECK(attached.holds(q) == solid);
      if (!solid) continue;
      ++held;
      lowest = std::min(lowest, (q - f.point).dot(f.normal));
      highest = std::max(highest, (q - f.point).dot(f.normal));
    }
    CHECK(held > 2000);
    CHECK(lowest == Approx(0.0).margin(0.15));
    if (std::string(pose) == "upright") CHECK(highest - lowest == Approx(4.0).margin(0.2));
    // Rays: from straight above onto the middle of it.
    const Vec3 middle = 0.5 * (scene::box_of(guest).min + scene::box_of(guest).max);
    trace::Ray ray;
    ray.origin = Vec3f(middle + 20.0 * f.normal);
    ray.direction = Vec3f(-f.normal);
    trace::Hit hit;
    REQUIRE(attached.closest(ray, hit));
    CHECK(hit.part == trace::Part::kOrnament);
    CHECK(attached.occluded(ray));
    CHECK(own.place_at(g.to_frame(Vec3(hit.position) - 0.02 * f.normal - guest.origin)).state == field::State::kSolid);
    CHECK(hit.normal.dot(Vec3f(f.normal)) > 0.0f);
  }
}

TEST_CASE("An encruster that cannot be had is told of where it is named", "[attached]") {
  const SceneFolder folder;
  folder.write("small.toml", kSmallShell);
  folder.write("broken.toml", "format = 1\n[growth]\nwhorls = 3.0\n");
  folder.write("nested.toml", std::string(kSmallShell) + "[[encruster]]\nscene = \"small.toml\"\nbehind_lip = 0.5\nat = 0\n");
  const auto complaint = [&](const std::string& rest) { return complaint_of_file(folder.write("host.toml", test::open_coil_scene() + "[[encruster]]\n" + rest)); };
  CHECK(complaint("scene = \"small.toml\"\nbehind_lip = 0.3\nat = 60\n").empty());
  const auto says = [](const std::string& text, const std::string& words) { return text.find(words) != std::string::npos; };
  CHECK(says(complaint("scene = \"none.toml\"\nbehind_lip = 0.3\nat = 60\n"), "[[encruster]] scene = \"none.toml\""));
  CHECK(says(complaint("scene = \"broken.toml\"\nbehind_lip = 0.3\nat = 60\n"), "that file has "));
  CHECK(says(complaint("scene = \"nested.toml\"\nbehind_lip = 0.3\nat = 60\n"), "encrusters of its own"));
  CHECK(says(complaint("scene = \"host.toml\"\nbehind_lip = 0.3\nat = 60\n"), "encrusters of its own"));
  CHECK(says(complaint("scene = \"small.toml\"\nbehind_lip = 0.3\nat = 60\nsunk = 5\n"), "three fifths of the wall"));
  CHECK(says(complaint("scene = \"small.toml\"\nbehind_lip = 3.9\nat = 60\n"), "lies before the tube begins"));
}
