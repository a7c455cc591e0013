// SPDX-License-Identifier: Apache-2.0
// Random lines through the solid.
#include "measure/integrals.h"

#include "math/parallel.h"

#include <array>

namespace whorl::measure {
namespace {

using field::State;

constexpr int kReplicates = 8;
constexpr std::size_t kChunk = 1024;  // lines summed by one task, so that sums do not depend on the threads
enum Quantity { kOuterLength, kLumenLength, kWallLength, kOuterCrossings, kInnerCrossings, kQuantities };
using Sums = std::array<double, kQuantities>;

void add_line(const trace::EmbreeSolid& solid, const Vec3& centre, double radius,
              const std::array<float, kSobolDimensions>& u, std::vector<trace::Crossing>& crossings, Sums& sums) {
  solid.crossings(isotropic_line(centre, radius, u), State::kOutside, crossings);
  for (std::size_t i = 0; i < crossings.size(); ++i) {
    const trace::Crossing& c = crossings[i];
    const bool solid_side = c.before == State::kSolid || c.after == State::kSolid;
    const bool outside = c.before == State::kOutside || c.after == State::kOutside;
    if (solid_side) sums[outside ? kOuterCrossings : kInnerCrossings] += 1.0;
    if (i + 1 == crossings.size()) break;
    const double length = static_cast<double>(crossings[i + 1].t - c.t);
    if (c.after != State::kOutside) sums[kOuterLength] += length;
    if (c.after == State::kLumen) sums[kLumenLength] += length;
    if (c.after == State::kSolid) sums[kWallLength] += length;
  }
}

}  // namespace

trace::Ray isotropic_line(const Vec3& centre, double radius, const std::array<float, kSobolDimensions>& u) {
  const double z = 1.0 - 2.0 * static_cast<double>(u[0]), around = kTwoPi * static_cast<double>(u[1]);
  const double across = std::sqrt(std::max(0.0, 1.0 - z * z));
  const Frame frame = frame_around({across * std::cos(around), across * std::sin(around), z});
  const double r = radius * std::sqrt(static_cast<double>(u[2])), turn = kTwoPi * static_cast<double>(u[3]);
  const Vec3 start = centre + frame.to_world({r * std::cos(turn), r * std::sin(turn), -1.001 * radius});
  return {Vec3f(start), Vec3f(frame.z)};
}

Integrals integrate(const trace::EmbreeSolid& solid, const MeasureOptions& options) {
  const Box3& box = solid.field().scene().bounds;
  const Vec3 centre = 0.5 * (box.min + box.max);
  const double radius = 0.5 * (box.max - box.min).length();
  const std::size_t per_replicate = std::max<std::size_t>(kChunk, static_cast<std::size_t>(options.lines) / kReplicates);
  const std::size_t chunks = per_replicate / kChunk;
  std::vector<Sums> partial(kReplicates * chunks, Sums{});
  parallel_for(partial.size(), 1, [&](std::size_t task) {
    SobolStream stream({0, 0, 0, static_cast<std::uint32_t>(task / chunks), options.seed});
    std::vector<trace::Crossing> crossings;
    for (std::size_t i = 0; i < kChunk; ++i) {
      stream.set_point(static_cast<std::uint32_t>(task % chunks * kChunk + i));
      add_line(solid, centre, radius, stream.block(0), crossings, partial[task]);
    }
  });

  std::array<Sums, kReplicates> means{};
  for (std::size_t task = 0; task < partial.size(); ++task)
    for (int q = 0; q < kQuantities; ++q)
      means[task / chunks][static_cast<std::size_t>(q)] +=
          partial[task][static_cast<std::size_t>(q)] / static_cast<double>(chunks * kChunk);
  const auto estimate = [&](Quantity q, double factor, const char* method) {
    double mean = 0.0, spread = 0.0;
    for (const Sums& m : means) mean += m[q] / kReplicates;
    for (const Sums& m : means) spread += (m[q] - mean) * (m[q] - mean);
    return Measured{factor * mean, factor * std::sqrt(spread / (kReplicates * (kReplicates - 1.0))), method};
  };
  const double volume = kPi * radius * radius, area = 2.0 * volume;
  constexpr const char* by_length = "mean length inside along isotropic lines (Cauchy)";
  constexpr const char* by_count = "mean crossings of isotropic lines (Crofton)";
  return {estimate(kOuterLength, volume, by_length), estimate(kLumenLength, volume, by_length),
          estimate(kWallLength, volume, by_length), estimate(kOuterCrossings, area, by_count),
          estimate(kInnerCrossings, area, by_count)};
}

}  // namespace whorl::measure
