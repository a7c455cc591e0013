// SPDX-License-Identifier: Apache-2.0
// The command 'fit' as a user runs it: from measurements to a scene that 'check' accepts, and its exit codes.
#include "fit/report.h"
#include "specimen/measurement_file.h"
#include "specimen/scene_file.h"
#include "support/catch.h"
#include "support/program.h"

#include <nlohmann/json.hpp>

#include <cmath>
#include <filesystem>

using namespace whorl;
using namespace whorl::support;
namespace fs = std::filesystem;

namespace {

const std::string kMeasured = std::string(WHORL_SCENE_DIR) + "/measured/";
const std::string kHead = "format = 1\nstep = 0.1\n[specimen]\nname = \"x\"\ncoiling = \"dextral\"\n";

bool contains(const std::string& text, const std::string& part) { return text.find(part) != std::string::npos; }

std::string length(const std::string& quantity, const std::string& definition, double value) {
  return "[[measurement]]\nquantity = \"" + quantity + "\"\ndefinition = \"" + definition + "\"\nvalue = " + std::to_string(value) + "\n";
}

}  // namespace

TEST_CASE("a broken shell is fitted, written as a scene, and measures on its solid what was read", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string scene = (folder.path() / "out" / "broken.toml").string();
  const Ran ran = run_program({"fit", kMeasured + "morwenia_broken.toml", "-o", scene, "--quiet"});
  REQUIRE(ran.code == 0);
  CHECK(contains(ran.out, "Morwenia fracta: fits\n"));
  CHECK(contains(ran.out, "would be fixed by whorls nucleus_line"));
  // The invented shell has W 1.38, D 0.03, T 3.6, S 1.25; its readings were rounded to 0.1 mm.
  const specimen::Specimen written = specimen::read_scene_file(scene);
  CHECK(written.growth.W.value.at(0).W == Approx(1.38).margin(0.005));
  CHECK(written.growth.D == Approx(0.03).margin(0.005));
  CHECK(written.growth.T == Approx(3.6).margin(0.05));
  CHECK(written.section.S == Approx(1.25).margin(0.02));
  CHECK(written.identity.name.value == "Morwenia fracta");
  CHECK(written.wall.thickness_mm == Approx(0.3));
  CHECK(contains(read_file(scene), "# assumed, so that the first whorl"));
  CHECK(contains(read_file(scene), "never a name-bearing type"));
  const auto report = nlohmann::json::parse(read_file(folder.path() / "out" / "broken.fit.json"));
  CHECK(report.at("verdict") == "fits");
  CHECK(report.at("correlation").at("matrix").size() == 5);
  for (const auto& row : report.at("measurements")) {
    CAPTURE(row.dump());
    CHECK(std::abs(row.at("residual").get<double>()) <= row.at("step").get<double>());
    if (row.contains("on_solid")) CHECK(row.at("on_solid").get<double>() == Approx(row.at("predicted").get<double>()).epsilon(0.001));
  }
  CHECK(run_program({"check", scene}).code == 0);
}

TEST_CASE("an internal mould is fitted, and the scene's lumen measures on its solid what was read on the mould", "[end_to_end][mould]") {
  const ScratchFolder folder;
  const std::string scene = (folder.path() / "shell.toml").string();
  const Ran ran = run_program({"fit", kMeasured + "helicorna_mould.toml", "-o", scene, "--quiet"});
  REQUIRE(ran.code == 0);
  CHECK(contains(ran.out, "Helicorna nucleata (internal mould): fits\n"));
  CHECK(contains(ran.out, "inside, whorls 2.00 to 0.00 counted from the lip"));
  const auto report = nlohmann::json::parse(read_file(folder.path() / "shell.fit.json"));
  CHECK(report.at("measured") == "internal mould");
  int on_solid = 0;
  for (const auto& row : report.at("measurements")) {
    CAPTURE(row.dump());
    REQUIRE(row.contains("on_solid"));
    ++on_solid;
    CHECK(row.at("on_solid").get<double>() == Approx(row.at("read").get<double>()).margin(0.1));  // the caliper's step
  }
  CHECK(on_solid == 7);
  const specimen::Specimen written = specimen::read_scene_file(scene);
  CHECK(written.wall.thickness_mm == Approx(1.1));
  // Across the two venters the shell is wider than its mould by twice the wall along the surface's normal, a little more since that leans.
  CHECK(written.size.mm > 55.8 + 1.8);
  CHECK(written.size.mm < 55.8 + 2.4);
  CHECK(run_program({"check", scene}).code == 0);
}

TEST_CASE("measurements that do not fit end with 4, a report, and no scene", "[end_to_end]") {
  const ScratchFolder folder;
  const fs::path scene = folder.path() / "no.toml";
  const Ran record = run_program({"fit", kMeasured + "goniat_7026.toml", "-o", scene.string(), "--quiet", "--json"});
  CHECK(record.code == 4);
  CHECK(contains(record.err, "error: GONIAT 7026: does not fit; no scene was written"));
  CHECK(nlohmann::json::parse(record.out).at("success") == false);
  CHECK_FALSE(fs::exists(scene));

  // A shell wider than any with such a spire and aperture can be.
  const std::string wide = folder.with_file(
      "wide.toml", kHead + length("shell_height", "axial", 20.0) + length("aperture_height", "axial", 10.0) +
                       length("aperture_width", "across_axis", 4.0) + length("shell_width", "across_axis", 60.0) +
                       length("last_whorl_height", "flank", 13.0) + length("penultimate_whorl_width", "flank_to_flank", 9.0) +
                       "[[measurement]]\nquantity = \"whorls\"\ndefinition = \"nucleus_line\"\nvalue = 7\nstep = 0.25\n");
  const Ran too_wide = run_program({"fit", wide, "-o", scene.string(), "--quiet"});
  CHECK(too_wide.code == 4);
  CHECK(contains(too_wide.out, "misfit"));
  CHECK_FALSE(fs::exists(scene));
}

