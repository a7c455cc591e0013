// SPDX-License-Identifier: Apache-2.0
// Reads tables of points: a header x,y or x,y,missing, then a row a point.
#include "specimen/outline_points.h"

#include "specimen/scene_bytes.h"
#include "specimen/toml_door.h"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <filesystem>

namespace whorl::specimen {
namespace {

constexpr std::size_t kFewest = 8;

std::vector<std::string> cells_of(std::string_view line) {
  std::vector<std::string> cells;
  for (;;) {
    const std::size_t comma = std::min(line.find(','), line.size());
    std::string cell(line.substr(0, comma));
    cell.erase(0, std::min(cell.find_first_not_of(" \t\r"), cell.size()));
    cell.erase(cell.find_last_not_of(" \t\r") + 1);
    cells.push_back(std::move(cell));
    if (comma == line.size()) return cells;
    line.remove_prefix(comma + 1);
  }
}

bool number_in(const std::string& cell, double& value) {
  const auto read = std::from_chars(cell.data(), cell.data() + cell.size(), value);
  return read.ec == std::errc() && read.ptr == cell.data() + cell.size() && std::isfinite(value);
}

}  // namespace

std::vector<TracedOutline::Point> read_outline_points(const std::string& source, const Stated<std::string>& file, ProblemList& problems) {
  const std::filesystem::path path = source == "-" ? std::filesystem::path(file.value) : std::filesystem::path(source).parent_path() / file.value;
  const std::string bytes = fetch_bytes(path.string());
  const auto complain = [&](std::size_t line, const std::string& what) {
    problems.add(file.where, fmt::format("[[outline]] file = \"{}\", line {}: {}", shown(file.value), line, what));
  };
  std::vector<TracedOutline::Point> points;
  std::string_view text = bytes;
  std::size_t number = 0, columns = 0;
  while (!text.empty()) {
    const std::size_t end = std::min(text.find('\n'), text.size());
    const std::string_view line = text.substr(0, end);
    text.remove_prefix(std::min(end + 1, text.size()));
    ++number;
    if (line.find_first_not_of(" \t\r,") == std::string_view::npos || line.starts_with('#')) continue;
    const std::vector<std::string> cells = cells_of(line);
    if (columns == 0) {
      columns = cells.size();
      const bool known = columns >= 2 && columns <= 3 && cells[0] == "x" && cells[1] == "y" && (columns == 2 || cells[2] == "missing");
      if (known) continue;
      complain(number, "wanted is the header x,y or x,y,missing");
      return {};
    }
    if (cells.size() > 2 && !cells[2].empty() && cells[2] != "0" && cells[2] != "no") continue;
    TracedOutline::Point point{};
    if (cells.size() < 2 || cells.size() > columns || !number_in(cells[0], point.x) || !number_in(cells[1], point.y)) {
      complain(number, fmt::format("\"{}\" is no point; wanted are two numbers, x and y", shown(line)));
      return {};
    }
    points.push_back(point);
  }
  if (points.size() < kFewest) complain(number, fmt::format("{} points; an outline has at least {}", points.size(), kFewest));
  return points;
}

}  // namespace whorl::specimen
