#pragma once

#include "curve_table.hpp"

#include <lightledger/assembly/assembly.hpp>

namespace lightledger::assembly {

/// Puts rows of any order onto the grid of their wavelengths and angles; a fault for each two rows of one
/// point and for the first point that no row gives. Phases are in our sign, or with `advance` in the opposite
/// one, and are taken within 180 degrees of their neighbours, so that it makes sense to interpolate them.
[[nodiscard]] Measured curve_grid(CurveTable table, bool advance, CurveFaults& faults);

} // namespace lightledger::assembly
