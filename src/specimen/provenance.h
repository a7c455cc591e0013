// SPDX-License-Identifier: Apache-2.0
// What of a shell was observed and what was not, place by place in the coordinates of growth.
#pragma once

#include "specimen/specimen.h"

#include <array>
#include <cstdint>

namespace whorl::specimen {

/// The numbers are those of the `provenance` layer. A higher one is known less well.
enum class Provenance : std::uint8_t {
  kNone = 0,
  kObserved = 1,
  kInterpolated = 2,  // by the coiling law, between observed stretches
  kExtrapolated = 3,  // by the coiling law, beyond them
  kAssumed = 4,       // by no measurement of that part
};
inline constexpr std::size_t kProvenances = 5;
const char* provenance_word(Provenance provenance);

/// The parts of a shell that can be observed one without the other.
enum class ShellPart {
  kEmbryonic,  // the embryonic shell, one piece
  kOutside,    // of the whorls
  kInside,     // of the whorls: their lumen
  kWall,       // cut through, between the two
  kColumella,
};

/// A stretch of growth, whorls from the pole.
struct Stretch {
  double from, to;
};

/// Where a stated stretch lies on a shell of so many whorls.
Stretch stretch_of(const Preserved& stated, double whorls);
/// As the files have it: "whole", "wall" ..
const char* parts_word(PreservedParts parts);

class Preservation {
 public:
  /// From what the specimen states as preserved.
  explicit Preservation(const Specimen& specimen);

  /// Whether the specimen says anything of it.
  bool stated() const { return stated_; }
  /// `whorl` from the pole, counted along growth lines.
  Provenance of(ShellPart part, double whorl) const;
  /// Of the coil, of which any preserved part tells.
  Provenance along(double whorl) const;

 private:
  Provenance in(const std::vector<Stretch>& observed, double whorl) const;

  bool stated_ = false;
  double start_ = 0.0, whorls_ = 0.0;
  std::vector<Stretch> any_, outside_, inside_, columella_;
};

/// Shares of the whole, 0 .. 1, by the number of their provenance.
struct ProvenanceShares {
  std::array<double, kProvenances> arc{};      // of the length of the coil's centre line, from the pole to the lip
  std::array<double, kProvenances> surface{};  // of the outer surface
  double surface_error = 0.0;                  // standard error of each of the latter
};

}  // namespace whorl::specimen
