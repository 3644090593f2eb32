#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/trace/landings.hpp>

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

} // namespace lightledger::analysis
