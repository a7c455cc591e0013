// SPDX-License-Identifier: Apache-2.0
// Colours on a compiled shell: lip, callus, growth lines, and computed patterns.
#include "transport/paint.h"

#include "compile/compile.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

#include <cmath>

using namespace whorl;
using support::SceneText;

namespace {

struct Shell {
  specimen::Specimen specimen;
  scene::Scene scene;
  field::Field field;
  transport::Paint paint;

  explicit Shell(const SceneText& text)
      : specimen(specimen::parse_scene(text.text(), "scene")),
        scene(compile::compile_scene(specimen)),
        field(scene),
        paint(field, specimen.look, specimen.colouring) {}

  /// A hit on the outside at a growth angle and a section angle, as rays would report it.
  trace::Hit outside(double theta, double psi) const {
    const double reach = scene.outlines[scene.stations.front().outer].reach.value(psi);
    const growth::HalfPlanePoint p =
        scene.law.to_half_plane(scene.law.at(theta), {reach * std::cos(psi), reach * std::sin(psi)});
    trace::Hit hit;
    hit.position = Vec3f(Vec3(p.rho * std::cos(theta), p.rho * std::sin(theta), p.z));
    hit.part = trace::Part::kExterior;
    hit.passage = theta;
    return hit;
  }
};

SceneText plain() {
  SceneText text;
  text.set("growth", "whorls", "4").set("growth", "W", "1.8").set("growth", "D", "0.1").set("growth", "T", "1.5");
  return text.set("look", "exterior", "\"#ff0000\"").set("look", "interior", "\"#0000ff\"");
}

}  // namespace

TEST_CASE("Without a stated lip the outside and the inside meet half and half at the rim's crest", "[transport]") {
  const Shell shell(plain());
  const double lip = shell.scene.law.theta_lip;
  // Growth angle of the crest: half the lip's thickness beyond the front.
  trace::Hit hit = shell.outside(lip, 0.0);
  const double rho = std::hypot(hit.position.x, hit.position.y);
  hit = shell.outside(lip + shell.scene.front.rim_radius / rho, 0.0);
  CHECK(shell.paint.behind_rim(Vec3(hit.position), hit.passage) == Approx(0.0).margin(2e-3));
  const Vec3f out = shell.paint.albedo(hit);
  hit.part = trace::Part::kInterior;
  const Vec3f in = shell.paint.albedo(hit);
  CHECK((out - in).length() < 0.01f);
  CHECK(out.x == Approx(0.5f).margin(0.01));
  CHECK(out.z == Approx(0.5f).margin(0.01));
  const trace::Hit behind = shell.outside(lip - 0.5, 0.0);
  CHECK(shell.paint.albedo(behind) == Vec3f(1.0f, 0.0f, 0.0f));
}

TEST_CASE("A stated lip colours the rim on both sides and not the wall behind its breadth", "[transport]") {
  const Shell shell(plain().set("look", "lip", "\"#00ff00\"").set("look", "lip_breadth", "1.0"));
  trace::Hit hit = shell.outside(shell.scene.law.theta_lip, 0.3);
  CHECK(shell.paint.albedo(hit) == Vec3f(0.0f, 1.0f, 0.0f));
  hit.part = trace::Part::kInterior;
  CHECK(shell.paint.albedo(hit) == Vec3f(0.0f, 1.0f, 0.0f));
  const double rho = std::hypot(hit.position.x, hit.position.y);
  CHECK(shell.paint.albedo(shell.outside(shell.scene.law.theta_lip - 1.5 / rho, 0.3)) == Vec3f(1.0f, 0.0f, 0.0f));
}

