// SPDX-License-Identifier: Apache-2.0
// Axial sections of a shell of seven whorls: lumens apart from one another and from the outside, walls as thick as stated.
#include "support/catch.h"
#include "support/shell_specimen.h"

#include <cmath>
#include <vector>

using namespace whorl;
using field::State;

namespace {

test::ShellPlan seven_whorls() {
  test::ShellPlan plan;
  plan.name = "seven whorls";
  plan.whorls = 7.0;
  plan.W = {{0.0, 1.35}};
  plan.D = 0.03;
  plan.T = 3.4;
  plan.size_mm = 20.0;
  plan.wall_mm = 0.3;
  plan.columella = 0.18;
  return plan;
}

// One lumen as the plane cuts it: the passage whose centre it holds.
struct Passage {
  double theta;
  int side;  // +1 at the plane's azimuth, -1 half a turn on
};

// The plane through the axis as pixels. Columns run from the far side (x < 0) to the side of the azimuth.
class Section {
 public:
  Section(const test::Shell& shell, double azimuth, double pixel) : shell_(shell), azimuth_(azimuth), pixel_(pixel) {
    const Box3& box = shell.scene.bounds;
    const double radius = std::max({-box.min.x, box.max.x, -box.min.y, box.max.y});
    half_width_ = static_cast<int>(radius / pixel) + 2;
    width_ = 2 * half_width_ + 1;
    top_ = box.min.z - 2.0 * pixel;
    height_ = static_cast<int>((box.max.z - top_) / pixel) + 3;
    for (int y = 0; y < height_; ++y)
      for (int x = 0; x < width_; ++x) {
        const double rho = (x - half_width_) * pixel;
        states_.push_back(shell.at({rho * std::cos(azimuth), rho * std::sin(azimuth), top_ + y * pixel}));
      }
    lumen_.assign(states_.size(), 0);
    for (std::size_t i = 0; i < states_.size(); ++i)
      if (states_[i] == State::kLumen && lumen_[i] == 0) fill(i, ++lumens_);
  }

  int lumens() const { return lumens_; }
  /// Number of the lumen that holds the centre of a passage; 0 where none does.
  int lumen_at(const Passage& passage) const {
    const growth::Station s = shell_.scene.law.at(passage.theta);
    const int x = half_width_ + passage.side * static_cast<int>(std::lround(s.distance / pixel_));
    return lumen_[index(x, static_cast<int>(std::lround((s.depth - top_) / pixel_)))];
  }
  /// Whether a lumen meets the outside anywhere without wall between.
  bool open_to_outside(int lumen) const {
    bool open = false;
    each_of(lumen, [&](int x, int y) {
      for (const auto& [dx, dy] : kNext) open = open || states_[index(x + dx, y + dy)] == State::kOutside;
    });
    return open;
  }
  /// Least distance, in mm, from the lumen to air that is neither its own nor in `excused`; at most `most`.
  double wall_round(int lumen, const std::vector<int>& excused, double most) const {
    const int reach = static_cast<int>(most / pixel_) + 1;
    double least = most;
    each_of(lumen, [&](int x, int y) {
      bool edge = false;
      for (const auto& [dx, dy] : kNext) edge = edge || lumen_[index(x + dx, y + dy)] != lumen;
      if (!edge) return;
      for (int dy = -reach; dy <= reach; ++dy)
        for (int dx = -reach; dx <= reach; ++dx) {
          if (x + dx < 0 || x + dx >= width_ || y + dy < 0 || y + dy >= height_) continue;
          const std::size_t i = index(x + dx, y + dy);
          if (states_[i] == State::kSolid || lumen_[i] == lumen) continue;
          if (std::find(excused.begin(), excused.end(), lumen_[i]) != excused.end() && lumen_[i] != 0) continue;
          least = std::min(least, std::hypot(dx, dy) * pixel_);
        }
    });
    return least;
  }

 private:
  static constexpr std::pair<int, int> kNext[] = {{1, 0}, {-1, 0}, {0, 1}, {0, -1}};
  std::size_t index(int x, int y) const { return static_cast<std::size_t>(y) * static_cast<std::size_t>(width_) + static_cast<std::size_t>(x); }
  template <class F>
  void each_of(int lumen, const F& visit) const {
    for (int y = 1; y + 1 < height_; ++y)
      for (int x = 1; x + 1 < width_; ++x)
        if (lumen_[index(x, y)] == lumen) visit(x, y);
  }
  void fill(std::size_t seed, int number) {
    std::vector<std::size_t> open{seed};
    lumen_[seed] = number;
    while (!open.empty()) {
      const std::size_t at = open.back();
      open.pop_back();
      const int x = static_cast<int>(at % static_cast<std::size_t>(width_)), y = static_cast<int>(at / static_cast<std::size_t>(width_));
      for (const auto& [dx, dy] : kNext) {
        if (x + dx < 0 || x + dx >= width_ || y + dy < 0 || y + dy >= height_) continue;
        const std::size_t next = index(x + dx, y + dy);
        if (states_[next] != State::kLumen || lumen_[next] != 0) continue;
        lumen_[next] = number;
        open.push_back(next);
      }
    }
  }

  const test::Shell& shell_;
  double azimuth_, pixel_, top_ = 0.0;
  int half_width_ = 0, width_ = 0, height_ = 0, lumens_ = 0;
  std::vector<State> states_;
  std::vector<int> lumen_;  // number of the lumen a pixel belongs to, 0 for none
};

}  // namespace

TEST_CASE("Axial sections show one closed lumen a whorl, none open to the next, walled as thick as stated", "[field][section]") {
  const test::Shell shell(seven_whorls());
  const growth::CoilingLaw& law = shell.scene.law;
  // A wall of the first whorls is cut by six pixels.
  const double pixel = shell.plan.wall_mm * law.at(law.theta_start + kPi).half_breadth / law.half_breadth / 6.0;
  for (const double behind_lip : {kPi / 3.0, 0.9 * kPi}) {
    const double azimuth = law.theta_lip - behind_lip;
    const Section section(shell, azimuth, pixel);
    // Passages of both sides, from the lip to where the tube opens into the embryonic shell.
    std::vector<Passage> passages;
    for (int i = 0; law.theta_lip - behind_lip - i * kPi > law.theta_start + kPi; ++i)
      passages.push_back({law.theta_lip - behind_lip - i * kPi, i % 2 == 0 ? 1 : -1});
    CAPTURE(behind_lip, passages.size());
    CHECK(passages.size() >= 11);
    CHECK(section.lumens() == static_cast<int>(passages.size()) + 1);  // and the embryonic shell's
    for (std::size_t i = 0; i < passages.size(); ++i) {
      const int lumen = section.lumen_at(passages[i]);
      CAPTURE(i, lumen);
      REQUIRE(lumen > 0);
      CHECK_FALSE(section.open_to_outside(lumen));
      // Walls towards earlier lumens are those of the earlier whorls, and thinner.
      std::vector<int> earlier;
      for (std::size_t k = i + 1; k < passages.size(); ++k) {
        earlier.push_back(section.lumen_at(passages[k]));
        CHECK(earlier.back() != lumen);
      }
      for (int other = 1; other <= section.lumens(); ++other) {
        bool named = other == lumen;
        for (const Passage& passage : passages) named = named || section.lumen_at(passage) == other;
        if (!named) earlier.push_back(other);  // the embryonic shell's
      }
      const double stated = shell.plan.wall_mm * law.at(passages[i].theta).half_breadth / law.half_breadth;
      CHECK(section.wall_round(lumen, earlier, 2.0 * stated) > stated - 1.5 * pixel);
    }
  }
}
