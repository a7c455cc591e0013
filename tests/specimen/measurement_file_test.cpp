// SPDX-License-Identifier: Apache-2.0
// Measurement files: what is read, and what is said about faulty ones.
#include "diagnostics/error.h"
#include "specimen/measurement_file.h"
#include "support/catch.h"

#include <cmath>

using namespace whorl::specimen;

namespace {

const std::string kHead = "format = 1\nstep = 0.1\n[specimen]\nname = \"x\"\ncoiling = \"dextral\"\n";

std::string measurement(const std::string& quantity, const std::string& definition, const std::string& value,
                        const std::string& more = "") {
  return "[[measurement]]\nquantity = \"" + quantity + "\"\n" +
         (definition.empty() ? "" : "definition = \"" + definition + "\"\n") + "value = " + value + "\n" + more;
}

std::string fault(const std::string& text, const std::string& name = "m.toml") {
  try {
    parse_measurements(text, name);
  } catch (const whorl::diagnostics::InvalidInput& error) {
    return error.what();
  }
  return "no fault";
}

bool says(const std::string& text, const std::string& words) {
  INFO(text);
  const bool found = text.find(words) != std::string::npos;
  CHECK(found);
  return found;
}

}  // namespace

TEST_CASE("a measurement is read with its definition, stage and error, lengths in millimetres", "[specimen]") {
  const auto file = parse_measurements("format = 1\nunit = \"cm\"\n[specimen]\nname = \"x\"\ncoiling = \"sinistral\"\n" +
                                           measurement("whorl_width", "flank_to_flank", "1.5", "step = 0.01\nbehind_lip = 2\n") +
                                           measurement("dm", "sum_of_radii", "3", "error = 0.02\n"),
                                       "m.toml");
  const MeasuredSpecimen& s = file.specimens.at(0);
  CHECK(s.identity.coiling.value == Coiling::kSinistral);
  REQUIRE(s.readings.size() == 2);
  CHECK(s.readings[0].definition == Definition::kWhorlWidthFlanks);
  CHECK(s.readings[0].value == Approx(15.0));
  CHECK(s.readings[0].step == Approx(0.1));
  CHECK(s.readings[0].standard_error == Approx(0.1 / std::sqrt(12.0)));
  CHECK(s.readings[0].stage.kind == GrowthStage::Kind::kBehindLip);
  CHECK(s.readings[1].definition == Definition::kDiameterSumOfRadii);  // an abbreviation, with its definition
  CHECK(s.readings[1].standard_error == Approx(0.2));
}

TEST_CASE("a bracketed diameter gives its stage to the other planispiral measures", "[specimen]") {
  // The form in which a diameter is printed where the shell is larger than the place that was measured.
  const auto file = parse_measurements(kHead + measurement("D", "sum_of_radii", "\"85 (63)\"") +
                                           measurement("H", "margin_to_venter", "26") +
                                           measurement("T", "along_axis", "22", "at_diameter = 60\n"),
                                       "m.toml");
  const auto& readings = file.specimens.at(0).readings;
  CHECK(readings[0].value == 85.0);
  CHECK(readings[0].stage.kind == GrowthStage::Kind::kLip);
  CHECK(readings[1].stage.kind == GrowthStage::Kind::kAtDiameter);
  CHECK(readings[1].stage.value == 63.0);
  CHECK(readings[2].stage.value == 60.0);
}

TEST_CASE("a series is ordered from the apex, its stages counted from the lip", "[specimen]") {
  const auto file = parse_measurements(kHead + "[[series]]\nquantity = \"whorl_width\"\ndefinition = \"proportional\"\n"
                                               "values = [8.0, 4.0, 2.0]\ninterval = \"half turns\"\norder = \"from the lip\"\n"
                                               "behind_lip = 1\n",
                                       "m.toml");
  const MeasuredSpecimen& s = file.specimens.at(0);
  CHECK(s.series.at(0).values == std::vector<double>{2.0, 4.0, 8.0});
  CHECK(s.series.at(0).turn == 0.5);
  CHECK(s.readings.at(0).stage.value == 2.0);
  CHECK(s.readings.at(2).stage.value == 1.0);
}

