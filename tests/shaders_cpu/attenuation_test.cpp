// SPDX-License-Identifier: Apache-2.0
// X-ray attenuation of shell against the check values made from the tables of Hubbell & Seltzer 1995, NISTIR 5632.
#include "shaders_cpu/medium/attenuation.h"
#include "specimen/specimen.h"
#include "support/catch.h"
#include "support/table.h"

#include <cmath>

using namespace whorl;
using namespace whorl::shaders_cpu;

namespace {

double energy_of(const std::vector<std::string>& row) { return std::stod(row[2].substr(2)); }  // "E=20 keV; .."

}  // namespace

TEST_CASE("Mass and linear attenuation and the transmission of a plate of 1 mm are those published, at ten energies", "[shaders]") {
  int seen = 0;
  for (const auto& row : test::read_table("check_values_radiograph.csv")) {
    const double energy = energy_of(row), wanted = std::stod(row[3]), tolerance = std::stod(row[5]);
    const double per_mm = carbonate_attenuation_per_mm(energy, specimen::mineral_density(specimen::Mineral::kAragonite));
    CAPTURE(row[0]);
    if (row[0].starts_with("C33")) CHECK(carbonate_mass_attenuation(energy) == Approx(wanted).margin(tolerance));
    if (row[0].starts_with("C34")) CHECK(10.0 * per_mm == Approx(wanted).margin(tolerance));
    if (row[0].starts_with("C35")) CHECK(std::exp(-per_mm * 1.0) == Approx(wanted).margin(tolerance));
    ++seen;
  }
  CHECK(seen == 30);
}

TEST_CASE("Between the tabulated energies attenuation falls steadily", "[shaders]") {
  double before = carbonate_mass_attenuation(10.0);
  for (double energy = 10.5; energy <= 150.0; energy += 0.5) {
    const double now = carbonate_mass_attenuation(energy);
    CHECK(now < before);
    before = now;
  }
}
