// SPDX-License-Identifier: Apache-2.0
// The one place where toml++ comes in, and how its values are put into words.
#pragma once

#include "diagnostics/position.h"

#include <optional>
#include <string>
#include <string_view>

// What a file holds may never end the program: toml++ goes on to report properly what its assertions are about.
#define TOML_ASSERT(condition) static_cast<void>(0)
#include <toml++/toml.h>

namespace whorl::specimen {

diagnostics::Position position_of(const toml::node& node);
diagnostics::Position position_of(const toml::key& key);

/// Text from the file as it may stand in a message: control characters as \xNN, cut off after `most` characters.
std::string shown(std::string_view text, std::size_t most = 60);
/// A value as it may stand after "key = ": `-0.3`, `"text"`, `[ .. ]`.
std::string shown_value(const toml::node& node);
/// Whole and decimal numbers, nothing else.
std::optional<double> number_of(const toml::node& node);
/// What kind of value it is, with its article: "a text in quotes", "a list".
std::string_view kind_of(const toml::node& node);

}  // namespace whorl::specimen
