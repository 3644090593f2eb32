#include "reference/clear.hpp"

#include "reference/shape.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace lightledger::reference {
namespace {

/// How far inside the outer edge a point (x, y) from the middle of the opening lies, in mm (for the ellipse
/// to first order); negative outside.
struct Inside {
  double x, y;

  double operator()(const assembly::Clear::Unlimited&) const {
    return std::numeric_limits<double>::infinity();
  }
  double operator()(const assembly::Clear::Disc& disc) const { return disc.radius - std::hypot(x, y); }
  double operator()(const assembly::Clear::Rectangle& rectangle) const {
    return std::min(rectangle.half_width - std::abs(x), rectangle.half_height - std::abs(y));
  }
  double operator()(const assembly::Clear::Ellipse& ellipse) const {
    const double scaled = std::hypot(x / ellipse.semi_x, y / ellipse.semi_y);
    return (1.0 - scaled) * std::min(ellipse.semi_x, ellipse.semi_y);
  }
};

} // namespace

Passage through(const assembly::Clear& clear, const Vector& local_point) {
  const double x = local_point.x() - clear.at[0];
  const double y = local_point.y() - clear.at[1];
  double inside = std::visit(Inside{x, y}, clear.opening);
  if (clear.hole_radius > 0.0)
    inside = std::min(inside, std::hypot(x, y) - clear.hole_radius);
  return {inside >= 0.0, std::abs(inside) < doubtful_within};
}

} // namespace lightledger::reference
