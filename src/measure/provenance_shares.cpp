// SPDX-License-Identifier: Apache-2.0
// The coil's arc and the outer surface, sorted by provenance.
#include "measure/provenance_shares.h"

#include "field/growth_line.h"
#include "math/parallel.h"
#include "measure/integrals.h"

#include <algorithm>

namespace whorl::measure {
namespace {

using specimen::kProvenances;
using specimen::Provenance;
using specimen::ShellPart;
using Counts = std::array<double, kProvenances>;

constexpr int kReplicates = 8;
constexpr std::size_t kChunk = 1024;  // lines counted by one task, so that sums do not depend on the threads

// Length of the centre line a radian of growth.
double speed(const growth::CoilingLaw& law, double theta) {
  const growth::Station s = law.at(theta);
  return std::hypot(law.by_distance.rate(theta) * s.distance, s.distance, law.by_depth.rate(theta) * s.depth);
}

Counts arc_shares(const growth::CoilingLaw& law, const specimen::Preservation& preservation) {
  constexpr int kSteps = 40000;  // the ends of stretches fall within one
  Counts shares{};
  double whole = 0.0;
  for (int i = 0; i < kSteps; ++i) {
    const double theta = law.theta_lip * (i + 0.5) / kSteps, length = speed(law, theta);
    shares[static_cast<std::size_t>(preservation.along(theta / kTwoPi))] += length;
    whole += length;
  }
  for (double& share : shares) share /= whole;
  return shares;
}

Provenance provenance_of(const field::Field& field, const specimen::Preservation& preservation, const trace::Crossing& crossing, const Vec3& p) {
  switch (crossing.part) {
    case field::Part::kPillar: return preservation.of(ShellPart::kColumella, field::whorl_at_depth(field.scene(), p.z));
    case field::Part::kWhorl:
    case field::Part::kWhorlHollow: return preservation.of(ShellPart::kOutside, field::whorl_at(field, p, crossing.theta));
    default: return preservation.of(ShellPart::kEmbryonic, 0.0);
  }
}

}  // namespace

specimen::ProvenanceShares provenance_shares(const trace::EmbreeSolid& solid, const specimen::Preservation& preservation,
                                             const MeasureOptions& options) {
  const field::Field& field = solid.field();
  const Box3& box = field.scene().bounds;
  const Vec3 centre = 0.5 * (box.min + box.max);
  const double radius = 0.5 * (box.max - box.min).length();
  const std::size_t chunks = std::max<std::size_t>(kChunk, static_cast<std::size_t>(options.lines) / kReplicates) / kChunk;
  std::vector<Counts> counts(kReplicates * chunks, Counts{});
  parallel_for(counts.size(), 1, [&](std::size_t task) {
    SobolStream stream({0, 0, 0, static_cast<std::uint32_t>(task / chunks), options.seed});
    std::vector<trace::Crossing> crossings;
    for (std::size_t i = 0; i < kChunk; ++i) {
      stream.set_point(static_cast<std::uint32_t>(task % chunks * kChunk + i));
      const trace::Ray line = isotropic_line(centre, radius, stream.block(0));
      solid.crossings(line, field::State::kOutside, crossings);
      for (const trace::Crossing& c : crossings) {
        const bool outer = (c.before == field::State::kSolid && c.after == field::State::kOutside) ||
                           (c.before == field::State::kOutside && c.after == field::State::kSolid);
        if (!outer) continue;
        const Vec3 p = Vec3(line.origin) + static_cast<double>(c.t) * Vec3(line.direction);
        counts[task][static_cast<std::size_t>(provenance_of(field, preservation, c, p))] += 1.0;
      }
    }
  });

  specimen::ProvenanceShares shares;
  shares.arc = arc_shares(field.scene().law, preservation);
  std::array<Counts, kReplicates> means{};
  for (std::size_t task = 0; task < counts.size(); ++task)
    for (std::size_t k = 0; k < kProvenances; ++k) means[task / chunks][k] += counts[task][k];
  for (Counts& mean : means) {
    double all = 0.0;
    for (const double count : mean) all += count;
    for (double& count : mean) count /= std::max(1.0, all);
  }
  for (std::size_t k = 0; k < kProvenances; ++k) {
    double mean = 0.0, spread = 0.0;
    for (const Counts& m : means) mean += m[k] / kReplicates;
    for (const Counts& m : means) spread += (m[k] - mean) * (m[k] - mean);
    shares.surface[k] = mean;
    shares.surface_error = std::max(shares.surface_error, std::sqrt(spread / (kReplicates * (kReplicates - 1.0))));
  }
  return shares;
}

}  // namespace whorl::measure
