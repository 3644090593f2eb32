#pragma once

#include "framing.hpp"

#include <lightledger/analysis/drawing.hpp>

#include <string>
#include <string_view>
#include <vector>

namespace lightledger::report {

/// From the bench to the paper: what lies in the plane of a view, in px, y downward.
class Sheet {
public:
  Sheet(const analysis::DrawnView& view, double px_per_mm)
      : m_view(view.along), m_scale(px_per_mm), m_framing(framing(view)) {}

  [[nodiscard]] Vector2d operator()(const Eigen::Vector3d& point) const;
  [[nodiscard]] std::vector<Vector2d> operator()(const analysis::Polyline& line) const;
  /// What is drawn, in px.
  [[nodiscard]] Box frame() const;
  [[nodiscard]] bool shows(std::size_t station) const { return m_framing.inside[station]; }
  [[nodiscard]] bool cropped() const { return m_framing.cropped; }

private:
  analysis::View m_view;
  double m_scale;
  Framing m_framing;
};

/// `M x y L x y …`; empty without points.
[[nodiscard]] std::string path_of(const std::vector<Vector2d>& points, bool closed = false);

/// The width of 12 px text, rather too wide than too narrow.
[[nodiscard]] double text_width(std::string_view words);

inline constexpr double text_height = 14.0;

} // namespace lightledger::report
