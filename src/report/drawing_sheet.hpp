#pragma once

#include "label_layout.hpp"

#include <lightledger/analysis/drawing.hpp>

#include <string>
#include <string_view>
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

/// From the bench to the paper: what lies in the plane of a view, in px, y downward.
class Sheet {
public:
  Sheet(analysis::View view, double px_per_mm) : m_view(view), m_scale(px_per_mm) {}

  [[nodiscard]] Vector2d operator()(const Eigen::Vector3d& point) const;
  [[nodiscard]] std::vector<Vector2d> operator()(const analysis::Polyline& line) const;
  [[nodiscard]] double scale() const { return m_scale; }

private:
  analysis::View m_view;
  double m_scale;
};

/// All that a view shows, at 1 px a mm.
[[nodiscard]] Extent extent_of(const analysis::DrawnView& view);

/// `M x y L x y …`; empty without points.
[[nodiscard]] std::string path_of(const std::vector<Vector2d>& points, bool closed = false);

/// The width of 12 px text, rather too wide than too narrow.
[[nodiscard]] double text_width(std::string_view words);

inline constexpr double text_height = 14.0;

} // namespace lightledger::report