TEST_CASE("Callus covers what is seen of earlier shell in the lumen, and its breadth round the aperture", "[transport]") {
  const Shell shell(plain().set("look", "callus", "\"#00ff00\"").set("look", "callus_breadth", "1.5"));
  const double lip = shell.scene.law.theta_lip;
  trace::Hit hit = shell.outside(lip - kTwoPi - 1.0, -1.0);
  hit.part = trace::Part::kInterior;
  hit.parietal = true;
  CHECK(shell.paint.albedo(hit) == Vec3f(0.0f, 1.0f, 0.0f));
  // Ahead of the lip on the whorl before: near the mouth's outline callus, half a turn on bare shell.
  int covered = 0, bare = 0;
  for (double psi = -kPi; psi < kPi; psi += 0.05) {
    covered += shell.paint.callus_share(shell.outside(lip - kTwoPi + 0.05, psi)) > 0.9f;
    bare += shell.paint.callus_share(shell.outside(lip - kTwoPi + 2.0, psi)) == 0.0f;
  }
  CHECK(covered > 5);
  CHECK(bare == 126);
  // The last whorl itself carries none.
  for (double psi = -kPi; psi < kPi; psi += 0.05) CHECK(shell.paint.callus_share(shell.outside(lip - 0.3, psi)) == 0.0f);
}

TEST_CASE("A flame runs parallel to the inclined lip", "[transport]") {
  SceneText text = plain().set("lip", "inclination", "25").set("flame", "per_whorl", "4").set("flame", "breadth", "0.5");
  const Shell shell(text.set("flame", "colour", "\"#00ff00\"").set("flame", "fade", "0"));
  // On a curve that keeps a stage of the growth front, the flame's cover does not change.
  for (const double stage : {2.99, 3.01, 3.12, 3.13}) {
    const bool green = shell.paint.albedo(shell.outside(kTwoPi * stage, 0.0)).y > 0.5f;
    const auto lead = [&](double theta, double psi) {
      const Vec3 p(shell.outside(theta, psi).position);
      return growth::front_lead(shell.scene.front.tan_inclination, shell.scene.law.at(theta).depth,
                                {std::hypot(p.x, p.y), p.z});
    };
    const double in_the_middle = lead(kTwoPi * stage, 0.0);
    for (double psi = -1.2; psi <= 1.2; psi += 0.1) {
      double theta = kTwoPi * stage;
      for (int round = 0; round < 60; ++round) theta = kTwoPi * stage - in_the_middle + lead(theta, psi);
      CAPTURE(stage, psi, theta);
      CHECK((shell.paint.albedo(shell.outside(theta, psi)).y > 0.5f) == green);
    }
  }
}

TEST_CASE("Bands begin and end where they are stated", "[transport]") {
  SceneText text = plain().set("band", "at", "0").set("band", "width", "60").set("band", "colour", "\"#00ff00\"");
  const Shell shell(text.set("band", "onset", "2").set("band", "end", "3"));
  CHECK(shell.paint.albedo(shell.outside(kTwoPi * 1.95, 0.0)).y == 0.0f);
  CHECK(shell.paint.albedo(shell.outside(kTwoPi * 2.5, 0.0)).y == 1.0f);
  CHECK(shell.paint.albedo(shell.outside(kTwoPi * 3.05, 0.0)).y == 0.0f);
}

TEST_CASE("A computed pattern is the same for the same seed, and its stripes split as the growth law widens the edge",
          "[transport]") {
  const auto text = [](const char* seed) {
    SceneText scene = plain().set("pattern", "activator_decay", "150").set("pattern", "inhibitor_decay", "400");
    scene.set("pattern", "activator_base", "0.02").set("pattern", "activator_spread", "1").set("pattern", "seed", seed);
    return scene.set("pattern", "inhibitor_spread", "40").set("pattern", "colour", "\"#000000\"");
  };
  const Shell shell(text("3"));
  const scene::EdgePattern& pattern = shell.scene.edge_patterns.at(0);
  const auto stripes = [&](double turn) {
    int count = 0;
    bool before = pattern.level(turn, 0.0) > 1.2f;
    for (int i = 1; i <= 4096; ++i) {
      const bool now = pattern.level(turn, kTwoPi * i / 4096) > 1.2f;
      count += now && !before;
      before = now;
    }
    return count;
  };
  // The edge doubles in ln 2 / ln 1.8 = 1.18 whorls; stripes keep their distance, so their number about doubles.
  CHECK(stripes(2.6) > 3);
  CHECK(stripes(3.8) > 1.5 * stripes(2.6));
  CHECK(stripes(3.8) < 3.0 * stripes(2.6));
  CHECK(Shell(text("3")).scene.edge_patterns.at(0).levels == pattern.levels);
  CHECK(Shell(text("4")).scene.edge_patterns.at(0).levels != pattern.levels);
}
