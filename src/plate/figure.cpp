// SPDX-License-Identifier: Apache-2.0
// Calls composer and writers one after another.
#include "plate/figure.h"

#include "diagnostics/whole_file.h"
#include "plate/caption.h"
#include "plate/compose.h"
#include "plate/image_exr.h"
#include "plate/image_png.h"
#include "plate/image_tiff.h"

namespace whorl::plate {

std::string figure_stem(const std::string& source) {
  const std::string stem = std::filesystem::path(source).stem().string();
  return stem.empty() || source == "-" ? "figure" : stem;
}

std::vector<std::filesystem::path> write_figure(const FigurePlan& plan, const specimen::Specimen& specimen,
                                                const std::vector<transport::Film>& films, const RunFacts& run,
                                                const std::filesystem::path& folder, const std::string& stem) {
  PictureTags tags;
  tags.resolution_ppi = plan.resolution_ppi;
  tags.title = specimen.identity.name;
  tags.description = make_alt_text(plan, specimen, run);
  tags.copyright = specimen.identity.licence;
  tags.software = "Whorlwright " + run.version;

  std::vector<std::filesystem::path> files;
  for (const char* extension : {".png", ".tif", ".exr", ".txt", ".json"}) files.push_back(folder / (stem + extension));
  const Picture picture = compose(plan, films, specimen.plate.background);
  write_png(files[0], picture, tags);
  write_tiff(files[1], picture, tags);
  write_exr(files[2], plan, films, tags);
  diagnostics::write_whole_file(files[3], make_words_file(plan, specimen, run));
  const nlohmann::ordered_json record = make_record(plan, specimen, films, run);
  // A file name need not be UTF-8; a record must.
  diagnostics::write_whole_file(files[4], record.dump(2, ' ', false, nlohmann::ordered_json::error_handler_t::replace) + "\n");
  return files;
}

}  // namespace whorl::plate
