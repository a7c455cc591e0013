// SPDX-License-Identifier: Apache-2.0
// What stands on the shell, measured on the solids themselves: sizes, numbers, places, growth, and what rays find of it.
#include "growth/surface_frame.h"
#include "support/attached_scene.h"
#include "support/catch.h"
#include "support/shell_oracle.h"

#include <algorithm>
#include <cmath>
#include <random>
#include <string>

using namespace whorl;
using test::AttachedShell;

namespace {

// The last place on p + s d, s in [0, most], that is held, found in steps and then by halving; -1 where none is.
double farthest_held(const trace::AttachedSolids& solids, const Vec3& p, const Vec3& d, double most) {
  constexpr int kSteps = 4000;
  double last = -1.0;
  for (int i = 0; i <= kSteps; ++i)
    if (solids.holds(p + most * i / kSteps * d)) last = most * i / kSteps;
  if (last < 0.0) return last;
  double in = last, out = last + most / kSteps;
  for (int i = 0; i < 40; ++i) {
    const double middle = 0.5 * (in + out);
    (solids.holds(p + middle * d) ? in : out) = middle;
  }
  return in;
}

growth::SurfaceFrame frame_at(const AttachedShell& shell, double behind_lip, double psi_deg) {
  return growth::surface_frame(compile::exterior_of(shell.scene), shell.scene.law.theta_lip - kTwoPi * behind_lip, radians(psi_deg));
}

const char* const kEverything =
    "[[spine]]\nper_whorl = 8\nlength = 6\nbreadth = 1.6\nat = 60\nbend = 50\nhollow = 0.6\nopen = 70\nbehind_lip = 0.06\n"
    "[[spine]]\nper_whorl = 5\nlength = 4\nbreadth = 1.0\nat = 20\nbend = -80\ntip = 0.3\nlean = 25\nbehind_lip = 0.1\n"
    "[[stripe]]\nat = 0\nwidth = 9\nheight = 0.6\ncolour = \"#602010\"\n"
    "[[lamella]]\nper_whorl = 6\nheight = 1.2\nthickness = 0.3\nat = -40\nwidth = 70\nlean = 20\nbehind_lip = 0.02\n"
    "[[attached]]\nshape = \"bead\"\nper_whorl = 20\nrows = 3\nheight = 0.7\nbreadth = 1.0\nat = 100\nwidth = 30\nstagger = 0.5\n"
    "colour = \"#204060\"\nirregularity = 0.5\nbehind_lip = 0.03\n"
    "[[attached]]\nshape = \"tube\"\nper_whorl = 7\nheight = 1.5\nbreadth = 1.1\nat = 40\ncolour = \"#808080\"\nbehind_lip = 0.05\n"
    "[[attached]]\nshape = \"cone\"\nper_whorl = 9\nheight = 1.4\nbreadth = 0.9\nat = -75\ncolour = \"#556b2f\"\nbehind_lip = 0.04\n";

}  // namespace

TEST_CASE("A straight spine is as long and as broad as stated, on every whorl in proportion", "[attached]") {
  const AttachedShell shell(test::open_coil_scene(15.0) + "[[spine]]\nper_whorl = 4\nlength = 9\nbreadth = 1.8\nat = 70\nbehind_lip = 0.1\n");
  CHECK(shell.attached.left_out() == 0);
  for (const double behind : {0.1, 0.35, 1.1, 2.1}) {
    const growth::SurfaceFrame f = frame_at(shell, behind, 70.0);
    CAPTURE(behind);
    CHECK(f.scale == Approx(std::pow(2.0, -(shell.scene.law.theta_lip - f.theta) / kTwoPi)));
    CHECK(farthest_held(shell.attached, f.point, f.normal, 12.0 * f.scale) == Approx(9.0 * f.scale).epsilon(0.01));
    // Across at a third of its length: the taper runs straight from the foot to a tip of 8 %.
    const Vec3 third = f.point + 3.0 * f.scale * f.normal;
    const double wide = farthest_held(shell.attached, third, f.forward, 2.0 * f.scale) + farthest_held(shell.attached, third, -f.forward, 2.0 * f.scale);
    CHECK(wide == Approx(1.8 * f.scale * (1.0 - 0.92 / 3.0)).epsilon(0.01));
  }
}

