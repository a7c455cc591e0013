// SPDX-License-Identifier: Apache-2.0
// How long a fit takes: one specimen with ten measurements.
#pragma once

#include <nlohmann/json.hpp>

#include <string>

namespace whorl::bench {

/// The best of `rounds`, of the fit alone and with its answer measured back on the solid, as `whorlwright fit` does.
nlohmann::ordered_json time_fit(int rounds);
std::string fit_text(const nlohmann::ordered_json& timed);

}  // namespace whorl::bench
