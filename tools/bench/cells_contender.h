// SPDX-License-Identifier: Apache-2.0
// The product's own solid as a contender: cells, or the functions themselves.
#pragma once

#include "contender.h"
#include "trace/embree_solid.h"

namespace whorl::bench {

class CellsContender final : public Contender {
 public:
  CellsContender(const field::Field& field, const trace::SolidOptions& options) : solid_(field, options) {
    elements = solid_.cells().size();
    build_seconds = solid_.cell_seconds();
    hierarchy_seconds = solid_.hierarchy_seconds();
    bytes = solid_.cells().bytes() + solid_.hierarchy_bytes();
  }
  const trace::EmbreeSolid& solid() const { return solid_; }

  bool closest(const trace::Ray& ray, Found& found) const override {
    trace::Hit hit;
    if (!solid_.closest(ray, hit)) return false;
    found = {hit.t, hit.normal};
    return true;
  }
  bool occluded(const trace::Ray& ray) const override { return solid_.occluded(ray); }

 private:
  trace::EmbreeSolid solid_;
};

}  // namespace whorl::bench
