#pragma once

#include <lightledger/analysis/drawing.hpp>
#include <lightledger/trace/tracer.hpp>

namespace lightledger::analysis {

/// Rays to draw, and how far from each surface's vertex they met it.
struct Fan {
  std::vector<DrawnRay> rays;
  std::vector<double> reach; ///< per surface, mm; 0 where no ray met it
};

/// A few rays of each field, spread over the beam along the direction that the view shows, followed along a
/// path of the train. They start `lead` mm before the launch plane, or at an object that is nearer.
[[nodiscard]] Fan fan(const trace::Train& train, const trace::Path& path, View view, double lead);

/// Where rays of a path that arrive meet the detector's surface, in its own x and y, mm.
[[nodiscard]] std::vector<Eigen::Vector2d> spot(const trace::Train& train, const trace::Path& path);

} // namespace lightledger::analysis