TEST_CASE("A bent spine ends where the arc of its length and angle ends", "[attached]") {
  for (const double bend : {90.0, -60.0}) {
    const AttachedShell shell(test::open_coil_scene() + "[[spine]]\nper_whorl = 4\nlength = 10\nbreadth = 1.4\nat = 80\ntip = 0.2\nbend = " +
                              std::to_string(bend) + "\nbehind_lip = 0.15\n");
    const growth::SurfaceFrame f = frame_at(shell, 0.15, 80.0);
    // Chord of an arc, and its direction off the foot's: both from the angle at the centre. + bends away from the lip.
    const double angle = radians(bend), tip = 0.5 * 1.4 * 0.2, arc = 10.0 - tip;
    const double chord = 2.0 * arc / std::abs(angle) * std::sin(0.5 * std::abs(angle)), whole = (chord + tip) * f.scale;
    const Vec3 towards = std::cos(0.5 * angle) * f.normal - std::sin(0.5 * angle) * f.forward;
    CAPTURE(bend);
    CHECK(farthest_held(shell.attached, f.point, towards, 1.3 * whole) == Approx(whole).epsilon(0.01));
  }
}

TEST_CASE("A hollow spine has its bore, and is open along the front alone", "[attached]") {
  const AttachedShell shell(test::open_coil_scene() +
                            "[[spine]]\nper_whorl = 4\nlength = 8\nbreadth = 2\nat = 80\ntip = 1\nhollow = 0.7\nopen = 60\nbehind_lip = 0.15\n");
  const growth::SurfaceFrame f = frame_at(shell, 0.15, 80.0);
  const Vec3 middle = f.point + 4.0 * f.normal;
  CHECK_FALSE(shell.attached.holds(middle));
  const auto wall = [&](const Vec3& d) {
    double inner = 0.0;
    while (inner < 1.2 && !shell.attached.holds(middle + inner * d)) inner += 1e-4;
    return std::pair(inner, farthest_held(shell.attached, middle, d, 1.5));
  };
  for (const Vec3& d : {-f.forward, f.across, -f.across}) {
    CHECK(wall(d).first == Approx(0.7 * f.scale).epsilon(0.01));
    CHECK(wall(d).second == Approx(1.0 * f.scale).epsilon(0.01));
  }
  CHECK(wall(f.forward).second < 0.0);
  const auto at_angle = [&](double degrees) { return std::cos(radians(degrees)) * f.forward + std::sin(radians(degrees)) * f.across; };
  CHECK(wall(at_angle(27.0)).second < 0.0);
  CHECK(wall(at_angle(33.0)).second > 0.9 * f.scale);
}

