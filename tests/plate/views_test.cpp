// SPDX-License-Identifier: Apache-2.0
// The named views against the trade's definitions of them.
#include "plate/views.h"

#include "plate/figure_plan.h"
#include "support/catch.h"

#include <cmath>
#include <utility>
#include <vector>

namespace whorl::plate {
namespace {

using specimen::Coiling;
using specimen::ViewName;

constexpr double kLips[] = {0.3, 2.0, kTwoPi * 7.25, kTwoPi * 4.6};

Vec3 outwards_at(double theta) { return {std::cos(theta), std::sin(theta), 0.0}; }
Vec3 onwards_at(double theta) { return {-std::sin(theta), std::cos(theta), 0.0}; }

double handedness(const Frame& f) { return f.x.cross(f.y).dot(f.z); }

bool near(const Vec3& a, const Vec3& b) { return (a - b).length() < 1e-12; }

// A reader who stands in front of the shell as it is seen sees it from `z`; his right hand points along `x`.
Vec3 mirrored(const Vec3& v, double lip) {
  const Vec3 out = outwards_at(lip);
  return v - out * (2.0 * v.dot(out));
}

constexpr ViewName kNamed[] = {ViewName::kApertural, ViewName::kAbapertural, ViewName::kRightLateral, ViewName::kLeftLateral,
                               ViewName::kApical, ViewName::kUmbilical, ViewName::kAxialSection};

}  // namespace

TEST_CASE("In apertural view, apex up, the aperture is on the reader's right for dextral and on his left for sinistral shells",
          "[plate][views]") {
  for (const double lip : kLips) {
    const Vec3 aperture = outwards_at(lip) * 3.0 + Vec3(0.0, 0.0, 10.0);
    const Vec3 onward_normal = onwards_at(lip);
    for (const Coiling coiling : {Coiling::kDextral, Coiling::kSinistral}) {
      const Frame page = make_view(ViewName::kApertural, lip, coiling).page_to_shell;
      const Vec3 on_page = page.to_frame(aperture);
      CHECK(on_page.x == Approx(coiling == Coiling::kDextral ? 3.0 : -3.0));
      CHECK(on_page.y == Approx(-10.0));                         // growth goes down the page: apex up
      CHECK(page.to_frame(onward_normal).z == Approx(1.0));      // the aperture faces the reader
    }
  }
}

TEST_CASE("A dextral page has a right-handed frame and a sinistral one a left-handed frame, in every view", "[plate][views]") {
  for (const double lip : kLips)
    for (const ViewName name : kNamed) {
      CHECK(handedness(make_view(name, lip, Coiling::kDextral).page_to_shell) == Approx(1.0));
      CHECK(handedness(make_view(name, lip, Coiling::kSinistral).page_to_shell) == Approx(-1.0));
    }
}

TEST_CASE("Every picture of a sinistral shell is the mirror image of a picture of the dextral one", "[plate][views]") {
  // Left and right lateral change places; all others mirror themselves.
  const std::pair<ViewName, ViewName> pairs[] = {
      {ViewName::kApertural, ViewName::kApertural},       {ViewName::kAbapertural, ViewName::kAbapertural},
      {ViewName::kRightLateral, ViewName::kLeftLateral},  {ViewName::kLeftLateral, ViewName::kRightLateral},
      {ViewName::kApical, ViewName::kApical},             {ViewName::kUmbilical, ViewName::kUmbilical},
      {ViewName::kAxialSection, ViewName::kAxialSection},
  };
  for (const double lip : kLips)
    for (const auto& [sinistral, dextral] : pairs) {
      const Frame s = make_view(sinistral, lip, Coiling::kSinistral).page_to_shell;
      const Frame d = make_view(dextral, lip, Coiling::kDextral).page_to_shell;
      CHECK(near(s.x, -d.x));
      CHECK(near(s.y, d.y));
      CHECK(near(s.z, d.z));
    }
}

TEST_CASE("The right lateral view shows the side that lies to the reader's right in the apertural view", "[plate][views]") {
  for (const double lip : kLips)
    for (const Coiling coiling : {Coiling::kDextral, Coiling::kSinistral}) {
      const Frame front = make_view(ViewName::kApertural, lip, coiling).page_to_shell;
      CHECK(near(make_view(ViewName::kRightLateral, lip, coiling).page_to_shell.z, front.x));
      CHECK(near(make_view(ViewName::kLeftLateral, lip, coiling).page_to_shell.z, -front.x));
      CHECK(near(make_view(ViewName::kAbapertural, lip, coiling).page_to_shell.z, -front.z));
    }
}

TEST_CASE("With growing azimuth the reader of either shell walks to his right", "[plate][views]") {
  for (const double lip : kLips)
    for (const Coiling coiling : {Coiling::kDextral, Coiling::kSinistral})
      for (const double azimuth : {0.0, 40.0, 135.0, 250.0, 359.0}) {
        const Frame here = page_frame(lip, coiling, azimuth, 0.0), there = page_frame(lip, coiling, azimuth + 5.0, 0.0);
        CHECK(here.to_frame(there.z).x == Approx(std::sin(radians(5.0))));
        CHECK(here.to_frame(there.z).z == Approx(std::cos(radians(5.0))));
      }
}

TEST_CASE("The physical sinistral shell is seen through a right-handed page", "[plate][views]") {
  // The frame is that of the dextral solid; carried over to the mirror image it must be a page that exists.
  for (const double lip : kLips)
    for (const double azimuth : {0.0, 60.0, 200.0})
      for (const double elevation : {-90.0, -30.0, 0.0, 75.0}) {
        const Frame s = page_frame(lip, Coiling::kSinistral, azimuth, elevation);
        const Frame seen{mirrored(s.x, lip), mirrored(s.y, lip), mirrored(s.z, lip)};
        CHECK(handedness(seen) == Approx(1.0));
        const Frame d = page_frame(lip, Coiling::kDextral, azimuth, elevation);
        CHECK(near(seen.x, d.x));
        CHECK(near(seen.z, d.z));
      }
}

TEST_CASE("Apical and umbilical views are one another turned over about a horizontal line of the page", "[plate][views]") {
  for (const double lip : kLips)
    for (const Coiling coiling : {Coiling::kDextral, Coiling::kSinistral}) {
      const Frame apical = make_view(ViewName::kApical, lip, coiling).page_to_shell;
      const Frame umbilical = make_view(ViewName::kUmbilical, lip, coiling).page_to_shell;
      CHECK(near(apical.z, {0.0, 0.0, -1.0}));  // the apex points at the reader
      CHECK(near(umbilical.x, apical.x));
      CHECK(near(umbilical.y, -apical.y));
      CHECK(near(umbilical.z, -apical.z));
      CHECK(near(apical.y, -onwards_at(lip)));  // the mouth opens towards the bottom of the page
      CHECK(apical.to_frame(outwards_at(lip)).x == Approx(coiling == Coiling::kDextral ? 1.0 : -1.0));
    }
}

TEST_CASE("The axial section cuts 60 degrees of growth behind the lip on the page's right and takes the lip away",
          "[plate][views]") {
  for (const double lip : kLips) {
    const View section = make_view(ViewName::kAxialSection, lip, Coiling::kDextral);
    CHECK(section.cut);
    CHECK(near(section.page_to_shell.x, outwards_at(lip - radians(60.0))));
    CHECK(near(section.page_to_shell.z, onwards_at(lip - radians(60.0))));
    CHECK(section.page_to_shell.to_frame(outwards_at(lip)).z > 0.5);  // in the half that goes
    const View mirrored_section = make_view(ViewName::kAxialSection, lip, Coiling::kSinistral);
    CHECK(near(mirrored_section.page_to_shell.x, -outwards_at(lip - radians(60.0))));  // on the page's left
    CHECK(mirrored_section.page_to_shell.to_frame(outwards_at(lip)).z > 0.5);
  }
}

TEST_CASE("Straight views of a shell whose lip stands on an axis have frames without rounding", "[plate][views]") {
  const Frame page = page_frame(0.0, Coiling::kDextral, 180.0, 0.0);
  CHECK(page.x == Vec3(-1.0, 0.0, 0.0));
  CHECK(page.z == Vec3(0.0, -1.0, 0.0));
  CHECK(page_frame(0.0, Coiling::kDextral, 0.0, 90.0).z == Vec3(0.0, 0.0, -1.0));
}

TEST_CASE("Free views keep their angles within one turn and between the poles", "[plate][views]") {
  const View view = make_view(ViewName::kFree, 1.0, Coiling::kDextral, -30.0, 120.0);
  CHECK(view.azimuth_deg == Approx(330.0));
  CHECK(view.elevation_deg == 90.0);
  const View tilted = make_view(ViewName::kFree, 1.0, Coiling::kDextral, 30.0, 10.0);
  CHECK(tilted.label == "view from azimuth 30°, elevation 10°");
  CHECK(tilted.page_to_shell.z.z == Approx(-std::sin(radians(10.0))));  // risen towards the apex
}

TEST_CASE("Extents of a cut view leave out what is cut away", "[plate][views]") {
  const View section = make_view(ViewName::kAxialSection, 0.0, Coiling::kDextral);
  const Frame& page = section.page_to_shell;
  const std::vector<Vec3> points = {page.to_world({2.0, -1.0, -3.0}), page.to_world({-1.5, -7.0, -0.5}),
                                    page.to_world({9.0, 9.0, 1.0})};
  const Extents extents = extents_in(section, points);
  CHECK(extents.right == Approx(2.0));
  CHECK(extents.left == Approx(1.5));
  CHECK(extents.below == Approx(7.0));
  CHECK(extents.above == Approx(-1.0));  // nothing reaches up to the pole
}

}  // namespace whorl::plate
