// SPDX-License-Identifier: Apache-2.0
// Stereo pairs and labelled radiographs on the plate, in caption and record.
#include "diagnostics/error.h"
#include "plate/ball_shell.h"
#include "plate/caption.h"
#include "plate/ink.h"
#include "plate/record.h"
#include "support/catch.h"

#include <cmath>

using namespace whorl;
using namespace whorl::plate;
using namespace whorl::test_plate;
using specimen::PanelLook;
using specimen::ViewName;

namespace {

specimen::Specimen one_panel(ViewName view, PanelLook look, bool stereo) {
  specimen::Specimen s = demo_specimen(300.0);
  s.plate.panels.clear();
  add_panel(s, view);
  s.plate.panels[0].look.value = look;
  s.plate.panels[0].stereo.value = stereo;
  s.stereo.angle_deg.value = 6.0;
  s.stereo.spacing_mm.value = 60.0;
  s.radiograph.energy_kev.value = 20.0;
  return s;
}

FigurePlan plan_of(const specimen::Specimen& s) {
  const std::vector<View> views = views_of(s);
  return plan_figure(s, views, extents_of(coil_of_balls(s, 24.0), views));
}

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

}  // namespace

TEST_CASE("The pictures of a pair stand apart by the spacing, the left eye's on the left", "[plate][stereo]") {
  for (const double width : {90.0, 120.0, 180.0}) {
    specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kNatural, true);
    s.plate.width_mm.value = width;
    const FigurePlan plan = plan_of(s);
    REQUIRE(plan.panels.size() == 2);
    const FigurePanel &left = plan.panels[0], &right = plan.panels[1];
    CHECK((left.eye == Eye::kLeft && right.eye == Eye::kRight));
    CHECK(left.rect.right() == right.rect.x);
    const double apart = right.rect.x + right.pole_px.x - left.rect.x - left.pole_px.x;
    CHECK(apart == Approx(60.0 / 25.4 * 300.0).margin(1e-6));
    CHECK(left.mm_per_pixel == right.mm_per_pixel);
    CHECK(left.extents_mm.width() / left.mm_per_pixel <= apart);
    // Each picture lies within its own half.
    for (const FigurePanel& p : {left, right}) {
      CHECK(p.pole_px.x - p.extents_mm.left / p.mm_per_pixel >= 0.0);
      CHECK(p.pole_px.x + p.extents_mm.right / p.mm_per_pixel <= p.rect.width);
    }
    CHECK(right.letter.empty());
    CHECK(plan.bars.size() == 1);
  }
}

TEST_CASE("What is nearer to the reader stands farther right for the left eye, by the angle between the eyes", "[plate][stereo]") {
  const specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kNatural, true);
  const FigurePlan plan = plan_of(s);
  const View middle = views_of(s)[0];
  const transport::Camera left = plan.panels[0].camera(50.0), right = plan.panels[1].camera(50.0);
  constexpr double kNear = 3.0;  // mm in front of the axis
  const Vec3 near = middle.page_to_shell.z * kNear;
  const double disparity = (left.project(near).x - left.anchor_px.x) - (right.project(near).x - right.anchor_px.x);
  CHECK(disparity * left.mm_per_px == Approx(2.0 * kNear * std::sin(radians(3.0))));
  CHECK(left.project(near).y - left.anchor_px.y == Approx(right.project(near).y - right.anchor_px.y));
}

TEST_CASE("Light and cut of a pair are those of the view between the eyes", "[plate][stereo]") {
  const specimen::Specimen s = one_panel(ViewName::kAxialSection, PanelLook::kNatural, true);
  const Frame middle = views_of(s)[0].page_to_shell;
  for (const FigurePanel& panel : plan_of(s).panels) {
    CHECK(panel.view.fixed_page.z == middle.z);
    CHECK(panel.view.fixed_page.x == middle.x);
    CHECK(panel.view.page_to_shell.z.dot(middle.z) == Approx(std::cos(radians(3.0))));
  }
}

