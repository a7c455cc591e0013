// SPDX-License-Identifier: Apache-2.0
// From the text of a scene file to typed values; gathers every fault on the way.
#include "specimen/scene_file.h"

#include "specimen/scene_bytes.h"
#include "specimen/scene_reader.h"
#include "specimen/scene_rules.h"
#include "specimen/toml_guard.h"
#include "specimen/toml_text.h"

#include <utility>

namespace whorl::specimen {
Specimen parse_scene(std::string text, std::string source_name) {
  ProblemList problems;
  check_bytes(text, problems);
  if (problems.empty()) guard_toml(text, problems);
  problems.throw_if_any(source_name);
  const toml::table root = parse_toml(text, source_name);
  SceneReader reader(root, problems);
  reader.check_format();
  problems.throw_if_any(source_name);
  Specimen specimen = reader.read();
  check_rules(specimen, problems);
  problems.throw_if_any(source_name);
  specimen.source = std::move(source_name);
  specimen.text = std::move(text);
  return specimen;
}

Specimen read_scene_file(const std::string& path) { return parse_scene(fetch_bytes(path), path); }

}  // namespace whorl::specimen
