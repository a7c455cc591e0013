// SPDX-License-Identifier: Apache-2.0
// Stretches, percentages and the meaning of hatching.
#include "plate/provenance_words.h"

#include "plate/disclosure.h"
#include "plate/unobserved.h"

#include <fmt/format.h>

namespace whorl::plate {
namespace {

using nlohmann::ordered_json;
using specimen::PreservedParts;
using specimen::Provenance;

constexpr Provenance kAll[] = {Provenance::kObserved, Provenance::kInterpolated, Provenance::kExtrapolated, Provenance::kAssumed};

const char* parts_words(PreservedParts parts) {
  switch (parts) {
    case PreservedParts::kWhole: return "the whole shell";
    case PreservedParts::kWall: return "the wall";
    case PreservedParts::kOutside: return "the outside";
    case PreservedParts::kInside: return "the inside";
  }
  return "";
}

std::string end_words(const std::optional<specimen::Stated<double>>& end, bool from_lip, const char* where_unstated) {
  if (!end) return where_unstated;
  if (!from_lip) return fmt::format("whorl {:.3g}", end->value);
  if (end->value == 0.0) return "the lip";
  return fmt::format("{:.3g} whorl{} before the lip", end->value, end->value == 1.0 ? "" : "s");
}

/// "the outside from whorl 3 to the lip"
std::string stretch_words(const specimen::Preserved& stretch) {
  const std::string from = end_words(stretch.from, stretch.from_lip, "the apex"), to = end_words(stretch.to, stretch.from_lip, "the lip");
  return fmt::format("{} {}", parts_words(stretch.parts), from == to ? "at " + from : fmt::format("from {} to {}", from, to));
}

/// Per cents that add up to 100: what rounding down leaves goes to those that it cuts most.
std::array<int, specimen::kProvenances> percents(const std::array<double, specimen::kProvenances>& shares) {
  std::array<int, specimen::kProvenances> whole{};
  int rest = 100;
  for (std::size_t i = 0; i < whole.size(); ++i) rest -= whole[i] = static_cast<int>(100.0 * shares[i]);
  const auto cut = [&](std::size_t i) { return 100.0 * shares[i] - whole[i]; };
  for (; rest > 0; --rest) {
    std::size_t most = 0;
    for (std::size_t i = 1; i < whole.size(); ++i)
      if (cut(i) > cut(most)) most = i;
    ++whole[most];
  }
  return whole;
}

/// "60 % is observed, 30 % extrapolated and 10 % assumed"
std::string share_words(const std::array<double, specimen::kProvenances>& shares) {
  const auto whole = percents(shares);
  std::vector<std::string> items;
  for (const Provenance one : kAll) {
    const auto i = static_cast<std::size_t>(one);
    if (!(shares[i] > 0.0)) continue;
    items.push_back(fmt::format("{} %{} {}", whole[i] > 0 ? std::to_string(whole[i]) : "under 1", items.empty() ? " is" : "", provenance_word(one)));
  }
  return in_words(items);
}

ordered_json share_record(const std::array<double, specimen::kProvenances>& shares) {
  ordered_json json;
  for (const Provenance one : kAll) json[provenance_word(one)] = shares[static_cast<std::size_t>(one)];
  return json;
}

}  // namespace

std::string provenance_sentences(const FigurePlan& plan, const specimen::Specimen& specimen,
                                 const std::optional<specimen::ProvenanceShares>& shares) {
  std::vector<std::string> stretches;
  for (const specimen::Preserved& stretch : specimen.preserved) stretches.push_back(stretch_words(stretch));
  std::string text = "Preserved: " + in_words(stretches) + ".";
  if (shares)
    text += fmt::format(" Of the length of the coil {}; of the outer surface {}.", share_words(shares->arc), share_words(shares->surface));
  const std::string drawn = unobserved_words(plan);
  return drawn.empty() ? text : text + " " + drawn;
}

ordered_json provenance_record(const FigurePlan& plan, const specimen::Specimen& specimen,
                               const std::optional<specimen::ProvenanceShares>& shares) {
  ordered_json json;
  json["preserved"] = ordered_json::array();
  for (const specimen::Preserved& stated : specimen.preserved) {
    const specimen::Stretch stretch = specimen::stretch_of(stated, specimen.growth.whorls);
    json["preserved"].push_back({{"from_whorl", stretch.from}, {"to_whorl", stretch.to}, {"parts", specimen::parts_word(stated.parts)}});
  }
  for (const Provenance one : kAll) json["layer"][std::to_string(static_cast<int>(one))] = provenance_word(one);
  if (shares) {
    json["arc_share"] = share_record(shares->arc);
    json["outer_surface_share"] = share_record(shares->surface);
    json["outer_surface_share_error"] = shares->surface_error;
  }
  constexpr const char* kDrawn[] = {"plain", "tint", "hatch"};
  json["drawn"] = kDrawn[static_cast<std::size_t>(plan.unobserved)];
  if (plan.unobserved == specimen::Unobserved::kHatch) json["hatch_spacing_mm"] = plan.hatch_mm;
  return json;
}

}  // namespace whorl::plate
