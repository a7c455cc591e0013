// SPDX-License-Identifier: Apache-2.0
// Walks the tables of a scene file and fills the specimen.
#pragma once

#include "specimen/problem_list.h"
#include "specimen/specimen.h"
#include "specimen/table_reader.h"
#include "specimen/toml_door.h"

#include <vector>

namespace whorl::specimen {

class SceneReader {
 public:
  SceneReader(const toml::table& root, ProblemList& problems) : root_(root), problems_(problems) {}

  /// Complains of a format that is not 1; a newer one may have other keys, so that nothing else is worth saying then.
  void check_format();
  /// Everything but the rules between keys. Of no use if it left problems.
  Specimen read();

 private:
  /// A table of the file, or of another table; complains where there is something else of that name.
  TableReader table(std::string_view name);
  /// The tables of a list in double brackets.
  std::vector<TableReader> list(std::string_view name, const toml::table* parent);
  Growth read_growth();
  Section read_section();
  Size read_size();
  Wall read_wall();
  Lip read_lip(const Wall& wall);
  Look read_look(const Lip& lip);
  Nacre read_nacre();
  Translucence read_translucence();
  std::vector<Preserved> read_preserved();
  Colouring read_colouring();
  Sculpture read_sculpture();
  Attachments read_attachments();
  Light read_light();
  std::vector<Lamp> read_lamps();
  Radiograph read_radiograph();
  Stereo read_stereo();
  ContactSheet read_contact_sheet();
  Plate read_plate();
  std::vector<Panel> read_panels();
  Panel read_panel(const TableReader& table);

  const toml::table& root_;
  ProblemList& problems_;
};

}  // namespace whorl::specimen
