// SPDX-License-Identifier: Apache-2.0
// What a scene states arrives, every key of it; what it leaves out has the default of the format.
#include "specimen/key_table.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/scene_text.h"

#include <algorithm>

using namespace whorl::specimen;
using whorl::support::SceneText;

namespace {

bool same(const Colour& colour, int red, int green, int blue) {
  return colour.red == red && colour.green == green && colour.blue == blue;
}

bool same(const Stages& stages, const std::vector<std::pair<double, double>>& wanted) {
  return std::equal(
      stages.begin(), stages.end(), wanted.begin(), wanted.end(),
      [](const Stage& stage, const auto& pair) { return stage.whorl == pair.first && stage.W == pair.second; });
}

}  // namespace

TEST_CASE("Every key of a scene arrives with its value", "[specimen]") {
  const std::string text = SceneText::with_every_key().text();
  const Specimen s = parse_scene(text, "all.toml");
  CHECK(s.source == "all.toml");
  CHECK(s.text == text);

  CHECK(s.identity.name.value == "Cochlidion argutum");
  CHECK(s.identity.coiling == Coiling::kSinistral);
  CHECK(s.identity.catalogue.value == "the catalogue");
  CHECK(s.identity.author.value == "the author");
  CHECK(s.identity.locality.value == "the locality");
  CHECK(s.identity.note.value == "the note");
  CHECK(s.identity.licence.value == "the licence");
  CHECK(s.identity.mineral == Mineral::kCalcite);

  CHECK(s.growth.whorls == 7.25);
  CHECK(same(s.growth.W, {{0.5, 1.6}, {3.0, 1.5}, {6.25, 1.4}}));
  CHECK(s.growth.D == 0.06);
  CHECK(s.growth.T == 2.6);
  CHECK(s.growth.start == 1.25);
  REQUIRE((s.growth.W_distance && s.growth.W_depth && s.growth.W_section));
  CHECK(same(*s.growth.W_distance, {{0.0, 1.41}}));
  CHECK(same(*s.growth.W_depth, {{0.0, 1.43}}));
  CHECK(same(*s.growth.W_section, {{1.0, 1.7}}));

  CHECK(s.section.S == 1.15);
  CHECK(s.section.roll_deg == -7.5);
  REQUIRE(s.section.lobes.size() == 1);
  CHECK(s.section.lobes[0].at_deg == 60.0);
  CHECK(s.section.lobes[0].reach == 0.2);
  CHECK(s.section.lobes[0].width_deg == 25.0);

  CHECK(s.size.kind == SizeKind::kShellHeight);
  CHECK(s.size.mm == 24.0);
  CHECK(s.wall.thickness_mm == 0.45);
  CHECK(s.wall.growth == WallGrowth::kConstant);
  CHECK(s.wall.columella == 0.18);
  CHECK(s.lip.inclination_deg == 12.0);
  CHECK(s.lip.thickness_mm == 0.8);

  CHECK(same(s.look.exterior, 1, 2, 3));
  CHECK(same(s.look.interior, 0xAA, 0xBB, 0xCC));
  CHECK(same(s.look.section, 255, 128, 0));
  CHECK(s.look.gloss == 0.75);
  REQUIRE((s.look.lip && s.look.callus));
  CHECK(same(*s.look.lip, 4, 5, 6));
  CHECK(s.look.lip_breadth_mm == 1.25);
  CHECK(same(*s.look.callus, 7, 8, 9));
  CHECK(s.look.callus_breadth_mm == 1.5);
  CHECK(s.look.exterior_finish == Finish::kPeriostracum);
  CHECK(s.look.interior_finish == Finish::kNacre);
  CHECK(same(s.look.periostracum, 12, 13, 14));
  CHECK(same(s.look.mould, 15, 16, 17));
  REQUIRE(s.preserved.size() == 1);
  REQUIRE((s.preserved[0].from && s.preserved[0].to));
  CHECK(*s.preserved[0].from == 3.5);
  CHECK(*s.preserved[0].to == 0.25);
  CHECK(s.preserved[0].from_lip);
  CHECK(s.preserved[0].parts == PreservedParts::kOutside);
  CHECK(s.plate.unobserved == Unobserved::kHatch);
  CHECK(s.plate.hatch_mm == 0.9);
  CHECK((s.translucence.mean_free_path_mm == 0.15 && s.translucence.anisotropy == 0.7));
  CHECK(same(s.translucence.colour, 0xf0, 0xf1, 0xf2));
  CHECK((s.nacre.tablet_nm == 410.0 && s.nacre.spread_nm == 30.0 && s.nacre.sheet_nm == 12.0));
  CHECK((s.nacre.sheet_index == 1.55 && s.nacre.layers == 40 && s.nacre.drift == 0.125));

  const auto is_pigment = [](const Pigment& p, int red) {
    return same(p.colour, red, 10, 11) && p.opacity == 0.625 && p.fade == 0.375 && p.onset == 1.5 && p.end == 6.5;
  };
  REQUIRE((s.sculpture.cords.size() == 1 && s.sculpture.ribs.size() == 1 && s.sculpture.nodules.size() == 1));
  const Cord& cord = s.sculpture.cords[0];
  CHECK((cord.at_deg == 15.0 && cord.width_deg == 11.0 && cord.height_mm == 0.125 && cord.onset == 1.5 && cord.end == 6.5 && cord.growth == 0.75));
  const auto is_series = [](const auto& x, int seed) {
    return x.per_whorl == 13.0 && x.height_mm == 0.0625 && x.at_deg == -25.0 && x.width_deg == 75.0 && x.behind_lip == 0.03 &&
           x.irregularity == 0.3 && x.seed == seed && x.onset == 1.25 && x.end == 6.25 && x.growth == 0.5;
  };
  CHECK((is_series(s.sculpture.ribs[0], 8) && s.sculpture.ribs[0].breadth == 0.7));
  CHECK((is_series(s.sculpture.nodules[0], 9) && s.sculpture.nodules[0].length == 0.8));
  REQUIRE(s.colouring.bands.size() == 1);
  CHECK((s.colouring.bands[0].at_deg == 45.0 && s.colouring.bands[0].width_deg == 12.5));
  CHECK(is_pigment(s.colouring.bands[0].pigment, 0x11));
  REQUIRE(s.colouring.flames.size() == 1);
  const Flame& flame = s.colouring.flames[0];
  CHECK((flame.per_whorl == 14.0 && flame.breadth == 0.4 && flame.at_deg == 10.0 && flame.width_deg == 150.0));
  CHECK((flame.taper == 0.6 && flame.sway == 0.7 && flame.bends == 3.0 && flame.irregularity == 0.1 && flame.seed == 5));
  CHECK(is_pigment(flame.pigment, 0x12));
  REQUIRE(s.colouring.spots.size() == 1);
  const Spot& spot = s.colouring.spots[0];
  CHECK((spot.per_whorl == 20.0 && spot.length == 0.3 && spot.at_deg == -30.0 && spot.width_deg == 9.0));
  CHECK((spot.stagger == 0.5 && spot.irregularity == 0.2 && spot.seed == 6));
  CHECK(is_pigment(spot.pigment, 0x13));
  REQUIRE(s.colouring.patterns.size() == 1);
  const EdgePattern& pattern = s.colouring.patterns[0];
  CHECK((pattern.activator_decay == 60.0 && pattern.inhibitor_decay == 40.0 && pattern.source == 50.0));
  CHECK((pattern.activator_base == 0.01 && pattern.inhibitor_base == 2.0 && pattern.variation == 0.15));
  CHECK((pattern.activator_spread == 0.5 && pattern.inhibitor_spread == 0.25 && pattern.threshold == 1.75));
  CHECK(pattern.seed == 7);
  CHECK(is_pigment(pattern.pigment, 0x14));

  CHECK(s.light.azimuth_deg == 90.0);
  CHECK(s.light.elevation_deg == 30.0);
  CHECK(s.light.softness_deg == 5.0);
  CHECK(s.light.fill == 0.5);
  CHECK(s.light.stops == -2.5);

  REQUIRE(s.attachments.encrusters.size() == 1);
  const Encruster& encruster = s.attachments.encrusters[0];
  CHECK((encruster.scene.value == "other.toml" && encruster.behind_lip == 0.5 && encruster.at_deg == 75.0));
  CHECK((encruster.pose == Pose::kLying && encruster.turn_deg == 45.0 && encruster.sunk_mm == 0.1));
  REQUIRE((s.attachments.stripes.size() == 1 && s.attachments.lamellae.size() == 1));
  REQUIRE((s.attachments.spines.size() == 1 && s.attachments.attached.size() == 1));
  const Stripe& stripe = s.attachments.stripes[0];
  CHECK((stripe.at_deg == 20.0 && stripe.width_deg == 7.0 && stripe.height_mm == 0.4 && stripe.onset == 1.75 && stripe.end == 6.0));
  CHECK(stripe.growth == 1.25);
  CHECK(same(stripe.colour, 0x21, 10, 11));
  const auto recurs = [](const Recurrence& r, int seed) {
    return r.per_whorl == 13.0 && r.behind_lip == 0.03 && r.irregularity == 0.3 && r.seed == seed && r.onset == 1.25 && r.end == 6.25 && r.growth == 0.5;
  };
  const Lamella& lamella = s.attachments.lamellae[0];
  CHECK((recurs(lamella.series, 10) && lamella.height_mm == 0.0625 && lamella.thickness_mm == 0.2 && lamella.lean_deg == 15.0));
  CHECK((lamella.at_deg == -25.0 && lamella.width_deg == 75.0 && lamella.colour && same(*lamella.colour, 0x22, 10, 11)));
  const Spine& spine = s.attachments.spines[0];
  CHECK((recurs(spine.series, 11) && spine.length_mm == 4.0 && spine.breadth_mm == 0.9 && spine.at_deg == -25.0));
  CHECK((spine.tip == 0.125 && spine.bend_deg == 35.0 && spine.lean_deg == -12.0 && spine.hollow == 0.6 && spine.open_deg == 70.0));
  CHECK((spine.colour && same(*spine.colour, 0x23, 10, 11)));
  const Attached& attached = s.attachments.attached[0];
  CHECK((attached.shape == AttachedShape::kTube && recurs(attached.series, 12) && attached.rows == 3 && attached.stagger == 0.5));
  CHECK((attached.height_mm == 0.0625 && attached.breadth_mm == 0.6 && attached.width_deg == 75.0 && attached.lean_deg == 9.0));
  CHECK(same(attached.colour, 0x24, 10, 11));

  REQUIRE(s.lamps.size() == 1);
  CHECK(s.lamps[0].behind_lip == 0.25);
  CHECK(s.lamps[0].radius_mm == 0.5);
  CHECK(s.lamps[0].strength == 70.0);
  CHECK(s.lamps[0].temperature_k == 2700.0);
  CHECK((s.lamps[0].offset_mm == 0.75 && s.lamps[0].at_deg == 200.0 && s.lamps[0].shape == LampShape::kRing));
  CHECK((s.lamps[0].ring_mm == 1.5 && s.lamps[0].bulbs == 9));

  CHECK(s.plate.width_mm == 85.0);
  CHECK(s.plate.resolution_ppi == 300.0);
  CHECK(s.plate.background == Background::kClear);
  CHECK(s.plate.columns == 2);
  CHECK(s.plate.gap_mm == 2.5);
  CHECK(s.plate.letters == Letters::kLowerInBrackets);
  CHECK(s.plate.bar_mm == 10.0);
  CHECK(s.plate.quality == Quality::kDraft);
  REQUIRE(s.plate.panels.size() == 1);
  CHECK(s.plate.panels[0].view == ViewName::kFree);
  CHECK(s.plate.panels[0].azimuth_deg == 30.0);
  CHECK(s.plate.panels[0].elevation_deg == 10.0);
  CHECK(s.plate.panels[0].scale == 2.0);
  CHECK(s.plate.panels[0].look == PanelLook::kWhitened);
  CHECK_FALSE(s.plate.panels[0].stereo);
  CHECK(s.plate.panels[0].shows == Shows::kMould);
  CHECK((s.contact_sheet.W.value == std::vector{1.5, 2.0} && s.contact_sheet.T.value == std::vector{0.5, 1.0, 2.0}));
  CHECK(s.radiograph.energy_kev == 35.0);
  CHECK((s.stereo.angle_deg == 7.0 && s.stereo.spacing_mm == 62.0));
}

