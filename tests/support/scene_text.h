// SPDX-License-Identifier: Apache-2.0
// A sound scene whose lines tests exchange, and ways to ask what the reader says of the result.
#pragma once

#include "diagnostics/error.h"

#include <map>
#include <string>
#include <utility>
#include <vector>

namespace whorl::support {

/// A scene as TOML values by table and key; the values are TOML text. Tables in lists stand once.
class SceneText {
 public:
  /// Only what is required.
  SceneText();
  /// Every key of the table of keys, at values other than the defaults.
  static SceneText with_every_key();

  SceneText& set(const std::string& table, const std::string& key, const std::string& value);
  SceneText& drop(const std::string& table, const std::string& key);
  std::string text() const;

 private:
  std::map<std::string, std::vector<std::pair<std::string, std::string>>> tables_;
};

/// What the reader says: all messages, each with its line and column, or "" where it accepts.
std::string complaint_about(const std::string& text);
inline std::string complaint_about(const SceneText& scene) { return complaint_about(scene.text()); }
std::vector<diagnostics::Problem> problems_of(const std::string& text);

}  // namespace whorl::support
