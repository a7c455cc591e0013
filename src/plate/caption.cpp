// SPDX-License-Identifier: Apache-2.0
// Builds caption and alt text from the facts of the figure.
#include "plate/caption.h"

#include "plate/disclosure.h"
#include "plate/provenance_words.h"
#include "plate/scale_bar.h"

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <vector>

namespace whorl::plate {
namespace {

std::string capital(std::string text) {
  if (!text.empty()) text[0] = static_cast<char>(std::toupper(static_cast<unsigned char>(text[0])));
  return text;
}

int characters(const std::string& utf8) {
  return static_cast<int>(std::count_if(utf8.begin(), utf8.end(), [](char c) { return (c & 0xc0) != 0x80; }));
}

/// The first `count` characters, never half of one.
std::string shortened(const std::string& utf8, int count) {
  if (characters(utf8) <= count) return utf8;
  std::string kept;
  int seen = 0;
  for (const char c : utf8) {
    if ((c & 0xc0) != 0x80 && ++seen >= count) break;
    kept += c;
  }
  return kept + "…";
}

const char* coiling_word(const specimen::Specimen& specimen) {
  return specimen.identity.coiling.value == specimen::Coiling::kDextral ? "dextral" : "sinistral";
}

/// "24 mm high", as measured on the solid; the stated size where nothing was measured.
std::string size_phrase(const specimen::Specimen& specimen, const RunFacts& run) {
  if (run.measurements.is_object() && run.measurements.contains("shell_height") &&
      run.measurements["shell_height"].is_number())
    return fmt::format("{:.3g} mm high", run.measurements["shell_height"].get<double>());
  const std::string mm = plain_number(specimen.size.mm.value);
  switch (specimen.size.kind.value) {
    case specimen::SizeKind::kShellHeight: return mm + " mm high";
    case specimen::SizeKind::kShellWidth: return mm + " mm wide";
    case specimen::SizeKind::kApertureHeight: return "aperture " + mm + " mm high";
    case specimen::SizeKind::kApertureWidth: return "aperture " + mm + " mm wide";
  }
  return "";
}

std::vector<std::string> plain(const std::vector<double>& numbers) {
  std::vector<std::string> texts;
  for (const double one : numbers) texts.push_back(plain_number(one));
  return texts;
}

/// "apertural view, whitened"
std::string panel_words(const FigurePanel& panel, const specimen::Specimen& specimen) {
  std::string words = panel.eye ? pair_label(panel) : panel.view.label;
  if (panel.shows == specimen::Shows::kMould) words += ", internal mould";
  if (panel.shows == specimen::Shows::kBoth) words += ", internal mould in the shell cut open along its axis";
  if (panel.look == specimen::PanelLook::kWhitened) words += ", whitened";
  if (panel.look == specimen::PanelLook::kRadiograph) words += ", " + radiograph_label(specimen.radiograph);
  if (panel.eye) words += fmt::format(", stereo pair for parallel viewing ({:g}°)", specimen.stereo.angle_deg.value);
  return words;
}

/// What was computed instead of done to a specimen.
std::string looks_sentence(const FigurePlan& plan, const specimen::Specimen& specimen) {
  const auto shows = [&plan](specimen::PanelLook look) {
    return std::any_of(plan.panels.begin(), plan.panels.end(), [look](const FigurePanel& p) { return p.look == look; });
  };
  std::string text;
  if (std::any_of(plan.panels.begin(), plan.panels.end(), [](const FigurePanel& p) { return p.shows != specimen::Shows::kShell; }))
    text += " The internal mould is the fill of the model's lumen up to the aperture.";
  if (shows(specimen::PanelLook::kWhitened)) text += " The whitening is computed: no specimen was coated.";
  if (shows(specimen::PanelLook::kRadiograph))
    text += fmt::format(" The radiograph is computed from the wall of the model (exp(-µt), {:g} keV, {}) and no X-ray picture of a "
                        "specimen.",
                        specimen.radiograph.energy_kev.value, mineral_word(specimen.identity.mineral));
  return text;
}

/// "A, apertural view. B, apical view." or, without letters, "Apertural view, apical view."
std::string views_sentence(const FigurePlan& plan, const specimen::Specimen& specimen) {
  if (specimen.contact_sheet.wanted())
    return fmt::format("Contact sheet: {}, W = {} from left to right, T = {} from top to bottom.",
                       panel_words(plan.panels.at(0), specimen), in_words(plain(specimen.contact_sheet.W.value)),
                       in_words(plain(specimen.contact_sheet.T.value)));
  std::string text;
  for (const FigurePanel& panel : plan.panels) {
    if (panel.eye == Eye::kRight) continue;
    const std::string words = panel_words(panel, specimen);
    if (panel.letter.empty()) {
      text += (text.empty() ? "" : ", ") + words;
      continue;
    }
    text += (text.empty() ? "" : ". ") + panel.letter + ", " + words;
  }
  return capital(text) + ".";
}

std::string panel_names(const FigurePlan& plan, const LayoutBar& bar) {
  std::vector<std::string> names;
  for (std::size_t i = 0; i < plan.panels.size(); ++i) {
    const FigurePanel& panel = plan.panels[i];
    if (panel.eye == Eye::kRight || !bar_belongs_to(bar, plan, i)) continue;
    names.push_back(panel.letter.empty() ? (panel.eye ? pair_label(panel) : panel.view.label) : panel.letter);
  }
  return in_words(names);
}

/// "Scale bar = 5 mm (magnification × 3.2)." with the panels named where there are several bars.
std::string bars_sentence(const FigurePlan& plan) {
  std::string text;
  for (const LayoutBar& bar : plan.bars) {
    const double magnification = kMmPerInch / plan.resolution_ppi / bar.mm_per_pixel;
    text += text.empty() ? (plan.bars.size() == 1 ? "Scale bar = " : "Scale bars: ") : "; ";
    if (plan.bars.size() > 1) text += panel_names(plan, bar) + " = ";
    text += fmt::format("{} (magnification × {:.3g})", bar_label(bar.length_mm), magnification);
  }
  return text.empty() ? "" : text + fmt::format(" at a printed width of {:.3g} mm.",
                                                plan.width * kMmPerInch / plan.resolution_ppi);
}

/// "apertural and apical views, axial section"
std::string views_in_short(const FigurePlan& plan) {
  std::vector<std::string> named, other;
  int free = 0;
  for (const FigurePanel& panel : plan.panels) {
    constexpr std::string_view kView = " view";
    if (panel.eye == Eye::kRight) continue;
    const std::string label = panel.eye ? pair_label(panel) : panel.view.label;
    std::string item = label;
    if (panel.view.name == specimen::ViewName::kFree) {
      ++free;
      continue;
    }
    const bool is_view = label.size() > kView.size() && label.ends_with(kView);
    if (is_view) item.resize(label.size() - kView.size());
    std::vector<std::string>& list = is_view ? named : other;
    if (std::find(list.begin(), list.end(), item) == list.end()) list.push_back(item);
  }
  std::vector<std::string> parts;
  if (!named.empty()) parts.push_back(in_words(named) + (named.size() == 1 ? " view" : " views"));
  if (free > 0) parts.push_back(free == 1 ? "one oblique view" : fmt::format("{} oblique views", free));
  parts.insert(parts.end(), other.begin(), other.end());
  std::string text;
  for (const std::string& part : parts) text += (text.empty() ? "" : ", ") + part;
  return text;
}

/// ", and from within by lamps, against which that light is dimmed by 3 stops"
std::string within_words(const specimen::Specimen& specimen) {
  if (specimen.lamps.empty()) return "";
  const double stops = specimen.light.stops;
  return stops == 0.0 ? ", and by lamps within"
                      : fmt::format(", and by lamps within, against which that light is dimmed by {:g} {}", -stops,
                                    stops == -1.0 ? "stop" : "stops");
}

}  // namespace

std::string make_caption(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run) {
  const specimen::Identity& id = specimen.identity;
  std::string text = "Fig. 00. " + id.name.value;
  if (!id.catalogue.value.empty()) text += ", " + id.catalogue.value;
  if (!id.locality.value.empty()) text += ", " + id.locality.value;
  // Of the name or of the plate: the scene file does not tell, so the caption must not look as if it knew.
  if (!id.author.value.empty()) text += " (author: " + id.author.value + ")";
  text += fmt::format(". {} shell of {} whorls, {}. ", capital(coiling_word(specimen)),
                      plain_number(specimen.growth.whorls.value), size_phrase(specimen, run));
  text += views_sentence(plan, specimen) + " " + bars_sentence(plan) + " Orthographic, lit from " + light_words(specimen.light) + within_words(specimen) + ".\n\n";

  text += "The figure shows a " + std::string(kDisclosureClass) + " (Whorlwright " + run.version +
          "), no photograph of a specimen. " + std::string(kTypeSentence) + looks_sentence(plan, specimen);
  if (plan.provenance) text += " " + provenance_sentences(plan, specimen, run.provenance);
  const std::vector<Basis> basis = basis_of(specimen);
  const std::string stated = shaping_words(basis, true), assumed = shaping_words(basis, false);
  if (!stated.empty()) text += " Stated: " + stated + ".";
  text += assumed.empty() ? " Nothing of its form was assumed." : " Assumed by default: " + assumed + ".";
  if (!id.licence.value.empty()) text += " Licence: " + id.licence.value + ".";
  return text;
}

std::string make_alt_text(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run) {
  const std::string name = specimen.identity.name.value;
  const std::string coiling = coiling_word(specimen);
  const std::string whorls = plain_number(specimen.growth.whorls.value) + " whorls";
  const std::string size = size_phrase(specimen, run);
  const std::string views = views_in_short(plan), count = fmt::format("{} views", plan.panels.size());
  const std::string model = "; computed model.";
  const std::vector<std::string> from_long_to_short = {
      name + ", " + coiling + " shell of " + whorls + ", " + size + ": " + views + model,
      name + ", " + coiling + " shell, " + size + ": " + views + model,
      name + ", " + coiling + " shell of " + whorls + ", " + size + ": " + count + model,
      name + ", " + coiling + " shell: " + count + model,
      shortened(name, 80) + ", " + coiling + " shell: " + count + model,
  };
  for (const std::string& text : from_long_to_short)
    if (characters(text) < kAltTextLimit) return text;
  return from_long_to_short.back();
}

std::string make_words_file(const FigurePlan& plan, const specimen::Specimen& specimen, const RunFacts& run) {
  return make_caption(plan, specimen, run) + "\n\nAlt text: " + make_alt_text(plan, specimen, run) + "\n";
}

}  // namespace whorl::plate