TEST_CASE("an abbreviation without a definition is refused with all that it may mean", "[specimen]") {
  const std::string said = fault(kHead + measurement("SpH", "", "3.04"));
  says(said, "m.toml:7:12: ");
  for (const char* words : {"spire_height \"less_aperture\"", "spire_height \"less_last_whorl\"", "spire_height \"direct\""})
    says(said, words);
  const std::string both = fault(kHead + measurement("D", "", "30"));
  says(both, "shell_width \"across_axis\"");
  says(both, "conch_diameter \"sum_of_radii\"");
  says(fault(kHead + measurement("aperture_height", "", "9")), "a quantity without a definition; it may mean");
}

TEST_CASE("all faults of a measurement file are told in one run, each with its place", "[specimen]") {
  const std::string said = fault(kHead + measurement("shell_hight", "axial", "20") + measurement("shell_height", "axil", "20") +
                                 measurement("whorls", "pole", "7") + measurement("shell_width", "across_axis", "1e5") +
                                 measurement("apical_angle", "early_whorls", "40", "behind_lip = 1\nstep = 1\n"));
  says(said, "did you mean \"shell_height\"?");
  says(said, "shell_height has no such definition");
  says(said, "how finely was it read?");
  says(said, "must be from 0.001 to 5000 mm");
  says(said, "is taken on the whole shell");
}

TEST_CASE("readings that contradict each other by their definitions are refused", "[specimen]") {
  says(fault(kHead + measurement("shell_height", "axial", "20") + measurement("aperture_height", "axial", "21")),
       "m.toml:10:1: aperture_height axial = 21 mm contradicts shell_height axial = 20 mm on line 6");
  says(fault(kHead + measurement("conch_diameter", "sum_of_radii", "20") + measurement("umbilicus", "margin_to_margin", "22")),
       "cannot be the larger");
  says(fault(kHead + measurement("shell_height", "axial", "20") + measurement("shell_height", "axial", "30")), "is stated twice");
}

TEST_CASE("a series in the wrong order is refused", "[specimen]") {
  const std::string series = "[[series]]\nquantity = \"whorl_width\"\ndefinition = \"proportional\"\ninterval = \"full turns\"\n";
  says(fault(kHead + series + "values = [8.0, 4.0, 2.0]\norder = \"from the apex\"\n"), "the other way round?");
  says(fault(kHead + series + "values = [2.0, 1.2, 4.0]\norder = \"from the apex\"\n"), "narrower than the whorl before it");
  says(fault(kHead + series + "values = [2.0, 4.0]\norder = \"from the apex\"\n"), "at least 3");
}

TEST_CASE("mixed units are refused, in both forms of the file", "[specimen]") {
  says(fault(kHead + measurement("shell_height", "axial", "2.0", "unit = \"cm\"\n")), "mixed units");
  says(fault("specimen,coiling,quantity,definition,value,unit,step\na,dextral,shell_height,axial,20,mm,0.1\n"
             "a,,shell_width,across_axis,0.5,in,0.1\n",
             "m.csv"),
       "m.csv:3:32: row: unit = \"in\": mixed units");
}

TEST_CASE("a table holds many specimens, whichever way its cells are quoted", "[specimen]") {
  const auto file = parse_measurements("# a remark\nspecimen,coiling,quantity,definition,value,step,behind_lip\r\n"
                                       "\"KSM 1, \"\"a\"\"\",dextral,shell_height,axial,20.5,0.1,\r\n"
                                       "KSM 2,sinistral,dm,sum_of_radii,\"85 (63)\",1,\n\n"
                                       "KSM 2,,wh,margin_to_venter,26,1,\n",
                                       "-");
  REQUIRE(file.specimens.size() == 2);
  CHECK(file.specimens[0].identity.name.value == "KSM 1, \"a\"");
  CHECK(file.specimens[1].identity.coiling.value == Coiling::kSinistral);
  CHECK(file.specimens[1].readings.at(1).stage.value == 63.0);
}

