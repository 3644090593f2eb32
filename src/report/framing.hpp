#pragma once

#include "label_layout.hpp"

#include <lightledger/analysis/drawing.hpp>

#include <vector>

namespace lightledger::report {

/// A box that grows around what is drawn.
struct Extent {
  Box box{Vector2d::Constant(1e300), Vector2d::Constant(-1e300)};

  void add(const Vector2d& point);
  void add(const Box& other);
  [[nodiscard]] bool empty() const { return box.low[0] > box.high[0]; }
  [[nodiscard]] Vector2d size() const { return empty() ? Vector2d(0.0, 0.0) : Vector2d(box.high - box.low); }
};

/// A point as a view shows it, in mm, y downward.
[[nodiscard]] Vector2d seen(analysis::View view, const Eigen::Vector3d& point);

/// What of a view is drawn. A train whose stations crowd at one end of a long empty way would be a speck:
/// then the crowd is drawn, and the rest is only named.
struct Framing {
  Extent extent;            ///< in mm
  std::vector<bool> inside; ///< per station
  bool cropped = false;
};
[[nodiscard]] Framing framing(const analysis::DrawnView& view);

} // namespace lightledger::report
