// SPDX-License-Identifier: Apache-2.0
// The report as JSON; its keys are public.
#include "fit/observed.h"
#include "fit/report.h"
#include "fit/words.h"

#include <cmath>

namespace whorl::fit {
namespace {

using nlohmann::ordered_json;
using specimen::GrowthStage;

ordered_json finite(double value) { return std::isfinite(value) ? ordered_json(value) : ordered_json(nullptr); }

ordered_json parameters_json(const Fit& fit) {
  constexpr const char* kOrigins[] = {"fitted", "at its bound", "held", "implied", "assumed"};
  ordered_json list = ordered_json::array();
  for (const ParameterResult& p : fit.parameters) {
    ordered_json entry{{"name", row_of(p.parameter).name}, {"meaning", row_of(p.parameter).meaning}, {"value", p.value},
                       {"origin", kOrigins[static_cast<std::size_t>(p.state)]}};
    if (p.state == State::kFitted || p.state == State::kAtBound) {
      entry["standard_error"] = p.error;
      entry["interval_95"] = {p.low, p.high};
    } else {
      entry["why"] = p.why;
      if (p.state == State::kAssumed) entry["would_be_fixed_by"] = p.fixed_by;
    }
    list.push_back(std::move(entry));
  }
  return list;
}

// Of the fitted numbers as the solver has them (size, W and S by their logarithms).
ordered_json correlation_json(const Fit& fit) {
  ordered_json json{{"names", ordered_json::array()}, {"matrix", ordered_json::array()}};
  const Eigen::MatrixXd& c = fit.knowledge.covariance;
  for (const std::size_t index : fit.knowledge.indices)
    json["names"].push_back(index < kParameterCount ? row_of(static_cast<Parameter>(index)).name : "scale of a series or place of an outline");
  for (Eigen::Index i = 0; i < c.rows(); ++i) {
    ordered_json row = ordered_json::array();
    for (Eigen::Index j = 0; j < c.cols(); ++j) row.push_back(c(i, j) / std::sqrt(c(i, i) * c(j, j)));
    json["matrix"].push_back(row);
  }
  return json;
}

ordered_json readings_json(const Fit& fit, const OnSolid& on_solid) {
  ordered_json list = ordered_json::array();
  for (std::size_t i = 0; i < fit.readings.size(); ++i) {
    const specimen::Reading& reading = fit.task.readings[i];
    const ReadingResult& result = fit.readings[i];
    const specimen::DefinitionRow& row = specimen::row_of(reading.definition);
    ordered_json entry{{"quantity", row.quantity}, {"definition", row.definition}};
    if (reading.stage.kind == GrowthStage::Kind::kBehindLip) entry["behind_lip"] = reading.stage.value;
    if (reading.stage.kind == GrowthStage::Kind::kAtWhorl) entry["at_whorl"] = reading.stage.value;
    if (reading.stage.kind == GrowthStage::Kind::kAtDiameter) entry["at_diameter"] = reading.stage.value;
    if (reading.series >= 0) entry["series"] = reading.series;
    entry["read"] = reading.value;
    entry["standard_error"] = result.sigma;
    entry["predicted"] = result.predicted;
    entry["residual"] = result.residual;
    if (reading.step > 0.0) {
      entry["step"] = reading.step;
      entry["residual_in_steps"] = result.residual / reading.step;
    }
    if (i < on_solid.size() && on_solid[i]) entry["on_solid"] = *on_solid[i];
    entry["fits"] = result.fits;
    list.push_back(std::move(entry));
  }
  return list;
}

}  // namespace

nlohmann::ordered_json to_json(const Fit& fit, const specimen::MeasuredSpecimen& measured, const OnSolid& on_solid) {
  ordered_json json;
  json["specimen"] = measured.identity.name.value;
  json["verdict"] = verdict_words(fit.verdict);
  json["measured"] = measured.mould ? "internal mould" : "shell";
  json["success"] = is_success(fit.verdict);
  json["units"] = "mm, degrees, whorls";
  json["parameters"] = parameters_json(fit);
  json["correlation"] = correlation_json(fit);
  json["measurements"] = readings_json(fit, on_solid);
  json["misfit"] = {{"chi_square", fit.chi_square}, {"degrees_of_freedom", fit.degrees_of_freedom}, {"error_inflation", fit.inflation}};
  json["indices"] = ordered_json::array();
  for (const IndexResult& index : fit.indices) {
    ordered_json entry{{"name", index.name}, {"meaning", index.meaning}, {"of_shell", finite(index.of_shell)},
                       {"of_shell_error", finite(index.of_shell_error)}};
    if (index.from_readings) entry["of_readings"] = {{"value", index.read}, {"standard_error", index.read_error}, {"steps_move_it", index.read_step}};
    json["indices"].push_back(std::move(entry));
  }
  json["series"] = ordered_json::array();
  for (const SeriesResult& s : fit.series)
    json["series"].push_back({{"least_squares_W", s.least_squares_W}, {"rms_of_ln", s.rms_of_ln}, {"end_to_end_W", s.end_to_end_W},
                              {"first_ratio", s.first_ratio}, {"last_ratio", s.last_ratio}, {"spread_of_ratios", s.spread_of_ratios},
                              {"mean_spiral_angle_deg", s.mean_spiral_angle}, {"scatter", s.scatter}});
  json["outlines"] = ordered_json::array();
  for (const OutlineResult& o : fit.outlines)
    json["outlines"].push_back({{"points", o.points}, {"on_outline", o.on_outline}, {"median_distance", o.median_distance},
                                {"tilt_deg", o.tilt_deg}, {"fits", o.fits}});
  json["models"] = ordered_json::array();
  for (const ModelResult& model : fit.models)
    json["models"].push_back({{"name", model.name}, {"parameters", model.parameters}, {"chi_square", model.chi_square},
                              {"corrected_aic", finite(model.aicc)}, {"chosen", model.chosen}});
  if (!fit.parameters.empty()) {
    json["preserved"] = {{"by", measured.preserved.empty() ? "readings" : "statement"}, {"stretches", ordered_json::array()}};
    for (const specimen::Preserved& stated : preserved_of(fit, measured)) {
      const specimen::Stretch stretch = specimen::stretch_of(stated, at(fit.trial.values, Parameter::kWhorls));
      json["preserved"]["stretches"].push_back(
          {{"from_whorl", stretch.from}, {"to_whorl", stretch.to}, {"parts", specimen::parts_word(stated.parts)}});
    }
  }
  json["remarks"] = fit.remarks;
  return json;
}

}  // namespace whorl::fit