TEST_CASE("faults of a table are told by line and column", "[specimen]") {
  says(fault("specimen,coiling,quantity,definition,vlaue,step\n", "m.csv"), "m.csv:1:38: unknown column \"vlaue\"; did you mean \"value\"?");
  const std::string said = fault("specimen,coiling,quantity,definition,value,step\n"
                                 "a,left,shell_height,axial,20,0.1\nb,dextral,shell_height,axial,\"2,5\",0.1\n"
                                 "c,dextral,SpH,,4,0.1\nd,,shell_height,axial,4,0.1\n",
                                 "m.csv");
  says(said, "m.csv:2:3: coiling = \"left\": wanted is dextral or sinistral");
  says(said, "m.csv:3:30: value = \"2,5\"");
  says(said, "m.csv:4:11: row: quantity = \"SpH\": an abbreviation without a definition");
  says(said, "its first row must state coiling");
}

TEST_CASE("on an internal mould what needs the shell's own edge is refused, and the wall round it must be stated", "[specimen][mould]") {
  const std::string head = "format = 1\nstep = 0.1\nunit = \"cm\"\n[specimen]\nname = \"x\"\ncoiling = \"dextral\"\nmeasured = \"internal mould\"\n";
  const std::string wall = "[wall]\nthickness = 0.05\n";
  const auto file = parse_measurements(head + wall + measurement("dm", "sum_of_radii", "3"), "m.toml");
  REQUIRE(file.specimens.at(0).mould_wall);
  CHECK(*file.specimens[0].mould_wall == Approx(0.5));  // mm
  CHECK(file.specimens[0].mould);
  const std::string said = fault(head + wall + measurement("umbilicus", "seam_to_seam", "1") + measurement("wall_thickness", "wall", "0.1"));
  says(said, "m.toml:10:1: umbilicus seam_to_seam can't be read on an internal mould");
  says(said, "wall_thickness wall can't be read on an internal mould");
  says(fault(head + measurement("dm", "sum_of_radii", "3")), "m.toml:4:1: [wall] thickness is missing: an internal mould says nothing of its shell's wall");
  says(fault(kHead + wall + measurement("dm", "sum_of_radii", "3")), "m.toml:7:13: [wall] thickness is that of the shell round an internal mould");
}

TEST_CASE("a table may hold internal moulds beside shells, each with its wall in the specimen's unit", "[specimen][mould]") {
  const auto file = parse_measurements("specimen,coiling,measured,wall,quantity,definition,value,unit,step\n"
                                       "KSM 1,dextral,internal mould,0.08,dm,sum_of_radii,3,cm,0.01\n"
                                       "KSM 1,,,,wh,margin_to_venter,1.2,cm,0.01\n"
                                       "KSM 2,dextral,shell,,dm,sum_of_radii,30,mm,0.1\n",
                                       "m.csv");
  REQUIRE(file.specimens.size() == 2);
  CHECK(file.specimens[0].mould);
  REQUIRE(file.specimens[0].mould_wall);
  CHECK(*file.specimens[0].mould_wall == Approx(0.8));  // mm
  CHECK_FALSE(file.specimens[1].mould);
  const std::string said = fault("specimen,coiling,measured,wall,quantity,definition,value,step\na,dextral,mould,1,dm,sum_of_radii,30,0.1\n"
                                 "b,dextral,internal mould,,dm,sum_of_radii,30,0.1\n",
                                 "m.csv");
  says(said, "m.csv:2:11: measured = \"mould\": wanted is shell or internal mould");
  says(said, "m.csv:3:1: [wall] thickness is missing");
}

TEST_CASE("stretches that are preserved are read with their parts, and faulty ones refused", "[specimen][provenance]") {
  const auto file = parse_measurements(kHead + measurement("dm", "sum_of_radii", "30") +
                                           "[[preserved]]\nfrom = 2.5\nto = 0.5\ncounted = \"from the lip\"\nparts = \"outside\"\n[[preserved]]\nto = 1\n",
                                       "m.toml");
  const auto& preserved = file.specimens.at(0).preserved;
  REQUIRE(preserved.size() == 2);
  CHECK(*preserved[0].from == 2.5);
  CHECK(preserved[0].from_lip);
  CHECK(preserved[0].parts == PreservedParts::kOutside);
  CHECK_FALSE(preserved[1].from);
  says(fault(kHead + measurement("dm", "sum_of_radii", "30") + "[[preserved]]\nfrom = 1\nto = 2\ncounted = \"from the lip\"\n"),
       "m.toml:11:8: [[preserved]] from = 1: must be at least to = 2, since from lies nearer to the apex and whorls are counted from the lip");
}
