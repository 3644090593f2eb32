#include "display_width.hpp"

#include <lightledger/report/ghosts.hpp>
#include <lightledger/report/picture.hpp>

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::report {
namespace {

using analysis::DetectorMap;
using analysis::Ghosts;

NamedFile picture(std::string name, std::string title, const DetectorMap& map) {
  MapPicture picture;
  picture.title = std::move(title);
  picture.quantity = "share of launched power per area";
  picture.unit = "1/mm²";
  picture.x_label = "x in mm";
  picture.y_label = "y in mm";
  picture.x_from = map.x_from;
  picture.x_to = map.x_to;
  picture.y_from = map.y_from;
  picture.y_to = map.y_to;
  picture.columns = map.columns;
  picture.rows = map.rows;
  picture.values = map.per_mm2;
  picture.scale = Scale::logarithmic;
  return {std::move(name), png(picture)};
}

/// "Ghost 1: 20 image, 19 cover rear", stations by number and name.
std::string title(const analysis::Ghost& ghost, std::size_t number) {
  std::string title = fmt::format("Ghost {}:", number);
  for (std::size_t i = 0; i < ghost.bounces.size(); ++i)
    title += fmt::format("{} {} {}", i == 0 ? "" : ",", ghost.stations[i], on_one_line(ghost.bounces[i]));
  return title;
}

/// On the coarsest of their grids, so that no light seems to stand on single cells.
DetectorMap sum(const std::vector<DetectorMap>& maps) {
  DetectorMap sum = *std::ranges::min_element(maps, {}, &DetectorMap::columns);
  std::ranges::fill(sum.per_mm2, 0.0);
  for (const DetectorMap& map : maps) {
    const double share =
        static_cast<double>(sum.columns * sum.rows) / static_cast<double>(map.columns * map.rows);
    for (std::size_t row = 0; row < map.rows; ++row)
      for (std::size_t column = 0; column < map.columns; ++column)
        sum.per_mm2[row * sum.rows / map.rows * sum.columns + column * sum.columns / map.columns] +=
            share * map.per_mm2[row * map.columns + column];
  }
  return sum;
}

} // namespace

std::vector<NamedFile> ghosts_files(const Ghosts& ghosts) {
  std::vector<NamedFile> files;
  if (ghosts.image_map)
    files.push_back(picture("image.png", "Image", *ghosts.image_map));
  for (std::size_t i = 0; i < ghosts.maps.size(); ++i)
    files.push_back(
        picture(fmt::format("ghost-{:02}.png", i + 1), title(ghosts.paths[i], i + 1), ghosts.maps[i]));
  if (!ghosts.maps.empty())
    files.push_back(picture("ghosts.png", fmt::format("Sum of the {} brightest ghosts", ghosts.maps.size()),
                            sum(ghosts.maps)));
  return files;
}

} // namespace lightledger::report
