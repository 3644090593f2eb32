#include "profile.hpp"

#include <Eigen/Geometry>
#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::analysis {
namespace {

using assembly::Clear;
using Eigen::Vector2d;
using Eigen::Vector3d;

constexpr int curve_steps = 40;
constexpr int outline_steps = 72;
constexpr double face_on = 1e-6;

template <class... Kinds>
struct Overloaded : Kinds... {
  using Kinds::operator()...;
};
template <class... Kinds>
Overloaded(Kinds...) -> Overloaded<Kinds...>;

std::optional<double> conic_sag(double radius, double conic, double r) {
  const double curvature = 1.0 / radius;
  const double root = 1.0 - (1.0 + conic) * curvature * curvature * r * r;
  if (root <= 0.0)
    return std::nullopt;
  return curvature * r * r / (1.0 + std::sqrt(root));
}

std::optional<double> asphere_sag(const assembly::Asphere& asphere, double r) {
  auto z = std::isfinite(asphere.radius) ? conic_sag(asphere.radius, asphere.conic, r) : std::optional(0.0);
  if (!z)
    return z;
  for (std::size_t i = 0; i < asphere.terms.size(); ++i)
    *z += asphere.terms[i] * std::pow(r, assembly::Asphere::lowest_power + static_cast<int>(i));
  return z;
}

/// From the middle of the clear area to its edge, along a unit vector.
double distance_to_edge(const Clear& clear, const Vector2d& direction, double reach) {
  const double x = std::abs(direction[0]);
  const double y = std::abs(direction[1]);
  return std::visit(Overloaded{[&](const Clear::Unlimited&) { return reach; },
                               [&](const Clear::Disc& disc) { return disc.radius; },
                               [&](const Clear::Rectangle& rectangle) {
                                 return std::min(rectangle.half_width / std::max(x, 1e-12),
                                                 rectangle.half_height / std::max(y, 1e-12));
                               },
                               [&](const Clear::Ellipse& ellipse) {
                                 return 1.0 / std::hypot(x / ellipse.semi_x, y / ellipse.semi_y);
                               }},
                    clear.opening);
}

/// A point of the surface by its own x, y; none beyond the equator.
std::optional<Vector3d> on_surface(const assembly::Surface& surface, const trace::Frame& frame,
                                   const Vector2d& place) {
  const auto z = sag(surface.shape, place.norm());
  if (!z)
    return std::nullopt;
  return frame.origin + frame.axes * Vector3d(place[0], place[1], *z);
}

Vector2d middle(const Clear& clear) {
  return {clear.at[0], clear.at[1]};
}

Polyline piece(const assembly::Surface& surface, const trace::Frame& frame, const Vector2d& direction,
               double from, double to) {
  const int steps = std::holds_alternative<assembly::Plane>(surface.shape) ? 1 : curve_steps;
  Polyline line;
  for (int i = 0; i <= steps; ++i) {
    const double along = from + (to - from) * i / steps;
    if (const auto point = on_surface(surface, frame, middle(surface.clear) + along * direction))
      line.push_back(*point);
  }
  return line;
}

} // namespace

std::optional<double> sag(const assembly::Shape& shape, double radius) {
  return std::visit(
      Overloaded{[](const assembly::Plane&) { return std::optional(0.0); },
                 [&](const assembly::Sphere& sphere) { return conic_sag(sphere.radius, 0.0, radius); },
                 [&](const assembly::Conic& conic) { return conic_sag(conic.radius, conic.conic, radius); },
                 [&](const assembly::Asphere& asphere) { return asphere_sag(asphere, radius); }},
      shape);
}

Vector3d across(const trace::Frame& frame, View view) {
  const Vector3d direction = Vector3d::Unit(static_cast<int>(view)).cross(frame.axes.col(2));
  return direction.norm() < face_on ? Vector3d::Zero() : direction.normalized();
}

std::vector<Polyline> section(const assembly::Surface& surface, const trace::Frame& frame,
                              const Vector3d& direction, double reach) {
  if (direction.isZero())
    return {};
  const Vector2d own = frame.axes.leftCols<2>().transpose() * direction;
  const double edge = distance_to_edge(surface.clear, own, reach);
  const double hole = std::min(surface.clear.hole_radius, edge);
  if (hole <= 0.0)
    return {piece(surface, frame, own, -edge, edge)};
  return {piece(surface, frame, own, -edge, -hole), piece(surface, frame, own, hole, edge)};
}

Polyline outline(const assembly::Surface& surface, const trace::Frame& frame) {
  Polyline line;
  if (std::holds_alternative<Clear::Unlimited>(surface.clear.opening))
    return line;
  for (int i = 0; i <= outline_steps; ++i) {
    const double turn = 2.0 * std::numbers::pi * i / outline_steps;
    const Vector2d direction(std::cos(turn), std::sin(turn));
    const Vector2d place =
        middle(surface.clear) + distance_to_edge(surface.clear, direction, 0.0) * direction;
    if (const auto point = on_surface(surface, frame, place))
      line.push_back(*point);
  }
  return line;
}

} // namespace lightledger::analysis
