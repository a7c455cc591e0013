// SPDX-License-Identifier: Apache-2.0
// What is raced: a solid that rays can hit, with what it took to build.
#pragma once

#include "trace/surfaces.h"

#include <cstddef>
#include <string>

namespace whorl::bench {

/// A hit as both sides can state it.
struct Found {
  float t = 0.0f;
  Vec3f normal;  // unit, towards the ray's origin
};

class Contender {
 public:
  virtual ~Contender() = default;
  virtual bool closest(const trace::Ray& ray, Found& found) const = 0;
  virtual bool occluded(const trace::Ray& ray) const = 0;

  std::string name;
  std::size_t elements = 0;        // cells or triangles
  double build_seconds = 0.0;      // to cells or triangles, from the field
  double hierarchy_seconds = 0.0;
  std::size_t bytes = 0;           // elements and hierarchy; 0 where it has none of its own
  std::size_t every = 1;           // it gets every n-th block of rays, where it is slow
};

}  // namespace whorl::bench