TEST_CASE("The scene with every key has a line for every row of the table of keys", "[specimen]") {
  const std::string text = "\n" + SceneText::with_every_key().text();
  for (const KeyRow& row : key_table()) {
    if (row.table == "size" && row.key != "shell_height") continue;  // exactly one of the four
    const std::string wanted = (row.table == "panel.view" ? " " : "\n") + std::string(row.key) + " = ";
    CAPTURE(wanted);
    CHECK(text.find(wanted) != std::string::npos);
  }
}

TEST_CASE("Words mean what they say", "[specimen]") {
  const auto plate_with = [](const char* key, const char* word) {
    return parse_scene(SceneText().set("plate", key, word).text(), "scene").plate;
  };
  CHECK(plate_with("background", "\"white\"").background == Background::kWhite);
  CHECK(plate_with("background", "\"black\"").background == Background::kBlack);
  CHECK(plate_with("letters", "\"none\"").letters == Letters::kNone);
  CHECK(plate_with("letters", "\"A\"").letters == Letters::kUpper);
  CHECK(plate_with("letters", "\"a\"").letters == Letters::kLower);
  CHECK(plate_with("quality", "\"proof\"").quality == Quality::kProof);
  CHECK(plate_with("quality", "\"print\"").quality == Quality::kPrint);
  CHECK(plate_with("bar", "\"auto\"").bar_mm == 0.0);
  const std::pair<const char*, ViewName> views[] = {{"\"apertural\"", ViewName::kApertural},
                                                    {"\"abapertural\"", ViewName::kAbapertural},
                                                    {"\"right lateral\"", ViewName::kRightLateral},
                                                    {"\"left lateral\"", ViewName::kLeftLateral},
                                                    {"\"apical\"", ViewName::kApical},
                                                    {"\"umbilical\"", ViewName::kUmbilical},
                                                    {"\"axial section\"", ViewName::kAxialSection}};
  for (const auto& [word, view] : views) {
    CAPTURE(word);
    CHECK(parse_scene(SceneText().set("panel", "view", word).text(), "scene").plate.panels.at(0).view == view);
  }
  const std::pair<const char*, SizeKind> sizes[] = {{"shell_height", SizeKind::kShellHeight},
                                                    {"shell_width", SizeKind::kShellWidth},
                                                    {"aperture_height", SizeKind::kApertureHeight},
                                                    {"aperture_width", SizeKind::kApertureWidth}};
  for (const auto& [key, kind] : sizes) {
    CAPTURE(key);
    CHECK(parse_scene(SceneText().drop("size", "shell_height").set("size", key, "9").text(), "scene").size.kind ==
          kind);
  }
}

