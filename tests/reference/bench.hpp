#pragma once

#include "reference/geometry.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <array>
#include <vector>

namespace lightledger::reference {

/// Where one station stands. The origin of `arriving` and `leaving` is the station's point of the axis, their
/// z is the axis before and behind it; the origin of `surface` is the vertex.
struct Place {
  Frame arriving, surface, leaving;
  double gap; ///< in mm along the leaving axis, a focus found
};

struct Bench {
  std::vector<Place> stations;
};

/// Rx(a) Ry(b) Rz(c) on column vectors, angles in degrees (contract §2, "rotations").
[[nodiscard]] Rotation rotation(const std::array<double, 3>& degrees);

/// Places all stations along the axis (contract §2, "The axis"). Throws std::domain_error where a gap to the
/// focus leads to no real image.
[[nodiscard]] Bench lay_out(const assembly::Assembly& assembly);

/// The whole bench carried elsewhere: every point x becomes motion.bench(x).
[[nodiscard]] Bench moved(const Bench& bench, const Frame& motion);

} // namespace lightledger::reference