TEST_CASE("one measurement alone ends with 4 and says what to add", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string file = folder.with_file("one.toml", kHead + length("shell_height", "axial", 20.0));
  const Ran ran = run_program({"fit", file, "-o", (folder.path() / "no.toml").string(), "--quiet"});
  CHECK(ran.code == 4);
  CHECK(contains(ran.out, "One measurement alone fixes nothing but the size"));
  CHECK(contains(ran.out, "last_whorl_height flank"));
  CHECK_FALSE(fs::exists(folder.path() / "no.toml"));
}

TEST_CASE("two lengths do not fix the growth, and the report names what would", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string file =
      folder.with_file("two.toml", kHead + length("shell_height", "axial", 20.0) + length("shell_width", "across_axis", 14.0));
  const Ran ran = run_program({"fit", file, "--quiet"});
  CHECK(ran.code == 4);
  CHECK(contains(ran.out, "not fixed by the measurements"));
  CHECK(contains(ran.out, "The readings do not fix the whorl expansion W; add "));
}

TEST_CASE("contradictions and faults of a measurement file end with 3", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string file = folder.with_file(
      "bad.toml", kHead + length("shell_height", "axial", 20.0) + length("aperture_height", "axial", 25.0) + length("SpH", "", 3.0));
  const Ran ran = run_program({"fit", file, "--quiet"});
  CHECK(ran.code == 3);
  CHECK(ran.out.empty());
  CHECK(contains(ran.err, "contradicts shell_height axial = 20 mm on line 6"));
  CHECK(contains(ran.err, "it may mean spire_height"));
  CHECK(run_program({"fit", (folder.path() / "none.toml").string()}).code == 6);
}

TEST_CASE("of many specimens each gets a row, the failures are told at the end, and the rest is written", "[end_to_end]") {
  const ScratchFolder folder;
  std::string table = "specimen,coiling,quantity,definition,value,unit,step\n";
  for (const char* name : {"KSM 1", "KSM 2"})
    for (const char* row : {"shell_height,axial,14.5", "shell_width,across_axis,15.5", "aperture_height,axial,9.4",
                            "aperture_width,across_axis,8.3", "last_whorl_height,flank,10.5", "penultimate_whorl_width,flank_to_flank,10.0"})
      table += std::string(name) + ",sinistral," + row + ",mm,0.1\n";
  table += "KSM 3,dextral,shell_height,axial,14.5,mm,0.1\n";
  const std::string file = folder.with_file("many.csv", table);
  const Ran ran = run_program({"fit", file, "-o", (folder.path() / "fitted").string(), "--quiet"});
  CHECK(ran.code == 4);
  CHECK(contains(ran.out, "specimen,verdict,radius,radius_error,radius_origin,"));
  CHECK(contains(ran.out, "\nKSM 1,fits,"));
  CHECK(contains(ran.out, "\nKSM 2,fits,"));
  CHECK(contains(ran.out, "\nKSM 3,not fixed by the measurements,"));
  CHECK(contains(ran.err, "1 of 3 specimens were not fitted"));
  CHECK(specimen::read_scene_file((folder.path() / "fitted" / "KSM_1.toml").string()).identity.coiling.value == specimen::Coiling::kSinistral);
  CHECK(fs::exists(folder.path() / "fitted" / "KSM_2.fit.json"));
  CHECK_FALSE(fs::exists(folder.path() / "fitted" / "KSM_3.toml"));
}

TEST_CASE("an outline is read in pixels, points marked as missing left out, and its faults are told by line", "[end_to_end]") {
  const ScratchFolder folder;
  const std::string head = "format = 1\n[specimen]\nname = \"x\"\ncoiling = \"dextral\"\n[[outline]]\nkind = \"section\"\nfile = \"ring.csv\"\n"
                           "scale = 0.01\ny_axis = \"down\"\nerror = 0.02\n";
  const std::string file = folder.with_file("ring.toml", head);
  std::string points = "x,y,missing\n";
  for (int i = 0; i < 40; ++i) {
    const double angle = 0.157079632679 * i;
    points += std::to_string(900.0 + 300.0 * std::cos(angle)) + "," + std::to_string(400.0 + 450.0 * std::sin(angle)) +
              (i % 4 == 0 ? ",yes\n" : ",\n");
  }
  folder.with_file("ring.csv", points);
  const specimen::MeasurementFile read = specimen::read_measurement_file(file);
  const auto& outline = read.specimens.at(0).outlines.at(0);
  REQUIRE(outline.points.size() == 30);
  CHECK(outline.points[0].x == Approx(9.0 + 3.0 * std::cos(0.157079632679)));
  CHECK(outline.points[0].y == Approx(-4.0 - 4.5 * std::sin(0.157079632679)));
  // The section alone gives its shape and size, not the growth.
  const Ran ran = run_program({"fit", file, "--quiet"});
  CHECK(ran.code == 4);
  CHECK(contains(ran.out, "30 of 30 points on it"));
  CHECK(contains(ran.out, "\n  S                     1.5000 "));

  folder.with_file("ring.csv", "x,y\n1,2\n3;4\n");
  CHECK(contains(run_program({"fit", file}).err, "ring.toml:7:8: [[outline]] file = \"ring.csv\", line 3: \"3;4\" is no point"));
  std::filesystem::remove(folder.path() / "ring.csv");
  CHECK(run_program({"fit", file}).code == 6);
}