TEST_CASE("Lamellae stand in the growth front, as high and as thick as stated", "[attached]") {
  for (const double inclination : {0.0, 25.0, -20.0}) {
    const AttachedShell shell(test::open_coil_scene(inclination) + "[[lamella]]\nper_whorl = 3\nheight = 2\nthickness = 0.4\nbehind_lip = 0.2\n");
    CAPTURE(inclination);
    for (const double behind : {0.2, 1.2}) {
      for (double psi = -170.0; psi < 180.0; psi += 20.0) {
        const growth::SurfaceFrame f = frame_at(shell, behind, psi);
        CAPTURE(behind, psi);
        // Up the growth front, which curves: in small steps across the gradient of growth.
        const auto across_front = [&](const Vec3& p) {
          Vec3 gradient;
          for (int k = 0; k < 3; ++k) {
            Vec3 step(0.0);
            step[k] = 1e-4;
            gradient[k] = shell.field.on_tube(p + step, f.theta).growth - shell.field.on_tube(p - step, f.theta).growth;
          }
          return gradient.normalized();
        };
        Vec3 p = f.point, half = p;
        double most = -1.0;
        Vec3 top = p;
        const double step = 0.002 * f.scale;
        while (shell.field.on_tube(p, f.theta).elevation < 2.5 * f.scale) {
          if (shell.attached.holds(p)) top = p;
          if (shell.field.on_tube(p, f.theta).elevation < f.scale) half = p;
          const Vec3 away = across_front(p);
          p += step * (f.normal - away * away.dot(f.normal)).normalized();
        }
        // Over the surface: by search for its nearest place.
        most = test::nearest_on_tube(shell.scene.law, PeriodicSpline(1.0), top, f.theta).distance;
        CHECK(most == Approx(2.0 * f.scale).epsilon(0.01));
        // At half its height seven tenths of the foot's thickness; the two sides alike, so that it stands on the line.
        const Vec3 front = across_front(half);
        const double ahead = farthest_held(shell.attached, half, front, 0.5 * f.scale);
        const double behind_it = farthest_held(shell.attached, half, -front, 0.5 * f.scale);
        CHECK(ahead + behind_it == Approx(0.28 * f.scale).epsilon(0.05));
        CHECK(ahead == Approx(behind_it).margin(0.02 * f.scale));
      }
    }
  }
}

TEST_CASE("A stripe runs from onset to lip without a gap, as high as stated", "[attached]") {
  const AttachedShell shell(test::open_coil_scene(10.0) + "[[stripe]]\nat = 30\nwidth = 20\nheight = 1.2\nonset = 1.5\ncolour = \"#602010\"\n");
  for (double whorls = 1.51; whorls < 3.999; whorls += 0.013) {
    const growth::SurfaceFrame f = frame_at(shell, 4.0 - whorls, 30.0);
    CAPTURE(whorls);
    CHECK(farthest_held(shell.attached, f.point, f.normal, 2.0 * f.scale) == Approx(1.2 * f.scale).epsilon(0.01));
  }
  CHECK(farthest_held(shell.attached, frame_at(shell, 4.0 - 1.49, 30.0).point, frame_at(shell, 4.0 - 1.49, 30.0).normal, 1.0) < 0.0);
  for (const double aside : {-10.2, 10.2}) {
    const growth::SurfaceFrame f = frame_at(shell, 1.0, 30.0 + aside);
    CHECK_FALSE(shell.attached.holds(f.point + 0.02 * f.normal));
  }
}

TEST_CASE("What stands on the shell grows with the stated power of the whorl's size", "[attached]") {
  for (const double power : {0.0, 0.5, 1.5}) {
    const std::string growth = "growth = " + std::to_string(power) + "\n";
    const AttachedShell shell(test::open_coil_scene() + "[[spine]]\nper_whorl = 4\nlength = 3\nbreadth = 0.5\nat = 80\nbehind_lip = 0.1\nonset = 1.5\n" + growth +
                              "[[attached]]\nshape = \"bead\"\nper_whorl = 4\nheight = 0.5\nbreadth = 0.7\nat = 30\nbehind_lip = 0.1\nonset = 1.5\n"
                              "colour = \"#204060\"\n" + growth +
                              "[[stripe]]\nat = -30\nwidth = 15\nheight = 0.6\nonset = 1.5\ncolour = \"#602010\"\n" + growth);
    CAPTURE(power);
    for (const double behind : {0.1, 1.1, 2.1}) {
      const auto height = [&](double psi) {
        const growth::SurfaceFrame f = frame_at(shell, behind, psi);
        return farthest_held(shell.attached, f.point, f.normal, 5.0);
      };
      const double scale = std::pow(2.0, -power * behind);  // W = 2; no inclination
      CAPTURE(behind);
      CHECK(height(80.0) == Approx(3.0 * scale).epsilon(0.01));
      CHECK(height(30.0) == Approx(0.5 * scale).epsilon(0.01));
      CHECK(height(-30.0) == Approx(0.6 * scale).epsilon(0.012));
    }
  }
}

