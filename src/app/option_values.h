// SPDX-License-Identifier: Apache-2.0
// The text of an option's value -> the value, or what is wrong with it.
#pragma once

#include "app/options.h"

#include <charconv>
#include <fmt/format.h>
#include <functional>
#include <stdexcept>
#include <string>

namespace whorl::app {

/// Says what was found and what is allowed; who catches it adds the option's name.
class BadValue : public std::runtime_error {
 public:
  using std::runtime_error::runtime_error;
};

/// Reader of a decimal whole number in [least, most]; throws BadValue.
template <class Number>
std::function<Number(const std::string&)> whole_number_between(Number least, Number most) {
  return [least, most](const std::string& text) {
    Number number{};
    const char* end = text.data() + text.size();
    const auto [stop, fault] = std::from_chars(text.data(), end, number);
    if (fault != std::errc() || stop != end || number < least || number > most) {
      throw BadValue(fmt::format("'{}' is no whole number from {} to {}", text, least, most));
    }
    return number;
  };
}

/// Reader that takes any text but the empty one; `wanted` says what belongs there.
std::function<std::string(const std::string&)> non_empty(const std::string& wanted);

/// "draft", "proof" or "print"; throws BadValue.
specimen::Quality quality_named(const std::string& text);

/// "I/N" with 1 <= I <= N <= 1000000; throws BadValue.
Slice slice_of_job(const std::string& text);

}  // namespace whorl::app
