// SPDX-License-Identifier: Apache-2.0
// Signed lengths in the leaves of an OpenVDB tree that the surface may cross, then dual contouring.
#include "solid_mesh.h"

#include "math/parallel.h"
#include "stopwatch.h"

#include <openvdb/openvdb.h>
#include <openvdb/tools/SignedFloodFill.h>
#include <openvdb/tools/VolumeToMesh.h>

#include <algorithm>
#include <array>
#include <atomic>
#include <cmath>
#include <memory>

namespace whorl::bench {
namespace {

using field::Part;
using field::Term;
using Leaf = openvdb::FloatTree::LeafNodeType;

constexpr int kLeaf = static_cast<int>(Leaf::DIM);  // voxels a side
constexpr int kBlock = 4;                           // a leaf is looked at in blocks of so many voxels first
constexpr double kBand = 3.0;                       // voxels to either side of the surface, as level sets have it
// An upper bound of the functions' steepness where they are a few voxels deep: they are lengths to first order there.
constexpr double kSteepest = 2.0;

/// One owner of space in growth order: a pair of functions.
struct Owner {
  Term outer;
};

void owners_at(const field::Field& field, double azimuth, std::vector<Owner>& owners) {
  owners.clear();
  owners.push_back({{Part::kChamber, 0.0}});
  if (field.scene().pillar.present) owners.push_back({{Part::kPillar, 0.0}});
  double first, last;
  field.passages(azimuth, first, last);
  // One more at either end, since a block spreads over azimuths.
  for (double theta = first - kTwoPi; theta <= last + kTwoPi + 1e-9; theta += kTwoPi) owners.push_back({{Part::kWhorl, theta}});
}

/// Signed lengths of an owner's outside and of its hollow.
void lengths_of(const field::Field& field, const Owner& owner, const Vec3& p, double& outer, double& hollow) {
  switch (owner.outer.part) {
    case Part::kWhorl:
      if (owner.outer.theta < field.scene().theta_begin - kPi) {
        outer = hollow = -1e9;
        return;
      }
      field.whorl(p, owner.outer.theta, outer, hollow);
      return;
    case Part::kChamber:
      outer = field.value(owner.outer, p);
      hollow = field.value({Part::kChamberHollow, 0.0}, p);
      if (field.scene().chamber.open)
        hollow = std::max(hollow, field.value({Part::kChamberOpening, field.opening_theta()}, p));
      return;
    default:
      outer = field.value(owner.outer, p);
      hollow = -1e9;
  }
}

double length_of(const field::Field& field, const std::vector<Owner>& owners, const Vec3& p) {
  double solid = -1e9, earlier = -1e9;
  for (const Owner& owner : owners) {
    double outer, hollow;
    lengths_of(field, owner, p, outer, hollow);
    solid = std::max(solid, std::min({outer, -hollow, -earlier}));
    earlier = std::max(earlier, outer);
  }
  return solid;
}

/// Drops owners that are out of reach all over a ball.
void keep_near(const field::Field& field, const Vec3& centre, double radius, std::vector<Owner>& owners) {
  std::erase_if(owners, [&](const Owner& owner) {
    double outer, hollow;
    lengths_of(field, owner, centre, outer, hollow);
    return outer < -kSteepest * radius;
  });
}

/// Origins of all leaves that come near a cell, once each.
std::vector<openvdb::Coord> candidate_leaves(const trace::CellSet& cells, double voxel_mm) {
  std::vector<openvdb::Coord> origins;
  const double reach = (kBand + 1.0) * voxel_mm, leaf_mm = kLeaf * voxel_mm;
  for (std::size_t c = 0; c < cells.size(); ++c) {
    const trace::Cell& cell = cells.cell(c);
    std::array<int, 3> low{}, high{};
    for (std::size_t i = 0; i < 3; ++i) {
      const double centre = static_cast<double>(cell.centre[i]), half = static_cast<double>(cell.half) + reach;
      low[i] = static_cast<int>(std::floor((centre - half) / leaf_mm));
      high[i] = static_cast<int>(std::floor((centre + half) / leaf_mm));
    }
    for (int x = low[0]; x <= high[0]; ++x)
      for (int y = low[1]; y <= high[1]; ++y)
        for (int z = low[2]; z <= high[2]; ++z) origins.emplace_back(x * kLeaf, y * kLeaf, z * kLeaf);
  }
  std::sort(origins.begin(), origins.end());
  origins.erase(std::unique(origins.begin(), origins.end()), origins.end());
  return origins;
}

/// The leaf's narrow band; null where it has none.
std::unique_ptr<Leaf> sampled_leaf(const field::Field& field, const openvdb::Coord& origin, double voxel_mm,
                                   std::atomic<std::size_t>& sampled) {
  const auto place = [&](double i, double j, double k) {
    return Vec3(origin.x() + i, origin.y() + j, origin.z() + k) * voxel_mm;
  };
  const double band = kBand * voxel_mm, root3 = std::sqrt(3.0);
  const Vec3 middle = place(0.5 * (kLeaf - 1), 0.5 * (kLeaf - 1), 0.5 * (kLeaf - 1));
  thread_local std::vector<Owner> owners;
  owners_at(field, std::atan2(middle.y, middle.x), owners);
  const double leaf_radius = 0.5 * (kLeaf - 1) * root3 * voxel_mm;
  // Near the axis the passage of a place hangs on its own azimuth: the field must choose it anew for each.
  const bool round_axis = std::hypot(middle.x, middle.y) < 3.0 * leaf_radius;
  if (!round_axis) keep_near(field, middle, leaf_radius + band, owners);
  const auto value = [&](const Vec3& p) { return round_axis ? solid_length(field, p) : length_of(field, owners, p); };
  const float background = static_cast<float>(band);
  std::unique_ptr<Leaf> leaf;
  std::size_t count = 0;
  for (int bi = 0; bi < kLeaf; bi += kBlock)
    for (int bj = 0; bj < kLeaf; bj += kBlock)
      for (int bk = 0; bk < kLeaf; bk += kBlock) {
        const double mid = 0.5 * (kBlock - 1);
        const double there = value(place(bi + mid, bj + mid, bk + mid));
        ++count;
        if (std::abs(there) > kSteepest * (mid * root3 * voxel_mm + band)) continue;
        for (int i = bi; i < bi + kBlock; ++i)
          for (int j = bj; j < bj + kBlock; ++j)
            for (int k = bk; k < bk + kBlock; ++k) {
              const double length = value(place(i, j, k));
              ++count;
              if (std::abs(length) >= band) continue;
              if (!leaf) leaf = std::make_unique<Leaf>(origin, background, false);
              leaf->setValueOn(openvdb::Coord(origin.x() + i, origin.y() + j, origin.z() + k), static_cast<float>(-length));
            }
      }
  sampled += count;
  return leaf;
}

}  // namespace

double solid_length(const field::Field& field, const Vec3& p) noexcept {
  thread_local std::vector<Owner> owners;
  owners_at(field, std::atan2(p.y, p.x), owners);
  return length_of(field, owners, p);
}

Mesh mesh_solid(const field::Field& field, const trace::CellSet& cells, double voxel_mm) {
  openvdb::initialize();
  const Stopwatch watch;
  const std::vector<openvdb::Coord> origins = candidate_leaves(cells, voxel_mm);
  std::vector<std::unique_ptr<Leaf>> leaves(origins.size());
  std::atomic<std::size_t> sampled{0};
  parallel_for(origins.size(), 64, [&](std::size_t i) { leaves[i] = sampled_leaf(field, origins[i], voxel_mm, sampled); });

  const float background = static_cast<float>(kBand * voxel_mm);
  auto grid = openvdb::FloatGrid::create(background);
  grid->setGridClass(openvdb::GRID_LEVEL_SET);
  for (std::unique_ptr<Leaf>& leaf : leaves)
    if (leaf) grid->tree().addLeaf(leaf.release());
  openvdb::tools::signedFloodFill(grid->tree());

  std::vector<openvdb::Vec3s> points;
  std::vector<openvdb::Vec3I> triangles;
  std::vector<openvdb::Vec4I> quads;
  openvdb::tools::volumeToMesh(*grid, points, triangles, quads, 0.0, 0.0);

  Mesh mesh;
  mesh.points.reserve(points.size());
  const float scale = static_cast<float>(voxel_mm);
  for (const openvdb::Vec3s& p : points) mesh.points.emplace_back(p.x() * scale, p.y() * scale, p.z() * scale);
  mesh.triangles.reserve(3 * triangles.size() + 6 * quads.size());
  for (const openvdb::Vec3I& t : triangles) mesh.triangles.insert(mesh.triangles.end(), {t[0], t[1], t[2]});
  for (const openvdb::Vec4I& q : quads) mesh.triangles.insert(mesh.triangles.end(), {q[0], q[1], q[2], q[0], q[2], q[3]});
  mesh.seconds = watch.seconds();
  mesh.sampled_voxels = sampled;
  return mesh;
}

}  // namespace whorl::bench
