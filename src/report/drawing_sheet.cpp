#include "drawing_sheet.hpp"

#include "display_width.hpp"
#include "xml.hpp"

namespace lightledger::report {

void Extent::add(const Vector2d& point) {
  box.low = box.low.cwiseMin(point);
  box.high = box.high.cwiseMax(point);
}

void Extent::add(const Box& other) {
  add(other.low);
  add(other.high);
}

Vector2d Sheet::operator()(const Eigen::Vector3d& point) const {
  switch (m_view) {
  case analysis::View::x:
    return m_scale * Vector2d(point[2], -point[1]);
  case analysis::View::y:
    return m_scale * Vector2d(point[2], -point[0]);
  case analysis::View::z:
    break;
  }
  return m_scale * Vector2d(point[0], -point[1]);
}

std::vector<Vector2d> Sheet::operator()(const analysis::Polyline& line) const {
  std::vector<Vector2d> points;
  for (const Eigen::Vector3d& point : line)
    points.push_back((*this)(point));
  return points;
}

Extent extent_of(const analysis::DrawnView& view) {
  const Sheet sheet(view.along, 1.0);
  Extent extent;
  const auto add = [&](const analysis::Polyline& line) {
    for (const Vector2d& point : sheet(line))
      extent.add(point);
  };
  for (const analysis::DrawnStation& station : view.stations) {
    extent.add(sheet(station.axis_point));
    for (const analysis::Polyline& piece : station.section)
      add(piece);
    add(station.outline);
  }
  for (const analysis::DrawnGlass& body : view.glass)
    add(body.contour);
  for (const analysis::DrawnRay& ray : view.rays)
    add(ray.points);
  return extent;
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
