// SPDX-License-Identifier: Apache-2.0
// Writes scene files.
#include "fit/scene_text.h"

#include "fit/mould.h"
#include "fit/observed.h"
#include "fit/predict.h"
#include "fit/words.h"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

// Quotes and backslashes escaped; the reader has refused control characters.
std::string quoted(const std::string& text) {
  std::string result = "\"";
  for (const char c : text) {
    if (c == '"' || c == '\\') result += '\\';
    result += c;
  }
  return result + "\"";
}

const ParameterResult* result_of(const Fit& fit, Parameter parameter) {
  const auto found = std::find_if(fit.parameters.begin(), fit.parameters.end(),
                                  [&](const ParameterResult& p) { return p.parameter == parameter; });
  return found == fit.parameters.end() ? nullptr : &*found;
}

std::string origin(const Fit& fit, Parameter parameter) {
  const ParameterResult* result = result_of(fit, parameter);
  return result == nullptr ? "the same for all" : origin_words(*result);
}

std::string expansion(const Fit& fit, double more) {
  const double at_lip = std::exp(at(fit.trial.values, Parameter::kW) + more);
  if (at(fit.trial.values, Parameter::kTrend) == 0.0) return fmt::format("{:.8g}", at_lip);
  return fmt::format("[[{:.8g}, {:.8g}], [{:.8g}, {:.8g}]]", fit.task.fixed.start,
                     std::exp(ln_W_at_start(fit.trial.values, fit.task.fixed) + more), at(fit.trial.values, Parameter::kWhorls), at_lip);
}

// Where the readings are a mould's, the scene states the shell round it.
std::string mould_origin(const Fit& fit, Parameter parameter, double of_the_mould) {
  if (!fit.task.fixed.mould) return origin(fit, parameter);
  return fmt::format("of the shell; that of the mould is {:.6g}, {}", of_the_mould, origin(fit, parameter));
}

std::string growth_table(const Fit& fit, const Values& v) {
  std::string text = "[growth]\n";
  const auto line = [&](const std::string& key, const std::string& value, const std::string& comment) {
    text += fmt::format("{:<24} # {}\n", key + " = " + value, comment);
  };
  line("whorls", fmt::format("{:.8g}", at(v, Parameter::kWhorls)), origin(fit, Parameter::kWhorls));
  std::string about_W = origin(fit, Parameter::kW);
  if (at(v, Parameter::kTrend) != 0.0)
    about_W = fmt::format("at the lip {}; ln W changes by {:.4g} a whorl, {}", about_W, at(v, Parameter::kTrend), origin(fit, Parameter::kTrend));
  line("W", expansion(fit, 0.0), about_W);
  for (const auto& [key, parameter] : {std::pair{"W_distance", Parameter::kDistanceRate}, {"W_depth", Parameter::kDepthRate}})
    if (at(v, parameter) != 0.0)
      line(key, expansion(fit, at(v, parameter)), fmt::format("times W by {}", origin(fit, parameter)));
  const Values& own = fit.trial.values;
  line("D", fmt::format("{:.8g}", at(v, Parameter::kD)), mould_origin(fit, Parameter::kD, at(own, Parameter::kD)));
  line("T", fmt::format("{:.8g}", at(v, Parameter::kT)), mould_origin(fit, Parameter::kT, at(own, Parameter::kT)));
  line("start", fmt::format("{:.8g}", fit.task.fixed.start), "end of the embryonic shell: by convention, unless the file holds it");
  return text;
}

std::string size_table(const Fit& fit, const Form& form) {
  const bool flat = at(fit.trial.values, Parameter::kT) == 0.0;
  const auto definition = flat ? specimen::Definition::kShellWidthAcross : specimen::Definition::kShellHeightAxial;
  const bool read = std::any_of(fit.task.readings.begin(), fit.task.readings.end(), [&](const specimen::Reading& reading) {
    return reading.definition == definition && reading.stage.kind == specimen::GrowthStage::Kind::kLip;
  });
  return fmt::format("[size]\n{:<24} # as the fitted shell has it{}\n",
                     fmt::format("{} = {:.8g}", flat ? "shell_width" : "shell_height", predict(form, definition, {})),
                     fit.task.fixed.mould ? ", round the mould; not itself measured" : read ? "" : "; not itself measured");
}

