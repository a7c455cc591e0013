// SPDX-License-Identifier: Apache-2.0
// The rival's geometry: the same solid as triangles.
#pragma once

#include "field/field.h"
#include "trace/cells.h"

#include <cstdint>
#include <vector>

namespace whorl::bench {

struct Mesh {
  std::vector<Vec3f> points;             // mm
  std::vector<std::uint32_t> triangles;  // three indices each
  double seconds = 0.0;                  // sampling and meshing
  std::size_t sampled_voxels = 0;
};

/// Signed length of the solid, positive inside: the growth order (design: field, section 3) as minima and maxima.
double solid_length(const field::Field& field, const Vec3& p) noexcept;

/// Samples the solid on a grid of `voxel_mm`, in a band about its surface, and meshes the level set with OpenVDB.
/// `cells` say where the surface can be; they only spare time.
Mesh mesh_solid(const field::Field& field, const trace::CellSet& cells, double voxel_mm);

}  // namespace whorl::bench