TEST_CASE("A scene of only what is required has the defaults of the format, none of them marked as stated",
          "[specimen]") {
  const Specimen s = parse_scene(SceneText().text(), "scene");
  CHECK(s.identity.mineral == Mineral::kAragonite);
  CHECK_FALSE(s.identity.mineral.given);
  CHECK(s.identity.catalogue.value.empty());
  CHECK_FALSE(s.identity.catalogue.given);
  CHECK(s.growth.start == 0.75);
  CHECK_FALSE(s.growth.start.given);
  CHECK(s.growth.start.where.line == 0);
  CHECK_FALSE((s.growth.W_distance || s.growth.W_depth || s.growth.W_section));
  CHECK(same(s.growth.W, {{0.0, 1.42}}));
  CHECK(s.section.S == 1.0);
  CHECK(s.section.roll_deg == 0.0);
  CHECK(s.section.lobes.empty());
  CHECK(s.wall.growth == WallGrowth::kProportional);
  CHECK(s.wall.columella == 0.0);
  CHECK(s.lip.inclination_deg == 0.0);
  CHECK(s.lip.thickness_mm == 0.45);
  CHECK_FALSE(s.lip.thickness_mm.given);
  CHECK(same(s.look.exterior, 0xd8, 0xc7, 0xa8));
  CHECK(same(s.look.interior, 0xf1, 0xe6, 0xda));
  CHECK(same(s.look.section, 0xb0, 0x8d, 0x82));
  CHECK(s.look.gloss == 0.35);
  CHECK_FALSE((s.look.lip || s.look.callus));
  CHECK(s.look.lip_breadth_mm == s.lip.thickness_mm.value);
  CHECK(s.look.callus_breadth_mm == 0.0);
  CHECK(s.look.exterior_finish == Finish::kPlain);
  CHECK(s.look.interior_finish == Finish::kPlain);
  CHECK(s.translucence.mean_free_path_mm == 0.0);
  CHECK((s.nacre.tablet_nm == 440.0 && s.nacre.spread_nm == 12.0 && s.nacre.layers == 60));
  CHECK((s.sculpture.cords.empty() && s.sculpture.ribs.empty() && s.sculpture.nodules.empty()));
  CHECK((s.colouring.bands.empty() && s.colouring.flames.empty()));
  CHECK((s.colouring.spots.empty() && s.colouring.patterns.empty()));
  CHECK(s.light.azimuth_deg == 135.0);
  CHECK(s.light.elevation_deg == 45.0);
  CHECK(s.light.softness_deg == 12.0);
  CHECK(s.light.fill == 0.35);
  CHECK(s.light.stops == 0.0);
  CHECK(s.lamps.empty());
  CHECK((s.attachments.stripes.empty() && s.attachments.lamellae.empty()));
  CHECK((s.attachments.spines.empty() && s.attachments.attached.empty()));
  CHECK(s.radiograph.energy_kev == 20.0);
  CHECK((s.stereo.angle_deg == 6.0 && s.stereo.spacing_mm == 60.0));
  CHECK(s.plate.width_mm == 180.0);
  CHECK(s.plate.resolution_ppi == 600.0);
  CHECK(s.plate.background == Background::kWhite);
  CHECK(s.plate.columns == 3);
  CHECK(s.plate.gap_mm == 4.0);
  CHECK(s.plate.letters == Letters::kUpper);
  CHECK(s.plate.bar_mm == 0.0);
  CHECK(s.plate.quality == Quality::kPrint);
  CHECK(s.plate.unobserved == Unobserved::kPlain);
  CHECK(s.plate.hatch_mm == 1.2);
  CHECK(s.preserved.empty());
  const ViewName usual[] = {ViewName::kApertural, ViewName::kAbapertural, ViewName::kRightLateral,
                            ViewName::kApical,    ViewName::kUmbilical,   ViewName::kAxialSection};
  REQUIRE(s.plate.panels.size() == 6);
  for (std::size_t i = 0; i < 6; ++i) {
    CHECK(s.plate.panels[i].view == usual[i]);
    CHECK(s.plate.panels[i].scale == 1.0);
    CHECK(s.plate.panels[i].look == PanelLook::kNatural);
    CHECK_FALSE(s.plate.panels[i].stereo);
  }
}

TEST_CASE("The source density of a pattern follows its activator's decay where it is not stated", "[specimen]") {
  SceneText scene = SceneText().set("pattern", "activator_decay", "30").set("pattern", "inhibitor_decay", "40");
  scene.set("pattern", "activator_spread", "1").set("pattern", "colour", "\"#000000\"");
  const EdgePattern pattern = parse_scene(scene.text(), "scene").colouring.patterns.at(0);
  CHECK(pattern.source == 30.0);
  CHECK(pattern.inhibitor_spread == 0.0);
}

TEST_CASE("A panel may be a stereo pair", "[specimen]") {
  const Specimen s = parse_scene(SceneText().set("panel", "view", "\"apical\"").set("panel", "picture", "\"stereo pair\"").text(), "scene");
  CHECK(s.plate.panels.at(0).stereo);
}

TEST_CASE("A short shell begins early enough for a quarter whorl to be left", "[specimen]") {
  CHECK(parse_scene(SceneText().set("growth", "whorls", "0.5").text(), "scene").growth.start == 0.25);
  CHECK(parse_scene(SceneText().set("growth", "whorls", "0.9").text(), "scene").growth.start == Approx(0.65));
}