std::string wall_tables(const Fit& fit, const Values& v, const specimen::MeasuredSpecimen& measured, const Form& form) {
  constexpr double kUsualWall = 0.04, kUsualPillar = 0.12, kNearAxis = 0.02;  // of the half-breadth; of the half-breadth; D
  const Fixed& fixed = fit.task.fixed;
  const bool wall = fixed.wall_mm > 0.0, lip = fixed.lip_mm > 0.0;
  const double thickness = wall ? fixed.wall_mm : kUsualWall * form.law.half_breadth * std::min(1.0, form.law.S);
  std::string text = fmt::format("[wall]\n{:<24} # {}\n", fmt::format("thickness = {:.6g}", thickness),
                                 fixed.mould ? "stated: round the internal mould" : wall ? "as measured" : "assumed: a fiftieth of the whorl section; measure wall_thickness wall");
  // Whorls that reach the axis need a pillar to part them.
  const double D = at(v, Parameter::kD), T = at(v, Parameter::kT);
  const bool needs_pillar = D < kNearAxis && T > 0.0;
  if (measured.held.columella)
    text += fmt::format("{:<24} # held by the file\n", fmt::format("columella = {:.6g}", *measured.held.columella));
  else if (needs_pillar)
    text += fmt::format("{:<24} # assumed: whorls that reach the axis need a pillar\n",
                        fmt::format("columella = {:.6g}", kUsualPillar + std::max(0.0, -2.0 * D)));
  const ParameterResult* inclination = result_of(fit, Parameter::kInclination);
  text += fmt::format("\n[lip]\n{:<24} # {}\n",
                      fmt::format("inclination = {:.6g}", degrees(at(fit.trial.values, Parameter::kInclination))),
                      inclination == nullptr || inclination->state != State::kFitted ? "assumed: an upright aperture; measure lip_inclination profile"
                                                                                     : origin_words(*inclination));
  if (lip) text += fmt::format("{:<24} # as measured\n", fmt::format("thickness = {:.6g}", fixed.lip_mm));
  return text;
}

std::string preserved_tables(const Fit& fit, const specimen::MeasuredSpecimen& measured) {
  const std::vector<specimen::Preserved> tables = preserved_of(fit, measured);
  if (tables.empty()) return {};
  std::string text = measured.preserved.empty() ? "\n# What was observed, by the stages of growth that the readings tell of.\n"
                                                : "\n# What is preserved, as the measurement file states it.\n";
  text += "# In [plate], unobserved = \"hatch\" or \"tint\" draws the rest as such.\n";
  bool first = true;
  for (const specimen::Preserved& table : tables) {
    text += first ? "[[preserved]]\n" : "\n[[preserved]]\n";
    first = false;
    if (table.from) text += fmt::format("from = {:.6f}\n", table.from->value);
    if (table.to) text += fmt::format("to = {:.6f}\n", table.to->value);
    if (table.from_lip) text += "counted = \"from the lip\"\n";
    text += fmt::format("parts = \"{}\"\n", specimen::parts_word(table.parts));
  }
  return text;
}

}  // namespace

std::string scene_text(const Fit& fit, const specimen::MeasuredSpecimen& measured, const std::string& source) {
  const Values values = fit.task.fixed.mould ? *shell_round(fit.trial.values, fit.task.fixed) : fit.trial.values;
  const Form form = *form_of(values, fit.task.fixed);
  const specimen::Identity& identity = measured.identity;
  std::string text = fmt::format("# Fitted to the measurements in {}: {}.\n"
                                 "# A computed model is an aid to comparison and never a name-bearing type.\n"
                                 "# Intervals are of 95 % confidence; standard errors follow +-.\nformat = 1\n\n[specimen]\n",
                                 source == "-" ? "standard input" : source, verdict_words(fit.verdict));
  text += fmt::format("name = {}\ncoiling = \"{}\"\n", quoted(identity.name.value),
                      identity.coiling.value == specimen::Coiling::kDextral ? "dextral" : "sinistral");
  for (const auto& [key, value] : {std::pair{"catalogue", &identity.catalogue}, {"author", &identity.author},
                                   {"locality", &identity.locality}, {"note", &identity.note}, {"licence", &identity.licence}})
    if (value->given) text += fmt::format("{} = {}\n", key, quoted(value->value));
  text += fmt::format("mineral = \"{}\"\n\n", identity.mineral.value == specimen::Mineral::kAragonite ? "aragonite" : "calcite");
  text += growth_table(fit, values);
  text += fmt::format("\n[section]\n{:<24} # {}\n", fmt::format("S = {:.8g}", std::exp(at(values, Parameter::kS))),
                      mould_origin(fit, Parameter::kS, std::exp(at(fit.trial.values, Parameter::kS))));
  if (fit.task.fixed.roll_deg != 0.0) text += fmt::format("{:<24} # held by the file\n", fmt::format("roll = {:.6g}", fit.task.fixed.roll_deg));
  text += "\n" + size_table(fit, form) + "\n" + wall_tables(fit, values, measured, form);
  return text + preserved_tables(fit, measured);
}

}  // namespace whorl::fit
