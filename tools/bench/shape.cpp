// SPDX-License-Identifier: Apache-2.0
// Reads and compiles a demo scene.
#include "shape.h"

#include "compile/compile.h"
#include "specimen/scene_file.h"
#include "stopwatch.h"

namespace whorl::bench {

Shape load_shape(const ShapeName& name) {
  Shape shape;
  shape.name = name.meaning;
  const Stopwatch watch;
  shape.specimen = specimen::read_scene_file(std::string(WHORL_SCENE_DIR) + "/" + name.file + ".toml");
  shape.scene = std::make_unique<scene::Scene>(compile::compile_scene(shape.specimen));
  shape.field = std::make_unique<field::Field>(*shape.scene);
  shape.seconds = watch.seconds();
  return shape;
}

}  // namespace whorl::bench