TEST_CASE("As many stand on a whorl as stated", "[attached]") {
  const AttachedShell shell(test::open_coil_scene() +
                            "[[attached]]\nshape = \"bead\"\nper_whorl = 17\nrows = 4\nwidth = 360\nheight = 0.3\nbreadth = 0.4\nat = 0\n"
                            "colour = \"#204060\"\nbehind_lip = 0.02\nonset = 1\n"
                            "[[spine]]\nper_whorl = 5\nlength = 2\nbreadth = 0.6\nat = 70\nbehind_lip = 0.02\nonset = 1\n");
  // Three whorls from onset to lip.
  CHECK(shell.scene.attached.beads.size() == 17 * 3 * 4);
  CHECK(shell.scene.attached.horns.size() == 5 * 3);
  // Rows a quarter turn apart: a bead stands on each, another on none between.
  const double middle = 0.02 + 1.0 / 17.0;
  for (int row = 0; row < 4; ++row) {
    const growth::SurfaceFrame on = frame_at(shell, middle, 45.0 + 90.0 * row), off = frame_at(shell, middle, 90.0 * row);
    CHECK(farthest_held(shell.attached, on.point, on.normal, 0.6) == Approx(0.3 * on.scale).epsilon(0.01));
    CHECK(farthest_held(shell.attached, off.point, off.normal, 0.6) < 0.0);
  }
}

TEST_CASE("What stands on a self-similar shell is self-similar", "[attached]") {
  // W = 2 whorl on whorl: whole numbers a whorl stand alike on each, twice as large on the next (shell-geometry 4.9).
  const AttachedShell shell(test::open_coil_scene(12.0) +
                            "[[spine]]\nper_whorl = 8\nlength = 6\nbreadth = 1.4\nat = 60\nbend = 50\nhollow = 0.6\nopen = 70\nbehind_lip = 0.06\n"
                            "[[lamella]]\nper_whorl = 6\nheight = 1.2\nthickness = 0.3\nat = -40\nwidth = 70\nlean = 20\nbehind_lip = 0.02\n"
                            "[[attached]]\nshape = \"bead\"\nper_whorl = 20\nrows = 3\nheight = 0.7\nbreadth = 1.0\nat = 100\nwidth = 30\n"
                            "colour = \"#204060\"\nbehind_lip = 0.03\n");
  std::mt19937_64 engine(5);
  std::uniform_real_distribution<double> uniform;
  int held = 0, differ = 0;
  for (int i = 0; i < 200000; ++i) {
    const double growth = 0.2 + uniform(engine), where = uniform(engine), off = uniform(engine) - 0.5;
    const double psi = where < 0.3 ? 60.0 + 20.0 * off : where < 0.7 ? -40.0 + 70.0 * off : 100.0 + 40.0 * off;
    const growth::SurfaceFrame f = frame_at(shell, growth, psi);
    const Vec3 p = f.point + 0.8 * f.scale * uniform(engine) * f.normal;
    const bool here = shell.attached.holds(p), before = shell.attached.holds(0.5 * p);
    held += here;
    differ += here != before;
  }
  CHECK(held > 2000);
  CHECK(differ <= held / 200);  // floats of places at the surface
}