TEST_CASE("A radiograph carries its label beside the letter, clear of letter and picture", "[plate][radiograph]") {
  const FigurePlan plan = plan_of(one_panel(ViewName::kApertural, PanelLook::kRadiograph, false));
  REQUIRE(plan.panels.size() == 1);
  CHECK(plan.panels[0].label == "computed radiograph, 20 keV");
  const std::vector<Ink> ink = all_ink(plan);
  const Ink &letter = ink[0], &label = ink[1];
  CHECK(letter.place.right() < label.place.x);
  CHECK(label.place.right() <= plan.panels[0].rect.right());
  CHECK(label.place.bottom() <= plan.panels[0].rect.y);
  CHECK(label.place.y >= 0);
}

TEST_CASE("A panel too narrow for the label of a radiograph is refused", "[plate][radiograph]") {
  specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kRadiograph, false);
  s.plate.width_mm.value = 25.0;
  CHECK_THROWS_AS(plan_of(s), diagnostics::InvalidInput);
}

TEST_CASE("Caption and record say what was computed: radiograph, whitening and pair", "[plate][caption][record]") {
  specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kRadiograph, false);
  add_panel(s, ViewName::kApical);
  s.plate.panels[1].look.value = PanelLook::kWhitened;
  s.plate.panels[1].stereo.value = true;
  const FigurePlan plan = plan_of(s);
  const std::string caption = make_caption(plan, s, {});
  CHECK(contains(caption, "A, apertural view, computed radiograph, 20 keV. B, apical view, whitened, stereo pair for parallel "
                          "viewing (6°)."));
  CHECK(contains(caption, "The whitening is computed: no specimen was coated."));
  CHECK(contains(caption, "no X-ray picture of a specimen"));
  const std::vector<transport::Film> none(plan.panels.size());
  const nlohmann::ordered_json record = make_record(plan, s, none, {});
  REQUIRE(record["panels"].size() == 3);
  CHECK(record["panels"][0]["look"] == "computed radiograph");
  CHECK(record["panels"][0]["label"] == "computed radiograph, 20 keV");
  CHECK(record["panels"][1]["look"] == "whitened");
  CHECK(record["panels"][1]["eye"] == "left");
  CHECK(record["panels"][2]["eye"] == "right");
  CHECK(record["radiograph"]["attenuation_per_mm"].get<double>() == Approx(1.669).epsilon(0.005));  // row C34c
  CHECK(record["stereo"]["angle_deg"] == 6.0);
}

TEST_CASE("A figure in the natural look says nothing of radiographs, whitening or pairs", "[plate][caption]") {
  const specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kNatural, false);
  const FigurePlan plan = plan_of(s);
  const std::string caption = make_caption(plan, s, {});
  for (const char* word : {"radiograph", "whiten", "stereo"}) CHECK_FALSE(contains(caption, word));
  const nlohmann::ordered_json record = make_record(plan, s, std::vector<transport::Film>(1), {});
  CHECK_FALSE(record.contains("radiograph"));
  CHECK_FALSE(record.contains("stereo"));
}

TEST_CASE("A contact sheet has a shell and a labelled panel for each pair of W and T, row by row", "[plate][sheet]") {
  specimen::Specimen s = one_panel(ViewName::kApertural, PanelLook::kNatural, false);
  s.contact_sheet.W.value = {1.4, 2.0, 3.0};
  s.contact_sheet.T.value = {0.5, 2.0};
  const std::vector<specimen::Specimen> shells = sheet_shells(s);
  REQUIRE(shells.size() == 6);
  CHECK(shells[1].growth.W.value.at(0).W == 2.0);
  CHECK(shells[1].growth.T == 0.5);
  CHECK(shells[3].growth.W.value.at(0).W == 1.4);
  CHECK(shells[3].growth.T == 2.0);
  const specimen::Specimen sheet = sheet_plate(s);
  const FigurePlan plan = plan_of(sheet);
  REQUIRE(plan.panels.size() == 6);
  CHECK(plan.panels[0].label == "W 1.4, T 0.5");
  CHECK(plan.panels[5].label == "W 3, T 2");
  CHECK(plan.panels[2].rect.y == plan.panels[0].rect.y);
  CHECK(plan.panels[3].rect.x == plan.panels[0].rect.x);
  CHECK(plan.panels[3].rect.y > plan.panels[0].rect.y);
  CHECK(contains(make_caption(plan, sheet, {}),
                 "Contact sheet: apertural view, W = 1.4, 2 and 3 from left to right, T = 0.5 and 2 from top to bottom."));
}
