#pragma once

#include "reference/tracer.hpp"

#include <array>
#include <optional>

namespace lightledger::reference {

/// The train with all its apertures open.
[[nodiscard]] assembly::Assembly opened(assembly::Assembly assembly);

/// The launch point, near a guess, of the ray of a field that meets a station at a point of its surface's x,
/// y: by Newton's method with slopes from central differences. None where it does not come within 1e-12 mm.
struct Aim {
  std::size_t station;
  std::array<double, 2> target;
};
[[nodiscard]] std::optional<Eigen::Vector2d> launch_point(const assembly::Assembly& opened,
                                                          const Bench& bench, const assembly::Field& field,
                                                          const Aim& aim, Eigen::Vector2d guess);

} // namespace lightledger::reference
