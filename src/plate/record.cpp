// SPDX-License-Identifier: Apache-2.0
// Writes down the figure: how it was made, what stands where and at which scale.
#include "plate/record.h"

#include "plate/compose.h"
#include "plate/disclosure.h"
#include "plate/provenance_words.h"
#include "plate/sha256.h"
#include "shaders_cpu/medium/attenuation.h"
#include "shaders_cpu/tone/curve.h"

#include <fmt/format.h>

#include <filesystem>

namespace whorl::plate {
namespace {

using nlohmann::ordered_json;

const char* quality_word(specimen::Quality quality) {
  switch (quality) {
    case specimen::Quality::kDraft: return "draft";
    case specimen::Quality::kProof: return "proof";
    case specimen::Quality::kPrint: return "print";
  }
  return "";
}

const char* ground_word(specimen::Background ground) {
  switch (ground) {
    case specimen::Background::kWhite: return "white";
    case specimen::Background::kBlack: return "black";
    case specimen::Background::kClear: return "clear";
  }
  return "";
}

const char* look_word(specimen::PanelLook look) {
  switch (look) {
    case specimen::PanelLook::kNatural: return "natural";
    case specimen::PanelLook::kWhitened: return "whitened";
    case specimen::PanelLook::kRadiograph: return "computed radiograph";
  }
  return "";
}

/// What stands behind the looks of the panels that are not natural.
void add_looks(const FigurePlan& plan, const specimen::Specimen& specimen, ordered_json& json) {
  bool radiograph = false, pair = false;
  for (const FigurePanel& panel : plan.panels) {
    radiograph = radiograph || panel.look == specimen::PanelLook::kRadiograph;
    pair = pair || panel.eye;
  }
  if (radiograph) {
    const double energy = specimen.radiograph.energy_kev, density = specimen::mineral_density(specimen.identity.mineral);
    json["radiograph"] = {{"statement", "computed from the wall of the model; no X-ray picture of a specimen"},
                          {"energy_kev", energy},
                          {"mineral", mineral_word(specimen.identity.mineral)},
                          {"density_g_per_cm3", density},
                          {"attenuation_per_mm", shaders_cpu::carbonate_attenuation_per_mm(energy, density)},
                          {"source", "Hubbell & Seltzer 1995, NISTIR 5632"},
                          {"shown", specimen.plate.background.value == specimen::Background::kBlack
                                        ? "one minus transmission, as display-linear light"
                                        : "transmission, as display-linear light"}};
  }
  if (pair)
    json["stereo"] = {{"angle_deg", specimen.stereo.angle_deg.value},
                      {"spacing_mm", specimen.stereo.spacing_mm.value},
                      {"viewing", "parallel: the left eye's picture stands on the left"}};
}

ordered_json rectangle(const PixelRect& rect) {
  return {{"x", rect.x}, {"y", rect.y}, {"width", rect.width}, {"height", rect.height}};
}

ordered_json identity(const specimen::Identity& id) {
  ordered_json json = {{"name", id.name.value},
                       {"coiling", id.coiling.value == specimen::Coiling::kDextral ? "dextral" : "sinistral"}};
  const auto add = [&json](const char* key, const specimen::Stated<std::string>& text) {
    if (!text.value.empty()) json[key] = text.value;
  };
  add("catalogue", id.catalogue);
  add("author", id.author);
  add("locality", id.locality);
  add("note", id.note);
  add("licence", id.licence);
  return json;
}

ordered_json panel_record(const FigurePanel& panel, const transport::Film& film) {
  ordered_json json;
  json["name"] = panel.view.label;
  json["letter"] = panel.letter;
  json["rectangle_px"] = rectangle(panel.rect);
  json["pole_px"] = {{"x", panel.rect.x + panel.pole_px.x}, {"y", panel.rect.y + panel.pole_px.y}};
  json["mm_per_pixel"] = panel.mm_per_pixel;
  json["magnification"] = panel.paper_scale;
  json["azimuth_deg"] = panel.view.azimuth_deg;
  json["elevation_deg"] = panel.view.elevation_deg;
  json["cut"] = panel.view.cut;
  json["look"] = look_word(panel.look);
  if (panel.eye) json["eye"] = panel.eye == Eye::kLeft ? "left" : "right";
  if (!panel.note.empty()) json["shell"] = panel.note;
  if (!panel.label.empty()) json["label"] = panel.label;
  if (panel.shows != specimen::Shows::kShell) json["shows"] = panel.shows == specimen::Shows::kMould ? "internal mould" : "internal mould in the shell cut open";
  json["rendered"] = film.size() != 0;
  json["samples_per_pixel"] = {{"mean", film.mean_samples}, {"max", film.max_samples}};
  json["noise"] = film.noise;
  return json;
}

ordered_json bar_record(const LayoutBar& bar, const FigurePlan& plan) {
  ordered_json json;
  json["length_mm"] = bar.length_mm;
  json["length_px"] = bar.length_px;
  json["mm_per_pixel"] = bar.mm_per_pixel;
  json["left_px"] = bar.left;
  json["top_px"] = bar.top;
  json["thickness_px"] = bar.thickness;
  json["panels"] = ordered_json::array();
  for (std::size_t i = 0; i < plan.panels.size(); ++i)
    if (bar_belongs_to(bar, plan, i))
      json["panels"].push_back(i + 1);
  return json;
}

ordered_json disclosure(const specimen::Specimen& specimen) {
  ordered_json stated = ordered_json::array(), assumed = ordered_json::array();
  for (const Basis& basis : basis_of(specimen)) (basis.given ? stated : assumed).push_back(basis.key);
  return {{"class", kDisclosureClass}, {"statement", kTypeSentence}, {"stated", stated}, {"assumed", assumed}};
}

ordered_json counters(const std::vector<transport::Film>& films, const ordered_json& of_the_solid) {
  std::uint64_t camera = 0, scattered = 0, shadow = 0, non_finite = 0;
  for (const transport::Film& film : films) {
    camera += film.rays_camera;
    scattered += film.rays_scattered;
    shadow += film.rays_shadow;
    non_finite += film.non_finite;
  }
  ordered_json json = {
      {"rays_camera", camera}, {"rays_scattered", scattered}, {"rays_shadow", shadow}, {"non_finite_samples", non_finite}};
  if (of_the_solid.is_object()) json.update(of_the_solid);
  return json;
}

ordered_json figure_record(const FigurePlan& plan, const specimen::Specimen& specimen) {
  ordered_json json;
  json["width_px"] = plan.width;
  json["height_px"] = plan.height;
  json["resolution_ppi"] = plan.resolution_ppi;
  json["width_mm"] = plan.width * kMmPerInch / plan.resolution_ppi;
  json["height_mm"] = plan.height * kMmPerInch / plan.resolution_ppi;
  json["background"] = ground_word(specimen.plate.background.value);
  json["projection"] = "orthographic";
  json["azimuth"] = {{"rule", kAzimuthRule}, {"zero", kAzimuthZero}, {"sense", kAzimuthSense}};
  json["elevation"] = {{"zero", "axis of coiling upright"}, {"sense", kElevationSense}};
  return json;
}

ordered_json picture_making(const specimen::Light& light) {
  ordered_json json;
  json["light"] = {{"words", "lit from " + light_words(light)},
                   {"fixed_to", "page"},
                   {"azimuth_deg", light.azimuth_deg.value},
                   {"elevation_deg", light.elevation_deg.value},
                   {"softness_deg", light.softness_deg.value},
                   {"fill", light.fill.value},
                   {"stops", light.stops.value}};
  const double card = shaders_cpu::kCardDisplay;
  json["tone_curve"] = {{"unit", "radiance of a matt white card that faces the key light"},
                        {"up_to_1", fmt::format("{:g} x", card)},
                        {"above_1", fmt::format("1 - {:g} exp(-{:g} (x - 1))", 1.0 - card, card / (1.0 - card))},
                        {"acts_on", "each channel of linear sRGB"}};
  json["pixel_filter"] = {{"kind", "round Gaussian"},
                          {"sigma_px", transport::kFilterSigmaPx},
                          {"radius_px", transport::kFilterRadiusPx}};
  return json;
}

}  // namespace

ordered_json make_record(const FigurePlan& plan, const specimen::Specimen& specimen,
                         const std::vector<transport::Film>& films, const RunFacts& run) {
  ordered_json json;
  json["program"] = {{"name", "Whorlwright"}, {"version", run.version}, {"build", run.build}};
  json["scene"] = {{"file", std::filesystem::path(specimen.source).filename().string()}, {"sha256", sha256_hex(specimen.text)}};
  json["specimen"] = identity(specimen.identity);
  json["seed"] = run.seed;
  json["threads"] = run.threads;
  json["quality"] = quality_word(run.quality);
  json["exact"] = run.exact;
  json["seconds"] = {{"compile", run.seconds_compile}, {"render", run.seconds_render}};
  json["figure"] = figure_record(plan, specimen);
  json["panels"] = ordered_json::array();
  for (std::size_t i = 0; i < plan.panels.size(); ++i) json["panels"].push_back(panel_record(plan.panels[i], films[i]));
  json["scale_bars"] = ordered_json::array();
  for (const LayoutBar& bar : plan.bars) json["scale_bars"].push_back(bar_record(bar, plan));
  add_looks(plan, specimen, json);
  json.update(picture_making(specimen.light));
  json["disclosure"] = disclosure(specimen);
  if (plan.provenance) json["provenance"] = provenance_record(plan, specimen, run.provenance);
  if (!run.measurements.is_null()) json["measurements"] = run.measurements;
  json["counters"] = counters(films, run.counters);
  json["notes"] = ordered_json::array();
  for (const int panel : letters_over_pictures(plan, films))
    json["notes"].push_back(fmt::format("the letter of panel {} stands over its picture", panel + 1));
  return json;
}

}  // namespace whorl::plate
