// SPDX-License-Identifier: Apache-2.0
// Covariance by singular values; candidates of further measures tried one by one.
#include "fit/knowledge.h"

#include "fit/predict.h"

#include <Eigen/Dense>
#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace whorl::fit {
namespace {

using specimen::Definition;
using specimen::GrowthStage;
using specimen::Reading;

// Directions less certain than this many plausible widths count as infinitely uncertain, so that inverses stay finite.
constexpr double kHopeless = 1e4;

Eigen::MatrixXd inverse_of_normal(const Eigen::MatrixXd& scaled) {
  const Eigen::JacobiSVD<Eigen::MatrixXd> svd(scaled, Eigen::ComputeThinU | Eigen::ComputeFullV);
  Eigen::VectorXd inverse = Eigen::VectorXd::Constant(scaled.cols(), kHopeless * kHopeless);
  for (Eigen::Index i = 0; i < svd.singularValues().size(); ++i)
    inverse[i] = std::min(1.0 / (svd.singularValues()[i] * svd.singularValues()[i]), kHopeless * kHopeless);
  return svd.matrixV() * inverse.asDiagonal() * svd.matrixV().transpose();
}

// A reading that might be added, with the error that one usually has.
Reading candidate_of(Definition definition, GrowthStage stage, double value, double usual_step) {
  constexpr double kUsualAngle = 1.0, kUsualCount = 0.25;  // degrees; whorls
  Reading reading;
  reading.definition = definition;
  reading.stage = stage;
  reading.value = value;
  switch (specimen::row_of(definition).dimension) {
    case specimen::Dimension::kLength: reading.step = usual_step; break;
    case specimen::Dimension::kAngle: reading.step = kUsualAngle; break;
    case specimen::Dimension::kCount: reading.step = kUsualCount; break;
  }
  reading.standard_error = reading.step / std::sqrt(12.0);
  return reading;
}

bool worth_trying(Definition definition) {
  return definition != Definition::kWhorlWidthProportional && definition != Definition::kWallThicknessLip &&
         definition != Definition::kWallThicknessWall && definition != Definition::kWhorlsPole &&
         definition != Definition::kWhorlsSutureStart && definition != Definition::kWhorlsNucleusLineQuarter;
}

}  // namespace

bool knowledge_at(const Task& task, const Trial& trial, Knowledge& result) {
  Eigen::MatrixXd slopes;
  const Eigen::VectorXd x = packed(task, trial);
  result.indices = free_indices(task);
  if (!jacobian(task, trial, x, slopes)) return false;
  const Bounds bounds = bounds_of(task);
  const Eigen::MatrixXd scaled = slopes * bounds.plausible.asDiagonal();
  const Eigen::JacobiSVD<Eigen::MatrixXd> svd(scaled, Eigen::ComputeFullV);
  const Eigen::Index count = x.size();
  const bool enough = svd.singularValues().size() == count;
  const double least = enough && count > 0 ? svd.singularValues()[count - 1] : 0.0;
  result.weakest = count == 0 ? 0.0 : least > 1.0 / kHopeless ? 1.0 / least : kHopeless;
  if (count > 0) result.weakest_direction = svd.matrixV().col(count - 1);
  const Eigen::MatrixXd inverse = inverse_of_normal(scaled);
  result.covariance = bounds.plausible.asDiagonal() * inverse * bounds.plausible.asDiagonal();
  result.leverage = (scaled * inverse * scaled.transpose()).diagonal();
  return true;
}

std::vector<std::string> would_fix(const Task& task, const Trial& trial, Parameter parameter) {
  Task wider = task;
  wider.free[static_cast<std::size_t>(parameter)] = true;
  const std::vector<std::size_t> indices = free_indices(wider);
  const auto place = std::find(indices.begin(), indices.end(), static_cast<std::size_t>(parameter)) - indices.begin();
  double usual_step = 0.0, largest = 0.0;
  for (const Reading& reading : task.readings) {
    if (specimen::row_of(reading.definition).dimension != specimen::Dimension::kLength) continue;
    largest = std::max(largest, reading.value);
    usual_step = std::max(usual_step, reading.step);
  }
  if (usual_step == 0.0) usual_step = 0.002 * largest;

  const std::optional<Form> form = form_of(trial.values, task.fixed);
  Eigen::MatrixXd known_slopes;
  const Eigen::VectorXd x = packed(wider, trial);
  const Bounds bounds = bounds_of(wider);
  if (!form || !jacobian(wider, trial, x, known_slopes)) return {};
  struct Offer {
    double left;  // uncertainty of the parameter with this measure, in plausible widths
    std::string name;
  };
  std::vector<Offer> offers;
  const auto try_candidate = [&](Definition definition, GrowthStage stage, std::string name) {
    const double value = predict(*form, definition, stage);
    if (!std::isfinite(value) || value == 0.0) return;
    for (const Reading& known : task.readings)
      if (known.definition == definition && known.stage.kind == stage.kind && known.stage.value == stage.value) return;
    // The candidate's own row of derivatives, beside those that are known: outlines play no part in it.
    Task alone = wider;
    alone.readings = {candidate_of(definition, stage, value, usual_step)};
    for (specimen::TracedOutline& outline : alone.outlines) outline.points.clear();
    Eigen::MatrixXd own_slopes;
    if (!jacobian(alone, trial, x, own_slopes)) return;
    Eigen::MatrixXd scaled(known_slopes.rows() + 1, known_slopes.cols());
    scaled << known_slopes, own_slopes.row(0);
    scaled *= bounds.plausible.asDiagonal();
    const double left = std::sqrt(inverse_of_normal(scaled)(place, place));
    offers.push_back({left, std::move(name)});
  };
  for (const specimen::DefinitionRow& row : specimen::all_definitions()) {
    if (!worth_trying(row.id)) continue;
    try_candidate(row.id, {}, specimen::written_definition(row.id));
  }
  for (const double whorls : {1.0, 2.0})
    try_candidate(Definition::kWhorlWidthFlanks, {GrowthStage::Kind::kBehindLip, whorls},
                  fmt::format("whorl_width flank_to_flank {:g} whorl{} before the lip", whorls, whorls == 1.0 ? "" : "s"));
  std::sort(offers.begin(), offers.end(), [](const Offer& a, const Offer& b) { return a.left < b.left; });
  constexpr double kWellFixed = 0.25;
  constexpr std::size_t kMost = 3;
  std::vector<std::string> names;
  for (const Offer& offer : offers)
    if (offer.left < kWellFixed && names.size() < kMost) names.push_back(offer.name);
  return names;
}

}  // namespace whorl::fit
