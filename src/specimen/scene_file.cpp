// SPDX-License-Identifier: Apache-2.0
// From the text of a scene file to typed values; gathers every fault on the way.
#include "specimen/scene_file.h"

#include "specimen/scene_bytes.h"
#include "specimen/scene_reader.h"
#include "specimen/scene_rules.h"

#include <fmt/format.h>

#include <utility>

namespace whorl::specimen {
namespace {

constexpr std::size_t kLongestReason = 300;  // characters

toml::table parse_toml(const std::string& text, const std::string& source) {
  ProblemList problems;
  try {
    return toml::parse(std::string_view(text));
  } catch (const toml::parse_error& error) {
    const toml::source_position at = error.source().begin;
    problems.add({at.line, at.column}, fmt::format("this is not TOML: {}", shown(error.description(), kLongestReason)));
  }
  problems.throw_if_any(source);
  return {};
}

}  // namespace

Specimen parse_scene(std::string text, std::string source_name) {
  ProblemList problems;
  check_bytes(text, problems);
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
