// SPDX-License-Identifier: Apache-2.0
// The table [specimen].
#include "specimen/identity_reader.h"

namespace whorl::specimen {

Identity read_identity(const TableReader& table) {
  Identity identity;
  identity.name = table.text("name");
  identity.coiling = table.word<Coiling>("coiling");
  identity.catalogue = table.text("catalogue");
  identity.author = table.text("author");
  identity.locality = table.text("locality");
  identity.note = table.text("note");
  identity.licence = table.text("licence");
  identity.mineral = table.word<Mineral>("mineral");
  return identity;
}

}  // namespace whorl::specimen
