// SPDX-License-Identifier: Apache-2.0
// The table for people and the row of many.
#include "fit/report.h"

#include "fit/observed.h"
#include "fit/words.h"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::Dimension;
using specimen::GrowthStage;
using specimen::Reading;

std::string stage_words(const GrowthStage& stage) {
  switch (stage.kind) {
    case GrowthStage::Kind::kLip: return "";
    case GrowthStage::Kind::kBehindLip: return fmt::format(", {:g} whorl{} before the lip", stage.value, stage.value == 1.0 ? "" : "s");
    case GrowthStage::Kind::kAtWhorl: return fmt::format(", at whorl {:g}", stage.value);
    case GrowthStage::Kind::kAtDiameter: return fmt::format(", at a diameter of {:g} mm", stage.value);
  }
  return {};
}

// One digit more than the error's first, for a value with that error.
int decimals_for(double error) {
  return error > 0.0 ? std::clamp(1 - static_cast<int>(std::floor(std::log10(error))), 0, 6) : 4;
}

std::string parameter_lines(const Fit& fit) {
  std::string text = fmt::format("  {:<16}{:>12}{:>12}  {}\n", "parameter", "value", "error", "95 % interval");
  for (const ParameterResult& p : fit.parameters) {
    const std::string_view name = row_of(p.parameter).name;
    if (p.state == State::kFitted || p.state == State::kAtBound) {
      const int digits = decimals_for(p.error);
      text += fmt::format("  {:<16}{:>12.{}f}{:>12.2g}  {:.{}f} to {:.{}f}{}{}\n", name, p.value, digits, p.error, p.low, digits, p.high,
                          digits, p.why.empty() ? "" : "; ", p.why);
    } else {
      text += fmt::format("  {:<16}{:>12.4g}{:>12}  {}\n", name, p.value, "", origin_words(p));
    }
  }
  return text;
}

std::string reading_lines(const Fit& fit, const OnSolid& on_solid) {
  std::string text = fmt::format("  {:<54}{:>9}{:>10}{:>10}{:>8}{:>10}\n", "measurement", "read", "predicted", "residual", "steps", "on solid");
  for (std::size_t i = 0; i < fit.readings.size(); ++i) {
    const Reading& reading = fit.task.readings[i];
    const ReadingResult& result = fit.readings[i];
    const double unit = reading.step > 0.0 ? reading.step : reading.standard_error;
    const int digits = decimals_for(0.3 * unit);
    const std::string solid = i < on_solid.size() && on_solid[i] ? fmt::format("{:.{}f}", *on_solid[i], digits) : "";
    text += fmt::format("  {:<54}{:>9g}{:>10.{}f}{:>+10.{}f}{:>+8.1f}{:>10}{}\n",
                        specimen::written_definition(reading.definition) + stage_words(reading.stage), reading.value, result.predicted,
                        digits, result.residual, digits, result.residual / unit, solid, result.fits ? "" : "  misfit");
  }
  return text;
}

std::string index_lines(const Fit& fit) {
  std::string text = fmt::format("  {:<20}{:>20}{:>32}\n", "index", "of the shell", "of the readings (steps move it)");
  for (const IndexResult& index : fit.indices) {
    if (!std::isfinite(index.of_shell) && !index.from_readings) continue;
    const std::string shell = std::isfinite(index.of_shell) ? fmt::format("{:.4g} +- {:.2g}", index.of_shell, index.of_shell_error) : "-";
    const std::string read = index.from_readings ? fmt::format("{:.4g} +- {:.2g} ({:.1g})", index.read, index.read_error, index.read_step) : "-";
    text += fmt::format("  {:<20}{:>20}{:>32}\n", index.name, shell, read);
  }
  return text;
}

std::string degrees_and_minutes(double angle) {
  const auto minutes = static_cast<int>(std::lround(angle * 60.0));
  return fmt::format("{} deg {:02}'", minutes / 60, minutes % 60);
}

std::string series_lines(const Fit& fit, const specimen::MeasuredSpecimen& measured) {
  std::string text;
  for (const SeriesResult& s : fit.series) {
    const specimen::Series& series = measured.series[s.index];
    text += fmt::format("  series of {} {}, {} values\n", specimen::written_definition(series.definition),
                        series.turn == 1.0 ? "every whorl" : "every half whorl", series.values.size());
    text += fmt::format("    W by least squares of ln width {:.4f} (rms residual {:.2f} %), end to end {:.4f}\n", s.least_squares_W,
                        100.0 * s.rms_of_ln, s.end_to_end_W);
    if (s.first_ratio > 0.0)
      text += fmt::format("    ratios one turn apart from {:.3f} to {:.3f}, largest / smallest {:.3f}; mean spiral angle {}\n", s.first_ratio,
                          s.last_ratio, s.spread_of_ratios, degrees_and_minutes(s.mean_spiral_angle));
    if (s.scatter > 0.0) text += fmt::format("    scatter about the fitted law {:.2f} %\n", 100.0 * s.scatter);
  }
  return text;
}