TEST_CASE("Rays meet the first of all that stands in their way, and end where it ends", "[attached]") {
  const AttachedShell shell(test::close_coil_scene() + kEverything);
  CHECK(shell.attached.size() > 150);
  const Vec3 centre = 0.5 * (shell.scene.bounds.min + shell.scene.bounds.max);
  const double radius = 0.75 * (shell.scene.bounds.max - shell.scene.bounds.min).length();
  std::mt19937_64 engine(11);
  std::normal_distribution<double> normal;
  int hits = 0, wrong = 0;
  std::vector<trace::AttachedSolids::Within> within;
  for (int i = 0; i < 1500; ++i) {
    const Vec3 from = centre + radius * Vec3(normal(engine), normal(engine), normal(engine)).normalized();
    const Vec3 to = centre + 0.3 * radius * Vec3(normal(engine), normal(engine), normal(engine)).normalized();
    trace::Ray ray;
    ray.origin = Vec3f(from);
    ray.direction = Vec3f((to - from).normalized());
    trace::Hit hit;
    const bool met = shell.attached.closest(ray, hit);
    CHECK(met == shell.attached.occluded(ray));
    shell.attached.stretches(ray, within);
    CHECK(met == !within.empty());
    // By the solids' own insides, in steps of a hundredth of a millimetre.
    constexpr double kStep = 0.01;
    double first = -1.0, length = 0.0;
    for (double t = 0.5 * radius; t < 1.8 * radius; t += kStep)
      if (shell.attached.holds(Vec3(ray.origin) + t * Vec3(ray.direction))) {
        if (first < 0.0) first = t;
        length += kStep;
      }
    if (first >= 0.0) {
      ++hits;
      // Found where the steps find it, or in something thinner that they step over.
      REQUIRE(met);
      CHECK(static_cast<double>(hit.t) < first + 1e-3);
      const Vec3 p(hit.position), n(hit.normal);
      wrong += shell.attached.holds(p + 2e-3 * n) || !shell.attached.holds(p - 2e-3 * n);
      CHECK(hit.part == trace::Part::kOrnament);
    }
    double sum = 0.0;
    for (const auto& w : within) sum += w.out - w.in;
    CHECK(sum == Approx(length).margin(0.1));
  }
  CHECK(hits > 300);
  CHECK(wrong < hits / 20);  // edges
}

TEST_CASE("Nothing attached stands in a lumen", "[attached]") {
  const AttachedShell shell(test::close_coil_scene() + kEverything);
  CHECK(shell.attached.left_out() > 20);
  std::mt19937_64 engine(3);
  std::uniform_real_distribution<double> uniform;
  const Vec3 size = shell.scene.bounds.max - shell.scene.bounds.min;
  int lumen = 0, in_it = 0;
  for (int i = 0; i < 400000; ++i) {
    const Vec3 p = shell.scene.bounds.min + size * Vec3(uniform(engine), uniform(engine), uniform(engine));
    if (!shell.attached.holds(p)) continue;
    const field::State state = shell.field.place_at(p).state;
    lumen += state != field::State::kOutside;
    in_it += state == field::State::kLumen;
  }
  CHECK(lumen > 100);  // feet in the wall
  CHECK(in_it == 0);
}

TEST_CASE("A leaning spine stands on the surface all round its foot", "[attached]") {
  for (const double lean : {-50.0, 0.0, 50.0}) {
    const AttachedShell shell(test::open_coil_scene() + "[[spine]]\nper_whorl = 3\nlength = 8\nbreadth = 1.5\ntip = 1\nat = 75\nbehind_lip = 0.2\nlean = " + std::to_string(lean) + "\n");
    const growth::SurfaceFrame f = frame_at(shell, 0.2, 75.0);
    const Vec3 axis = std::cos(radians(lean)) * f.normal + std::sin(radians(lean)) * f.forward;
    CAPTURE(lean);
    CHECK(farthest_held(shell.attached, f.point, axis, 10.0) == Approx(8.0 * f.scale).epsilon(0.01));
    // Down its side: where the spine ends it is within the wall, never in the air or the lumen.
    const Vec3 front = (f.forward - axis * axis.dot(f.forward)).normalized(), side = axis.cross(front);
    for (int i = 0; i < 24; ++i) {
      const double turn = kTwoPi * i / 24;
      const Vec3 edge = f.point + 0.73 * f.scale * (std::cos(turn) * front + std::sin(turn) * side) + 2.0 * f.scale * axis;
      double s = 0.0;
      while (s < 6.0 && (shell.attached.holds(edge - s * axis) || s < 0.6 * f.scale)) s += 1e-3;
      CAPTURE(turn);
      CHECK(shell.field.place_at(edge - s * axis).state == field::State::kSolid);
    }
  }
}
