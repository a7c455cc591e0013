// SPDX-License-Identifier: Apache-2.0
// The specimen, table by table.
#include "specimen/scene_reader.h"

#include "specimen/identity_reader.h"
#include "specimen/preserved.h"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <limits>

namespace whorl::specimen {
namespace {

constexpr std::int64_t kFormat = 1;
constexpr diagnostics::Position kTop{1, 1};
// The embryonic shell, where the file does not say: three quarters of a whorl, and a quarter left to grow.
constexpr double kUsualStart = 0.75, kLeftToGrow = 0.25;

constexpr std::size_t kMostInList = 64;
constexpr std::array kUsualViews{ViewName::kApertural, ViewName::kAbapertural, ViewName::kRightLateral,
                                 ViewName::kApical,    ViewName::kUmbilical,   ViewName::kAxialSection};

/// "lobe" of "section.lobe".
std::string_view last_part(std::string_view name) {
  const std::size_t dot = name.rfind('.');
  return dot == std::string_view::npos ? name : name.substr(dot + 1);
}

}  // namespace

void SceneReader::check_format() {
  const toml::node* node = root_.get("format");
  if (node != nullptr && node->is_integer() && node->as_integer()->get() > kFormat) {
    problems_.add(position_of(*node),
                  fmt::format("format = {}: this program reads format {}; a newer program is needed for this file",
                              shown_value(*node), kFormat));
  }
}

TableReader SceneReader::table(std::string_view name) {
  const toml::node* node = root_.get(name);
  const toml::table* found = node != nullptr ? node->as_table() : nullptr;
  if (node != nullptr && found == nullptr) {
    problems_.add(position_of(*node),
                  fmt::format("\"{}\" is {}, wanted is a table: write {} in single brackets, its keys below", name,
                              kind_of(*node), written_table(name)));
  }
  const bool broken = node != nullptr && found == nullptr;
  TableReader reader(found, name, found != nullptr ? position_of(*found) : kTop, problems_, broken);
  reader.refuse_unknown_keys();
  return reader;
}

std::vector<TableReader> SceneReader::list(std::string_view name, const toml::table* parent) {
  std::vector<TableReader> readers;
  const toml::node* node = parent != nullptr ? parent->get(last_part(name)) : nullptr;
  if (node == nullptr) return readers;
  const toml::array* array = node->as_array();
  const auto refuse = [&](const toml::node& wrong) {
    problems_.add(position_of(wrong),
                  fmt::format("\"{}\" {} {}, wanted is a list of tables: write {} in double brackets, once for each",
                              name, array == nullptr ? "is" : "holds", kind_of(wrong), written_table(name)));
  };
  if (array == nullptr) {
    refuse(*node);
    return readers;
  }
  if (array->size() > kMostInList) {
    problems_.add(position_of(*node),
                  fmt::format("{} times {}; at most {} are allowed", array->size(), written_table(name), kMostInList));
    return readers;
  }
  for (const toml::node& element : *array) {
    if (const toml::table* found = element.as_table()) {
      readers.emplace_back(found, name, position_of(*found), problems_).refuse_unknown_keys();
    } else {
      refuse(element);
    }
  }
  return readers;
}

Growth SceneReader::read_growth() {
  const TableReader t = table("growth");
  Growth growth;
  growth.whorls = t.number("whorls");
  growth.W = t.stages("W");
  growth.D = t.number("D");
  growth.T = t.number("T");
  growth.start = t.number("start", std::min(kUsualStart, growth.whorls - kLeftToGrow));
  growth.W_distance = t.optional_stages("W_distance");
  growth.W_depth = t.optional_stages("W_depth");
  growth.W_section = t.optional_stages("W_section");
  return growth;
}

Section SceneReader::read_section() {
  const TableReader t = table("section");
  Section section{t.number("S"), t.number("roll"), {}};
  for (const TableReader& lobe : list("section.lobe", t.content())) {
    section.lobes.push_back({lobe.number("at"), lobe.number("reach"), lobe.number("width")});
  }
  return section;
}

Size SceneReader::read_size() {
  const TableReader t = table("size");
  const std::vector<std::string_view> kinds = keys_of("size");
  Size size;
  size.mm.value = std::numeric_limits<double>::quiet_NaN();  // breaks no rule
  std::string_view first;
  for (std::size_t i = 0; i < kinds.size(); ++i) {
    if (!t.states(kinds[i])) continue;
    const Stated<double> mm = t.number(kinds[i]);
    if (first.empty()) {
      first = kinds[i];
      size = {{static_cast<SizeKind>(i), mm.where, true}, mm};
    } else {
      problems_.add(mm.where, fmt::format("[size] states {} and {}: state exactly one, the others follow from the form",
                                          first, kinds[i]));
    }
  }
  if (first.empty() && !t.broken()) {
    problems_.add(t.where(),
                  fmt::format("[size] is missing its measurement: state exactly one of {}, {}, {}, {}, a number {}",
                              kinds[0], kinds[1], kinds[2], kinds[3], written_range(*find_key("size", kinds[0]))));
  }
  return size;
}

Wall SceneReader::read_wall() {
  const TableReader t = table("wall");
  return {t.number("thickness"), t.word<WallGrowth>("growth"), t.number("columella")};
}

Lip SceneReader::read_lip(const Wall& wall) {
  const TableReader t = table("lip");
  return {t.number("inclination"), t.number("thickness", wall.thickness_mm)};
}

Look SceneReader::read_look(const Lip& lip) {
  const TableReader t = table("look");
  Look look;
  look.exterior = t.colour("exterior");
  look.interior = t.colour("interior");
  look.section = t.colour("section");
  look.gloss = t.number("gloss");
  look.lip = t.optional_colour("lip");
  look.lip_breadth_mm = t.number("lip_breadth", lip.thickness_mm);
  look.callus = t.optional_colour("callus");
  look.callus_breadth_mm = t.number("callus_breadth");
  look.exterior_finish = t.word<Finish>("exterior_finish");
  look.interior_finish = t.word<Finish>("interior_finish");
  look.periostracum = t.colour("periostracum");
  look.mould = t.colour("mould");
  return look;
}

Nacre SceneReader::read_nacre() {
  const TableReader t = table("nacre");
  return {t.number("tablet"), t.number("spread"), t.number("sheet"), t.number("sheet_index"), t.whole("layers"),
          t.number("drift")};
}

std::vector<Preserved> SceneReader::read_preserved() {
  std::vector<Preserved> stretches;
  for (const TableReader& t : list("preserved", &root_)) stretches.push_back(preserved_of(t));
  return stretches;
}

Translucence SceneReader::read_translucence() {
  const TableReader t = table("translucence");
  return {t.number("mean_free_path"), t.number("anisotropy"), t.colour("colour")};
}

Light SceneReader::read_light() {
  const TableReader t = table("light");
  return {t.number("azimuth"), t.number("elevation"), t.number("softness"), t.number("fill"), t.number("stops")};
}

std::vector<Lamp> SceneReader::read_lamps() {
  std::vector<Lamp> lamps;
  for (const TableReader& t : list("lamp", &root_)) {
    const Stated<double> radius = t.number("radius");
    constexpr double kUsualRing = 2.0;  // radii of a bulb
    lamps.push_back({t.number("behind_lip"), radius, t.number("strength"), t.number("temperature"), t.number("offset"), t.number("at"),
                     t.word<LampShape>("shape"), t.number("ring", kUsualRing * radius), t.whole("bulbs")});
  }
  return lamps;
}

Radiograph SceneReader::read_radiograph() { return {table("radiograph").number("energy")}; }

Stereo SceneReader::read_stereo() {
  const TableReader t = table("stereo");
  return {t.number("angle"), t.number("spacing")};
}

ContactSheet SceneReader::read_contact_sheet() {
  const TableReader t = table("contact_sheet");
  return {t.rising_numbers("W"), t.rising_numbers("T")};
}

Plate SceneReader::read_plate() {
  const TableReader t = table("plate");
  Plate plate;
  plate.width_mm = t.number("width");
  plate.resolution_ppi = t.number("resolution");
  plate.background = t.word<Background>("background");
  plate.columns = t.whole("columns");
  plate.gap_mm = t.number("gap");
  plate.letters = t.word<Letters>("letters");
  plate.bar_mm = t.bar("bar");
  plate.quality = t.word<Quality>("quality");
  plate.unobserved = t.word<Unobserved>("unobserved");
  plate.hatch_mm = t.number("hatch_spacing");
  plate.panels = read_panels();
  return plate;
}

Panel SceneReader::read_panel(const TableReader& t) {
  Panel panel;
  if (const toml::table* free_view = t.inner_table("view")) {
    const TableReader v(free_view, "panel.view", position_of(*free_view), problems_);
    v.refuse_unknown_keys();
    panel.view = {ViewName::kFree, position_of(*free_view), true};
    panel.azimuth_deg = v.number("azimuth");
    panel.elevation_deg = v.number("elevation");
  } else {
    panel.view = t.word<ViewName>("view");
  }
  panel.scale = t.number("scale");
  panel.look = t.word<PanelLook>("look");
  const Stated<int> picture = t.word<int>("picture");
  panel.stereo = {picture.value == 1, picture.where, picture.given};
  panel.shows = t.word<Shows>("shows");
  return panel;
}

std::vector<Panel> SceneReader::read_panels() {
  std::vector<Panel> panels;
  for (const TableReader& t : list("panel", &root_)) panels.push_back(read_panel(t));
  if (panels.empty()) {
    for (const ViewName view : kUsualViews) {
      Panel panel;
      panel.view.value = view;
      panel.scale.value = 1.0;
      panels.push_back(panel);
    }
  }
  return panels;
}

Specimen SceneReader::read() {
  const TableReader top(&root_, "", kTop, problems_);
  top.refuse_unknown_keys();
  top.whole("format");
  Specimen specimen;
  specimen.identity = read_identity(table("specimen"));
  specimen.growth = read_growth();
  specimen.section = read_section();
  specimen.size = read_size();
  specimen.wall = read_wall();
  specimen.lip = read_lip(specimen.wall);
  specimen.preserved = read_preserved();
  specimen.look = read_look(specimen.lip);
  specimen.nacre = read_nacre();
  specimen.translucence = read_translucence();
  specimen.colouring = read_colouring();
  specimen.sculpture = read_sculpture();
  specimen.attachments = read_attachments();
  specimen.light = read_light();
  specimen.lamps = read_lamps();
  specimen.radiograph = read_radiograph();
  specimen.stereo = read_stereo();
  specimen.contact_sheet = read_contact_sheet();
  specimen.plate = read_plate();
  return specimen;
}

}  // namespace whorl::specimen