std::string model_lines(const Fit& fit) {
  if (fit.models.size() < 2) return {};
  std::string text = "  growth models by corrected AIC, the least is taken\n";
  for (const ModelResult& model : fit.models)
    text += fmt::format("  {} {:<60}{:>3} free {:>10}\n", model.chosen ? ">" : " ", model.name, model.parameters,
                        std::isfinite(model.aicc) ? fmt::format("{:.1f}", model.aicc) : "too few readings");
  return text;
}

std::string csv_cell(const std::string& text) {
  if (text.find_first_of(",\"\n") == std::string::npos) return text;
  std::string cell = "\"";
  for (const char c : text) cell += c == '"' ? "\"\"" : std::string(1, c);
  return cell + "\"";
}

}  // namespace

std::string to_table(const Fit& fit, const specimen::MeasuredSpecimen& measured, const OnSolid& on_solid) {
  std::string text = fmt::format("{}{}: {}\n", measured.identity.name.value, measured.mould ? " (internal mould)" : "", verdict_words(fit.verdict));
  if (!fit.parameters.empty()) text += "\n" + parameter_lines(fit);
  if (!fit.readings.empty()) {
    text += "\n" + reading_lines(fit, on_solid);
    text += fmt::format("  misfit: sum of squared standard errors {:.4g} with {} degrees of freedom\n", fit.chi_square,
                        fit.degrees_of_freedom);
  }
  if (!fit.indices.empty()) text += "\n" + index_lines(fit);
  if (!fit.series.empty()) text += "\n" + series_lines(fit, measured);
  for (const OutlineResult& outline : fit.outlines)
    text += fmt::format("\n  outline: {} of {} points on it, median distance {:.3g} mm, axis leans by {:.1f} degrees{}\n", outline.on_outline,
                        outline.points, outline.median_distance, outline.tilt_deg, outline.fits ? "" : "  misfit");
  if (const std::string models = model_lines(fit); !models.empty()) text += "\n" + models;
  if (!fit.parameters.empty()) {
    text += measured.preserved.empty() ? "\n  observed, by the readings' stages of growth\n" : "\n  preserved, as stated\n";
    for (const std::string& line : preserved_words(preserved_of(fit, measured))) text += "    " + line + "\n";
  }
  if (!fit.remarks.empty()) text += "\n";
  for (const std::string& remark : fit.remarks) text += "  " + remark + "\n";
  return text;
}

std::string csv_header() {
  std::string text = "specimen,verdict";
  for (std::size_t i = 0; i < kParameterCount; ++i) {
    std::string name(row_of(static_cast<Parameter>(i)).name);
    std::replace(name.begin(), name.end(), ' ', '_');
    text += fmt::format(",{0},{0}_error,{0}_origin", name);
  }
  return text + ",readings,degrees_of_freedom,misfit,worst_residual_in_errors,remarks\n";
}

std::string csv_row(const Fit& fit, const specimen::MeasuredSpecimen& measured) {
  std::string text = csv_cell(measured.identity.name.value) + "," + csv_cell(verdict_words(fit.verdict));
  constexpr const char* kOrigins[] = {"fitted", "at its bound", "held", "implied", "assumed"};
  for (std::size_t i = 0; i < kParameterCount; ++i) {
    const auto p = std::find_if(fit.parameters.begin(), fit.parameters.end(),
                                [&](const ParameterResult& result) { return result.parameter == static_cast<Parameter>(i); });
    text += p == fit.parameters.end()
                ? ",,,"
                : fmt::format(",{:.6g},{},{}", p->value, p->error > 0.0 ? fmt::format("{:.2g}", p->error) : "",
                              kOrigins[static_cast<std::size_t>(p->state)]);
  }
  double worst = 0.0;
  for (const ReadingResult& reading : fit.readings) worst = std::max(worst, std::abs(reading.residual) / reading.sigma);
  std::string remarks;
  for (const std::string& remark : fit.remarks) remarks += (remarks.empty() ? "" : " ") + remark;
  return text + fmt::format(",{},{},{:.4g},{:.2f},{}\n", fit.task.readings.size(), fit.degrees_of_freedom, fit.chi_square, worst,
                            csv_cell(remarks));
}

}  // namespace whorl::fit
