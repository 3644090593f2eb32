#include "drawing_sheet.hpp"

#include "display_width.hpp"
#include "xml.hpp"

namespace lightledger::report {

Vector2d Sheet::operator()(const Eigen::Vector3d& point) const {
  return m_scale * seen(m_view, point);
}

std::vector<Vector2d> Sheet::operator()(const analysis::Polyline& line) const {
  std::vector<Vector2d> points;
  for (const Eigen::Vector3d& point : line)
    points.push_back((*this)(point));
  return points;
}

Box Sheet::frame() const {
  const Box& box = m_framing.extent.box;
  return {m_scale * box.low, m_scale * box.high};
}

std::string path_of(const std::vector<Vector2d>& points, bool closed) {
  std::string path;
  for (const Vector2d& point : points)
    path.append(path.empty() ? "M" : "L")
        .append(coordinate(point[0]))
        .append(" ")
        .append(coordinate(point[1]));
  return closed && !path.empty() ? path + "Z" : path;
}

double text_width(std::string_view words) {
  constexpr double widest_usual_character = 6.7;
  return widest_usual_character * display_width(words);
}

} // namespace lightledger::report
