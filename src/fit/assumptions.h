// SPDX-License-Identifier: Apache-2.0
// Which parameters a fit leaves free, and at what the others stand.
#pragma once

#include "fit/fit.h"

namespace whorl::fit {

/// A task under way, with the reason why each parameter that is not free stands where it does.
struct Setting {
  Task task;
  Trial trial;
  std::array<State, kParameterCount> state{};
  std::array<std::string, kParameterCount> why;
  double least_whorls = 1.0;  // that the stages of the readings ask for
  std::vector<std::string> remarks;
};

/// Stated values held, the planispiral form recognised, everything else free; series of which only ratios count get a scale.
Setting first_setting(const specimen::MeasuredSpecimen& measured);

/// Holds one parameter at what is usual. False where it is one that a shell cannot do without (size, W).
void assume(Setting& setting, Parameter parameter);

/// The parameter to give up so that a direction becomes known; empty where the direction is that of size and expansion, without
/// which there is no shell.
std::optional<Parameter> to_give_up(const Knowledge& knowledge);

/// Turns that bring the first whorl of the tube down to a hundredth of the last.
double closing_whorls(const Setting& setting);

}  // namespace whorl::fit
