// SPDX-License-Identifier: Apache-2.0
// Embree's own triangles, with the settings that suit them best.
#pragma once

#include "contender.h"
#include "solid_mesh.h"

#include <memory>

namespace whorl::bench {

class TrianglesContender final : public Contender {
 public:
  explicit TrianglesContender(Mesh mesh);
  ~TrianglesContender() override;

  bool closest(const trace::Ray& ray, Found& found) const override;
  bool occluded(const trace::Ray& ray) const override;

 private:
  struct Impl;
  std::unique_ptr<Impl> impl_;
};

}  // namespace whorl::bench
