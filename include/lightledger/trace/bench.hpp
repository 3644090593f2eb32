#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>

#include <Eigen/Core>
#include <optional>
#include <vector>

namespace lightledger::trace {

/// A right-handed frame in bench coordinates: mm, and the axes x, y, z as columns.
struct Frame {
  Eigen::Vector3d origin = Eigen::Vector3d::Zero();
  Eigen::Matrix3d axes = Eigen::Matrix3d::Identity();
};

/// Where everything stands, by the axis rule of contract §2. The bench's own coordinates are those of the
/// axis as it arrives at the first station.
struct Bench {
  /// Per surface, rear faces included: its vertex, and its own axes after shift, tilt and wedge.
  std::vector<Frame> surface;
  std::vector<Frame> arriving;      ///< per station: its point of the axis, and the axes as the light arrives
  std::vector<assembly::Side> from; ///< per station: the side of the surface that the light arrives at
  std::vector<Frame> leaving;       ///< per station: the same point, the axes after reflection and turn
  std::vector<double> gap;          ///< per station, in mm along the leaving axis; 0 after the last
};

/// Rx(a) Ry(b) Rz(c) for angles in degrees, exact at multiples of 90°.
[[nodiscard]] Eigen::Matrix3d rotation(const std::array<double, 3>& degrees);

/// Lays the train out. A focus that is virtual or infinitely far, an axis that runs in a mirror's plane, and
/// a surface to be met again that the axis does not come back to, or comes to in another medium, are faults,
/// and no bench is returned then.
[[nodiscard]] std::optional<Bench> lay_out(const assembly::Assembly& assembly, assembly::Faults& faults);

} // namespace lightledger::trace
