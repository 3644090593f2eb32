#pragma once

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/landings.hpp>

#include <array>
#include <cstdint>
#include <optional>
#include <vector>

namespace lightledger::analysis {

/// Equal cells over a rectangle of the detector, columns along x, from the corner of least x and y, mm.
struct PixelGrid {
  double x_from, y_from;
  double pitch_x, pitch_y;
  std::uint64_t columns, rows;
};

/// The detector's pixels over the rectangle about its clear area; none where it has no pixels, or no edge.
[[nodiscard]] std::optional<PixelGrid> pixel_grid(const assembly::Assembly& assembly);

/// The power on the brightest pixel. Where it is hit by fewer than 100 rays, squares of pixels, 2 × 2, 4 × 4,
/// … share their light evenly until one is hit by as many; none where there are fewer rays in all.
[[nodiscard]] std::optional<double> brightest_pixel(const PixelGrid& grid,
                                                    const std::vector<trace::Landing>& rays);

/// The area that maps of the light show: about the detector's clear area, or where it has no edge about the
/// rays.
[[nodiscard]] std::array<double, 4> map_area(const assembly::Assembly& assembly,
                                             const std::vector<trace::Landing>& rays);

/// The light of rays on an area given by x from, x to, y from, y to; cells as fine as the rays allow.
[[nodiscard]] DetectorMap light_map(const std::array<double, 4>& area,
                                    const std::vector<trace::Landing>& rays);

} // namespace lightledger::analysis
