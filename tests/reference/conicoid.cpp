#include "reference/conicoid.hpp"

#include <array>
#include <cmath>

namespace lightledger::reference {

// Without coordinates: with v the vector from the vertex and a the unit vector of the axis, the surface is
//   c (v·v + K (v·a)²) − 2 v·a = 0,
// and on the ray v = v0 + t d a quadratic α t² + 2 β t + γ = 0. Starting from the point nearest to the vertex
// keeps its coefficients small.
Meeting meet_conicoid(const Conicoid& shape, const Frame& surface, const Ray& ray) {
  const auto [c, K] = shape;
  const Vector a = surface.axes.col(2);
  const Vector& d = ray.direction;
  const double to_nearest = (surface.origin - ray.point).dot(d);
  const Vector v0 = ray.point + to_nearest * d - surface.origin;

  const double alpha = c * (1.0 + K * d.dot(a) * d.dot(a));
  const double beta = c * (v0.dot(d) + K * v0.dot(a) * d.dot(a)) - d.dot(a);
  const double gamma = c * (v0.dot(v0) + K * v0.dot(a) * v0.dot(a)) - 2.0 * v0.dot(a);
  const double discriminant = beta * beta - alpha * gamma;

  Meeting meeting;
  meeting.doubtful = std::abs(discriminant) < doubtful_within;
  if (discriminant < 0.0)
    return meeting;
  const double q = -(beta + std::copysign(std::sqrt(discriminant), beta));
  double nearest_sag = 0.0;
  for (const double t : std::array{gamma / q, q / alpha}) {
    const Vector v = v0 + t * d;
    const double sag = v.dot(a); // along the ray the tangent plane is sag/(d·a) away
    const double before_equator = 1.0 - (1.0 + K) * c * sag;
    meeting.doubtful |= std::abs(before_equator) < doubtful_within;
    if (!std::isfinite(t) || !(before_equator > 0.0))
      continue;
    if (meeting.hit) {
      meeting.doubtful |= std::abs(std::abs(sag) - std::abs(nearest_sag)) < doubtful_within;
      if (std::abs(sag) >= std::abs(nearest_sag))
        continue;
    }
    nearest_sag = sag;
    const Vector gradient = c * (v + K * sag * a) - a;
    meeting.hit = Hit{to_nearest + t, surface.origin + v, gradient.normalized()};
  }
  return meeting;
}

} // namespace lightledger::reference
