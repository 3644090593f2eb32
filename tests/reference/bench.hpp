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
  assembly::Side from; ///< the side of the surface that the axis arrives at; `before` on its first visit
  double gap;          ///< in mm along the leaving axis; a focus, or a surface met again, found
  Frame rear;          ///< of a plate: the vertex and axes of its back face
};

struct Bench {
  std::vector<Place> stations;
};

/// Rx(a) Ry(b) Rz(c) on column vectors, angles in degrees (contract §2, "rotations").
[[nodiscard]] Rotation rotation(const std::array<double, 3>& degrees);

/// Places all stations along the axis (contract §2, "The axis"). Throws std::domain_error where a gap to the
/// focus leads to no real image, or the axis does not come back, in the right medium, to a surface met again.
[[nodiscard]] Bench lay_out(const assembly::Assembly& assembly);

/// The first of the stations that visit the surface of this one.
[[nodiscard]] std::size_t first_visit(const assembly::Assembly& assembly, std::size_t station);

/// The whole bench carried elsewhere: every point x becomes motion.bench(x).
[[nodiscard]] Bench moved(const Bench& bench, const Frame& motion);

} // namespace lightledger::reference
