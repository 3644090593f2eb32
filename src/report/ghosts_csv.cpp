#include "csv.hpp"

#include <lightledger/report/ghosts.hpp>

#include <fmt/format.h>

namespace lightledger::report {

std::string ghosts_csv(const analysis::Ghosts& ghosts) {
  Csv csv;
  for (const char* heading : {"path", "bounces", "power", "uncertainty", "relative_power", "centroid_x_mm",
                              "centroid_y_mm", "rms_radius_mm", "path_excess_mm", "peak_ratio", "s0", "s1",
                              "s2", "s3", "dop", "fringe_modulation", "defocus_mm"})
    csv.cell(heading);
  csv.end_row();
  for (std::size_t i = 0; i < ghosts.paths.size(); ++i) {
    const analysis::Ghost& ghost = ghosts.paths[i];
    csv.cell(std::to_string(i + 1)).cell(fmt::format("{}", fmt::join(ghost.bounces, " > ")));
    csv.cell(ghost.power).cell(ghost.uncertainty).cell(ghost.relative_power);
    csv.cell(ghost.spot.centroid_mm[0]).cell(ghost.spot.centroid_mm[1]).cell(ghost.spot.rms_radius_mm);
    csv.cell(ghost.path_excess_mm).cell(ghost.peak_ratio);
    for (const double s : ghost.stokes)
      csv.cell(s);
    csv.cell(ghost.dop).cell(ghost.fringe_modulation).cell(ghost.defocus_mm);
    csv.end_row();
  }
  return csv.text();
}

} // namespace lightledger::report
