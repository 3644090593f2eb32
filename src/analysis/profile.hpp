#pragma once

#include <lightledger/analysis/drawing.hpp>
#include <lightledger/trace/bench.hpp>

#include <Eigen/Core>

/// Surfaces as lines in space.
namespace lightledger::analysis {

/// The sag of ISO 10110-12 at a distance from the vertex's axis, mm; none beyond the equator.
[[nodiscard]] std::optional<double> sag(const assembly::Shape& shape, double radius);

/// The direction in a surface's plane that a view shows at full length, in bench coordinates; zero where the
/// surface is seen face-on.
[[nodiscard]] Eigen::Vector3d across(const trace::Frame& frame, View view);

/// What of a surface lies within its clear area along a direction in its plane, through the middle of that
/// area; `reach` is how far it is drawn where it is unlimited. Beside a hole there are two pieces.
[[nodiscard]] std::vector<Polyline> section(const assembly::Surface& surface, const trace::Frame& frame,
                                            const Eigen::Vector3d& direction, double reach);

/// The edge of the clear area, closed; empty where it is unlimited.
[[nodiscard]] Polyline outline(const assembly::Surface& surface, const trace::Frame& frame);

} // namespace lightledger::analysis
