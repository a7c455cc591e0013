// SPDX-License-Identifier: Apache-2.0
// Values of options that are more than a number.
#include "app/option_values.h"

namespace whorl::app {

std::function<std::string(const std::string&)> non_empty(const std::string& wanted) {
  return [wanted](const std::string& text) {
    if (text.empty()) throw BadValue(fmt::format("is empty; {} belongs here", wanted));
    return text;
  };
}

specimen::Quality quality_named(const std::string& text) {
  if (text == "draft") return specimen::Quality::kDraft;
  if (text == "proof") return specimen::Quality::kProof;
  if (text == "print") return specimen::Quality::kPrint;
  throw BadValue(fmt::format("'{}' is no quality; there are draft, proof and print", text));
}

Slice slice_of_job(const std::string& text) {
  constexpr int kMostSlices = 1'000'000;
  const std::size_t bar = text.find('/');
  try {
    if (bar == std::string::npos) throw BadValue("");
    const int of = whole_number_between<int>(1, kMostSlices)(text.substr(bar + 1));
    return {whole_number_between<int>(1, of)(text.substr(0, bar)), of};
  } catch (const BadValue&) {
    throw BadValue(fmt::format("'{}' is no slice; write I/N with 1 <= I <= N, such as 1/4", text));
  }
}

}  // namespace whorl::app
