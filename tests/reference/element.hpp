#pragma once

#include "reference/geometry.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <optional>

namespace lightledger::reference {

/// What a polarizer, retarder or rotator does to the transverse field of a ray, in bench coordinates.
struct Element {
  Eigen::Matrix3cd field;     ///< leaves the ray's direction alone
  Eigen::Matrix3d absorption; ///< the power absorbed is the trace of this times ⟨E E†⟩
};

/// Along a = unit(A − (A·k) k) and across it, b = k × a, of the axis A in the surface's plane (contract §3).
/// None for surfaces of other kinds. `on_the_way_back` is light that meets the surface from its other side.
[[nodiscard]] std::optional<Element> element(const assembly::Effect& effect, const Rotation& surface_axes,
                                             const Vector& direction, bool on_the_way_back,
                                             double wavelength_nm);

} // namespace lightledger::reference
