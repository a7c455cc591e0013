// SPDX-License-Identifier: Apache-2.0
// The shapes of the benchmark: demo scenes, compiled.
#pragma once

#include "field/field.h"
#include "scene/scene.h"
#include "specimen/specimen.h"

#include <memory>
#include <string>
#include <vector>

namespace whorl::bench {

struct Shape {
  std::string name;   // "tall, with columella"
  specimen::Specimen specimen;
  std::unique_ptr<scene::Scene> scene;
  std::unique_ptr<field::Field> field;
  double seconds = 0.0;  // from the scene's text to the field

  double half_breadth_mm() const { return scene->law.half_breadth; }  // of the aperture: the unit of lengths in the tables
  double height_mm() const { return scene->height_mm; }
};

/// File names of the demo scenes, without extension, and what they stand for.
struct ShapeName {
  const char *file, *meaning;
};
inline constexpr ShapeName kShapes[] = {
    {"tall", "tall, with a columella"}, {"globose", "globose, open umbilicus"}, {"planispiral", "planispiral"}};

Shape load_shape(const ShapeName& name);

}  // namespace whorl::bench
